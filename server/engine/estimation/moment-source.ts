import type { TermCombination } from "../../../shared/systems/moment-form.ts";

/**
 * Rows as the estimators see them: base columns, terms made of them, and responses.
 *
 * A term is a pair of places in (1, columns[0], columns[1], …): [0, 0] is the constant, [0, j] base
 * column j − 1, [j, k] a product of two, [j, k, l] one of three. The first term is the constant.
 */
export interface MomentSource {
  readonly rows: number;
  /** Row of the data for each row, the later of two where columns are changes; absent where they are the data's own. */
  readonly dataRows?: Int32Array;
  readonly columns: readonly Float64Array[];
  /**
   * Columns are whitened by those before them of the same group only, so that a product of columns of two
   * groups becomes one of whitened columns of those groups. Absent: one group.
   */
  readonly groups?: readonly number[];
  /** What a person calls each base column: "ln price of bread". */
  readonly columnLabels: readonly string[];
  readonly terms: readonly TermPair[];
  /** Terms whose moments follow from those of others. */
  readonly combinations?: readonly TermCombination[];
  readonly responses: readonly Float64Array[];
  readonly responseLabels: readonly string[];
  /** Scaled to sum to T; absent for equal weights. */
  readonly weights?: Float64Array;
}

/** Places in ascending order; more than two only where the product is of more columns than two. */
export type TermPair = readonly [left: number, right: number, ...more: number[]];

/** The pair with its smaller place first. */
export function ordered(left: number, right: number): TermPair {
  return left <= right ? [left, right] : [right, left];
}

/** The term that is the product of these places; zeros are the constant. */
export function termOf(places: readonly number[]): TermPair {
  const factors = places.filter((place) => place !== 0).sort((one, two) => one - two);
  while (factors.length < 2) factors.unshift(0);
  const [left, right, ...more] = factors;
  return [left, right, ...more];
}
