import type { SystemFinding } from "../schemas/system.ts";
import { csvLines, csvNumber, csvText } from "./csv.ts";

/** How a coefficient is named where it stands alone: "gamma, grains, dairy". */
export function coefficientName(coefficient: SystemFinding["coefficients"][number]): string {
  const { block, good, column } = coefficient;
  return [block, good, column].filter((part) => part !== undefined).join(", ");
}

/**
 * Every coefficient with its standard error and its row of the covariance matrix, k rows by k + 5 columns, in the
 * order of θ, so that anything computed from the coefficients can be computed with its error. From a bootstrap two
 * columns more, the ends of its percentile interval.
 */
export function covarianceCsv(finding: Pick<SystemFinding, "coefficients" | "fitted" | "bootstrap">): string {
  const names = finding.coefficients.map(coefficientName);
  const { bootstrap } = finding;
  const ends = bootstrap ? ["2.5 percentile", "97.5 percentile"] : [];
  const errors = ["estimate", "standard error", ...ends];
  const head = ["block", "good", "column", ...errors, ...names.map((name) => `cov: ${name}`)];
  const rows = finding.coefficients.map((coefficient, index) => [
    csvText(coefficient.block),
    csvText(coefficient.good),
    csvText(coefficient.column ?? ""),
    csvNumber(coefficient.estimate),
    csvNumber(coefficient.standardError),
    ...(bootstrap?.intervals[index] ?? []).map(csvNumber),
    ...finding.fitted.covariance[index].map(csvNumber),
  ]);
  return csvLines([head.map(csvText), ...rows]);
}
