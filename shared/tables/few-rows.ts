import type { SystemFinding } from "../schemas/system.ts";
import { printCount } from "./numbers.ts";
import { countedRows } from "./phrases.ts";

/** Rows for each coefficient of an equation below which a note says that they are few: common practice. */
const FEW_ROWS_EACH = 5;

type Told = Pick<SystemFinding, "rows" | "freeCoefficients" | "fitted" | "zeros">;

/**
 * Said where T < 5 k/n, k free coefficients of the system in n equations. That asymptotic tests reject too often is
 * shown for homogeneity (Laitinen 1978, Economics Letters 1), and no more is claimed of the rest than that it may be so.
 */
export function fewRowsNotes({ rows, freeCoefficients, fitted, zeros }: Told): string[] {
  const equations = zeros === undefined ? fitted.goods.length - 1 : fitted.goods.length;
  if (rows * equations >= FEW_ROWS_EACH * freeCoefficients) return [];
  const each = equations === 1 ? "the equation" : "an equation";
  return [
    `${countedRows(rows)} for ${printCount(freeCoefficients)} free coefficients in ${printCount(equations)} ${equations === 1 ? "equation" : "equations"}: fewer than ${FEW_ROWS_EACH} for each coefficient of ${each}. Standard errors and tests that rest on many rows may be too favourable; for tests of homogeneity this is known (Laitinen 1978).`,
  ];
}
