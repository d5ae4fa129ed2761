import type { CoefficientForm } from "./coefficient-form.ts";

/** Entries below this, relative to the largest, are rounding. */
const ROUNDING = 1e-9;

/**
 * The rows below which some combination of the equations fits exactly and the likelihood has no maximum.
 *
 * A combination a'e_t = a'w_t − a'C(φ)Z_t is nought at every row where (a, a'C(φ)) solves T linear equations; it can
 * be made so while T is less than the number of directions in which (a, a'C(φ)) moves as a and φ do: one for
 * every equation, and the rank of Σ_i a_i ∂C_i/∂φ. Where coefficients belong to one equation each, that
 * rank is the coefficients of an equation; where equations share them (the committed quantities of the linear expenditure
 * system), a combination has more than any equation's own.
 */
export function rowsNeeded(form: CoefficientForm, start: readonly number[], equations: readonly number[]): number {
  // Numbers in no relation to one another stand for any combination and any coefficients.
  const combination = new Map(equations.map((equation, place) => [equation, Math.sqrt(2 + place)]));
  const free = start.map((value, f) => value + 0.1 * Math.sin(1 + f));
  const terms = form.coefficients(free)[0].length;
  const rows = form.derivatives(free).map((entries) => {
    const row = new Float64Array(terms);
    for (const [equation, term, value] of entries) row[term] += (combination.get(equation) ?? 0) * value;
    return row;
  });
  return equations.length + rankOf(rows, terms);
}

/** By elimination with complete pivoting; overwrites the rows. */
function rankOf(rows: Float64Array[], columns: number): number {
  const size = (row: Float64Array) => row.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const least = ROUNDING * Math.max(...rows.map(size));
  let rank = 0;
  while (rank < Math.min(rows.length, columns)) {
    let place = rank;
    for (let other = rank + 1; other < rows.length; other++) if (size(rows[other]) > size(rows[place])) place = other;
    const pivot = size(rows[place]);
    if (pivot <= least) break;
    [rows[rank], rows[place]] = [rows[place], rows[rank]];
    const column = rows[rank].findIndex((value) => Math.abs(value) === pivot);
    for (let below = rank + 1; below < rows.length; below++) {
      const factor = rows[below][column] / rows[rank][column];
      for (let j = 0; j < columns; j++) rows[below][j] -= factor * rows[rank][j];
      rows[below][column] = 0;
    }
    rank++;
  }
  return rank;
}
