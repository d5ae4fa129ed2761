import type { BundleManifest } from "../schemas/replication-bundle.ts";

/** README.txt of a replication bundle: what lies in it, how to run it, and what to be careful with. */
export function readMe({ program, study, madeAt, cells, leftOut, data }: BundleManifest): string {
  const isWhole = data.every(({ included }) => included);
  return `${[
    `Replication bundle of "${study}"`,
    `Made ${madeAt.slice(0, 10)} by ${program}.`,
    "",
    "bundle.json      what lies here, with fingerprints (SHA-256)",
    "study.yaml       every cell's specification as one study file",
    "findings/        what each cell found, as JSON at full precision",
    "tables/          the same as tables: CSV at full precision, LaTeX as printed",
    "coefficients/    every system's coefficients, standard errors and full covariance",
    "methods/         methods paragraphs of the systems, and the works they rest on as BibTeX",
    isWhole
      ? "data/            the files the findings were made from"
      : "moments/         second moments of the rows, where a system can be estimated from them",
    "",
    ...cells.map(({ name, kind }) => `  ${name}: ${kind}`),
    ...leftOut.map(({ name, because }) => `  ${name}: not in the bundle. ${because}`),
    "",
    "To estimate everything again and compare number by number, with the program and this file at hand:",
    "",
    isWhole
      ? "  npm run --silent replicate -- bundle.zip"
      : `  npm run --silent replicate -- bundle.zip ${data.map(({ file }) => file.slice(file.lastIndexOf("/") + 1)).join(" ")}`,
    "",
    ...(isWhole
      ? [
          "The data may describe households. Pass them on only as far as their owner, the law on data protection and the",
          "survey's own rules of confidentiality allow; where these say more than this file, they come first.",
        ]
      : [
          "The data are not here: whoever has them names their files after the bundle. Without them the coefficients are",
          "estimated from the moments, and matrices computed from the coefficients; the rest is said to be unchecked.",
        ]),
    "Figures of welfare and taxes are estimates of a model for the population sampled, with the uncertainty that stands",
    "beside them; they do not take the place of the responsible office's own assessment.",
  ].join("\r\n")}\r\n`;
}
