import type { TheoryChecks } from "../../../shared/schemas/checks.ts";
import { printSize } from "../../../shared/tables/numbers.ts";

/** A sum or difference that ought to be nought: 0 when it is so within the checks' tolerance, its size when not. */
export function printSum(sum: number, tolerance: number, print: (value: number) => string): string {
  return Math.abs(sum) <= tolerance ? "0" : print(sum);
}

/** Row and column sums of an n × n matrix as printed outside its field. */
export function printedSums(
  entries: readonly (readonly number[])[],
  checks: Pick<TheoryChecks, "tolerance">,
  print: (value: number) => string = printSize,
): { rows: string[]; columns: string[] } {
  const printed = (sum: number) => printSum(sum, checks.tolerance, print);
  return {
    rows: entries.map((row) => printed(row.reduce((sum, entry) => sum + entry, 0))),
    columns: entries.map((_, j) => printed(entries.reduce((sum, row) => sum + row[j], 0))),
  };
}
