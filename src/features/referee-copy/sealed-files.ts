import type {
  RefereeCopy,
  SealedAlso,
  SealedContent,
  SealedMethods,
  SealedSlutsky,
} from "../../../shared/schemas/referee-copy.ts";
import { canonicalJson } from "../../../shared/study/canonical-json.ts";
import { coefficientTable } from "../../../shared/tables/coefficients.ts";
import { covarianceCsv } from "../../../shared/tables/covariance.ts";
import { tableCsv } from "../../../shared/tables/csv.ts";
import { eigenvalueTable } from "../../../shared/tables/eigenvalues.ts";
import { elasticityTables } from "../../../shared/tables/elasticity-tables.ts";
import { firstStepTables } from "../../../shared/tables/first-steps.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import { rowAccountingTable } from "../../../shared/tables/row-accounting.ts";
import { compensatedTable, slutskyTable } from "../../../shared/tables/slutsky-matrix.ts";
import type { LabelledTable } from "../../../shared/tables/table.ts";
import { testsTables } from "../../../shared/tables/tests-tables.ts";
import { asSealed, quotedNumbersTable } from "../../../shared/tables/text-finding.ts";

/** A file made in the browser from the sealed content. */
export interface SealedFile {
  readonly label: string;
  readonly format: "CSV" | "LaTeX" | "Markdown" | "Text" | "BibTeX" | "YAML" | "JSON";
  readonly name: string;
  readonly type: string;
  readonly text: string;
}

/** The specification as one study file: every cell's source under its name and kind. */
export function specificationYaml({ study, cells }: SealedContent): string {
  // A JSON string is a YAML one too: any title and any name may stand in quotes.
  const blocks = cells.sources.map(
    ({ name, kind, source }) =>
      `  ${JSON.stringify(name)}:\n    kind: ${kind}\n${kind === "text" ? textYaml(source) : indented(source, 4)}\n`,
  );
  return `study: ${JSON.stringify(study.title)}\ncells:\n${blocks.join("")}`;
}

function indented(source: string, by: number): string {
  const margin = " ".repeat(by);
  const lines = source.trimEnd().split("\n");
  return lines.map((line) => (line === "" ? "" : `${margin}${line}`)).join("\n");
}

/** Prose is no map of keys: it stands under one, line by line where nothing in it has to be escaped. */
function textYaml(text: string): string {
  const lines = text.replace(/\n$/, "");
  const isPlain = /\S$/.test(lines) && !/[^\P{C}\n]|[\u2028\u2029]/u.test(lines);
  if (!isPlain) return `    text: ${JSON.stringify(text)}`;
  return `    text: |2${lines === text ? "-" : ""}\n${indented(lines, 6)}`;
}

function matrixTables(slutsky: SealedSlutsky): LabelledTable[] {
  return [
    slutskyTable(slutsky, "share"),
    slutskyTable(slutsky, "quantity"),
    ...(slutsky.at.eigenvalues.length > 0 ? [eigenvalueTable(slutsky)] : []),
    compensatedTable(slutsky),
  ];
}

/** Every table of a further finding, the one to take first at the head. */
function alsoTables(one: SealedAlso): LabelledTable[] {
  switch (one.kind) {
    case "system":
      return [coefficientTable(one.finding), ...firstStepTables(one.finding)];
    case "tests":
      return testsTables(one.finding);
    case "elasticities":
      return elasticityTables(one.finding);
    case "slutsky":
      return matrixTables(one.finding);
    case "text":
      return one.finding.numbers.length === 0 ? [] : [quotedNumbersTable(asSealed(one.finding))];
  }
}

function tablesLatex({ slutsky, system, accounting, also = [] }: SealedContent): string {
  return [
    ...matrixTables(slutsky),
    coefficientTable(system),
    rowAccountingTable(accounting),
    ...also.flatMap(alsoTables),
  ]
    .map(tableLatex)
    .join("\n");
}

function markdownFile({ name, finding }: Extract<SealedAlso, { kind: "text" }>, file: string): SealedFile {
  return { label: `${name}, text`, format: "Markdown", name: file, type: "text/markdown", text: finding.markdown };
}

function methodsFiles({ system, text, references, bibtex }: SealedMethods, stem: string): SealedFile[] {
  const written = `${text}\n\nReferences\n\n${references.join("\n")}\n`;
  return [
    { label: `Methods of ${system}`, format: "Text", name: `${stem}.txt`, type: "text/plain", text: written },
    {
      label: `References of the methods of ${system}`,
      format: "BibTeX",
      name: `${stem}.bib`,
      type: "application/x-bibtex",
      text: bibtex,
    },
  ];
}

/** Everything a copy can be downloaded as. JSON is the very text whose SHA-256 is the fingerprint. */
export function sealedFiles({ fingerprint, content }: RefereeCopy): SealedFile[] {
  const stem = `referee-copy-${fingerprint.slice(0, 8)}`;
  const csv = (label: string, name: string, text: string): SealedFile => ({
    label,
    format: "CSV",
    name: `${stem}-${name}.csv`,
    type: "text/csv;charset=utf-8",
    text,
  });
  const { slutsky, system, also = [], methods = [] } = content;
  const alsoCsv = (one: SealedAlso) => {
    if (one.kind === "system") return covarianceCsv(one.finding);
    return alsoTables(one).map(tableCsv).join("\n");
  };
  return [
    csv("Matrix, with standard errors", "matrix", tableCsv(slutskyTable(slutsky, slutsky.form))),
    csv("Coefficients, with full covariance", "coefficients", covarianceCsv(system)),
    ...also.map((one, i) => {
      const place = `also-${i + 1}-${one.kind}`;
      if (one.kind === "text") return markdownFile(one, `${stem}-${place}.md`);
      return csv(`${one.name}, ${one.kind}`, place, alsoCsv(one));
    }),
    ...methods.flatMap((one, i) => methodsFiles(one, `${stem}-methods-${i + 1}`)),
    { label: "Tables", format: "LaTeX", name: `${stem}.tex`, type: "application/x-tex", text: tablesLatex(content) },
    {
      label: "Specification",
      format: "YAML",
      name: `${stem}.yaml`,
      type: "application/yaml",
      text: specificationYaml(content),
    },
    {
      label: "Everything sealed",
      format: "JSON",
      name: `${stem}.json`,
      type: "application/json",
      text: canonicalJson(content),
    },
  ];
}
