/**
 * Rows as the estimators see them: base columns, terms made of them, and responses.
 *
 * A term is a pair of places in (1, columns[0], columns[1], …): [0, 0] is the constant, [0, j] base
 * column j − 1, [j, k] a product of two. The first term is the constant.
 */
export interface MomentSource {
  readonly rows: number;
  readonly columns: readonly Float64Array[];
  /** What a person calls each base column: "ln price of bread". */
  readonly columnLabels: readonly string[];
  readonly terms: readonly TermPair[];
  readonly responses: readonly Float64Array[];
  readonly responseLabels: readonly string[];
  /** Scaled to sum to T; absent for equal weights. */
  readonly weights?: Float64Array;
}

export type TermPair = readonly [left: number, right: number];

/** The pair with its smaller place first. */
export function ordered(left: number, right: number): TermPair {
  return left <= right ? [left, right] : [right, left];
}
