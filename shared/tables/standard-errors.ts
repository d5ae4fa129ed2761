import type { SystemFinding } from "../schemas/system.ts";
import { printCount, printFixed } from "./numbers.ts";
import { countedRows } from "./phrases.ts";

/** What a sentence on standard errors needs of a finding. */
type Errors = Pick<
  SystemFinding,
  "standardErrors" | "clusters" | "bootstrap" | "effectiveRows" | "freeCoefficients" | "rows" | "tests"
>;

/** Said beside likelihood ratios where standard errors assume less. */
export const LIKELIHOOD_RATIOS_ASSUME =
  "Likelihood ratios assume independent errors of equal spread in all rows, as conventional standard errors do.";

/** What the standard errors are: "clustered by village, 24 clusters"; "bootstrap of rows, 500 replicates, seed 1". */
export function standardErrorsPhrase({ standardErrors, clusters, bootstrap }: Errors): string {
  const grouped = clusters && `by ${clusters.column}, ${printCount(clusters.count)} clusters`;
  if (standardErrors === "clustered") return `clustered ${grouped}`;
  if (standardErrors === "heteroskedastic") return "robust to heteroskedasticity";
  if (bootstrap === undefined) return standardErrors;
  const of = bootstrap.of === "blocks" ? `blocks of ${bootstrap.block} periods` : bootstrap.of;
  const drawn = grouped ? `${of} ${grouped}` : of;
  return `bootstrap of ${drawn}, ${printCount(bootstrap.replicates)} replicates, seed ${bootstrap.seed}`;
}

/** What a reader of the standard errors must know besides; nothing where they are conventional and rows weigh the same. */
export function standardErrorsNotes(finding: Errors): string[] {
  const { bootstrap, effectiveRows, rows, standardErrors, tests } = finding;
  return [
    ...(effectiveRows === undefined ? [] : [weightsSentence(rows, effectiveRows)]),
    ...fewClusters(finding),
    ...(bootstrap?.of === "residuals"
      ? ["Residuals are drawn again; prices, total expenditure and the price index are held as observed."]
      : []),
    ...failures(bootstrap),
    ...(standardErrors !== "conventional" && tests.length > 0 ? [LIKELIHOOD_RATIOS_ASSUME] : []),
  ];
}

function weightsSentence(rows: number, effectiveRows: number): string {
  return `The weights make ${countedRows(rows)} tell as much as ${printFixed(effectiveRows, 0)} of one weight.`;
}

/** Effective rows below this part of all rows are said at the head: then a few weights of enormous size decide. */
const FEW_EFFECTIVE = 0.1;

/** For the head of a finding: nothing where the weights are near enough to one another. */
export function unequalWeightsSentence({ rows, effectiveRows }: Pick<Errors, "rows" | "effectiveRows">): string[] {
  if (effectiveRows === undefined || effectiveRows >= FEW_EFFECTIVE * rows) return [];
  return [weightsSentence(rows, effectiveRows)];
}

function fewClusters({ clusters, freeCoefficients, standardErrors }: Errors): string[] {
  if (clusters === undefined || standardErrors !== "clustered" || clusters.count > freeCoefficients) return [];
  return [
    `${printCount(clusters.count)} clusters for ${printCount(freeCoefficients)} free coefficients: no more than ${printCount(clusters.count - 1)} restrictions can be tested together.`,
  ];
}

function failures(bootstrap: Errors["bootstrap"]): string[] {
  if (bootstrap?.firstFailure === undefined) return [];
  const { failed, replicates, firstFailure } = bootstrap;
  const have = failed === 1 ? "has" : "have";
  return [
    `${printCount(failed)} of ${printCount(replicates)} replicates ${have} no estimate; the first is replicate ${printCount(firstFailure.replicate)}: ${firstFailure.reason}`,
  ];
}
