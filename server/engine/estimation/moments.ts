import type { RunControl } from "../run.ts";
import { type Columns, columnOf, multiply, zeros } from "./columns.ts";
import { whiteningOf } from "./find-whitening.ts";
import { type MomentSource, ordered, type TermPair } from "./moment-source.ts";
import { reflectedFactor, summedFactor } from "./row-factors.ts";
import type { DependentColumn, Whitening } from "./whitening.ts";

/**
 * All that estimation needs of the rows: a factor [Z W] of r ≤ |Z| + n rows with
 * [Z W]'[Z W] = Σ_t h_t [Z_t W_t]'[Z_t W_t]. Plain data: it can be stored, and sent between threads.
 */
export interface Moments {
  /** Which terms and responses of which data: equal keys, equal moments. */
  readonly key: string;
  /** T. */
  readonly rows: number;
  readonly weighted: boolean;
  readonly responseLabels: readonly string[];
  /** r × |Z|. */
  readonly terms: Columns;
  /** r × n. */
  readonly responses: Columns;
  /** Base columns that are exact linear combinations of others, for the refusal that names them. */
  readonly dependent: readonly DependentColumn[];
}

/** Up to this many rows × columns² the rows themselves are reduced by reflections. */
const REFLECTED_WORK = 3e7;

/** How rows become a factor: both give the same to rounding. */
export type Reduction = "reflected" | "summed";

/**
 * Reads the rows and keeps their second moments.
 *
 * Base columns are whitened first and the terms formed from the whitened ones; the map T from
 * whitened terms to the terms themselves is exact, Z = Z̃ T', so that the factor of Z follows from
 * that of Z̃. Few rows are reduced to their triangular factor by reflections; many are summed in one
 * tiled pass and factored by Cholesky, which whitening makes safe.
 *
 * Errors: `Cancelled`.
 */
export function reduceRows(source: MomentSource, key: string, control: RunControl, reduction?: Reduction): Moments {
  const { whitening, dependent } = whiteningOf(source, control);
  const whitened = closure(source.terms);
  const base = source.columns.length;
  const responses: TermPair[] = source.responses.map((_, i) => [0, base + 1 + i]);
  const all = [...whitened, ...responses];
  const few = source.rows * all.length ** 2 <= REFLECTED_WORK;
  const reduce = (reduction ?? (few ? "reflected" : "summed")) === "reflected" ? reflectedFactor : summedFactor;
  const factor = reduce(source, whitening, all, control);
  const parts = splitColumns(factor, whitened.length);
  return {
    key,
    rows: source.rows,
    weighted: source.weights !== undefined,
    responseLabels: source.responseLabels,
    terms: multiply(parts.left, termMap(source.terms, whitened, whitening)),
    responses: shiftBack(parts.right, columnOf(parts.left, 0), whitening.shift.subarray(base)),
    dependent,
  };
}

/** Every whitened term that a term of the list is made of; the constant first. */
function closure(terms: readonly TermPair[]): TermPair[] {
  const found = new Map<string, TermPair>();
  for (const [left, right] of terms) {
    for (let a = left === 0 ? 0 : left; a >= 0; a--) {
      for (let b = right; b >= 0; b--) found.set(ordered(a, b).join(), ordered(a, b));
    }
  }
  return [...found.values()].sort((one, two) => one[1] - two[1] || one[0] - two[0]);
}

/** T', |Z̃| × |Z|: b_j b_k = Σ_a Σ_b F_aj F_bk u_a u_b with u₀ = 1, F_0j = shift_j and F_aj = R_aj. */
function termMap(terms: readonly TermPair[], whitened: readonly TermPair[], { shift, triangle }: Whitening): Columns {
  const place = new Map(whitened.map((term, at) => [term.join(), at]));
  const entry = (a: number, j: number): number => {
    if (j === 0) return a === 0 ? 1 : 0;
    return a === 0 ? shift[j - 1] : triangle.values[(j - 1) * triangle.rows + a - 1];
  };
  const map = zeros(whitened.length, terms.length);
  terms.forEach(([j, k], term) => {
    const column = columnOf(map, term);
    for (let a = 0; a <= j; a++) {
      for (let b = 0; b <= k; b++) column[place.get(ordered(a, b).join())!] += entry(a, j) * entry(b, k);
    }
  });
  return map;
}

function splitColumns(matrix: Columns, left: number): { left: Columns; right: Columns } {
  const cut = left * matrix.rows;
  return {
    left: { rows: matrix.rows, columns: left, values: matrix.values.slice(0, cut) },
    right: { rows: matrix.rows, columns: matrix.columns - left, values: matrix.values.slice(cut) },
  };
}

function shiftBack(responses: Columns, constant: Float64Array, shift: Float64Array): Columns {
  for (let i = 0; i < responses.columns; i++) {
    const column = columnOf(responses, i);
    for (let r = 0; r < column.length; r++) column[r] += shift[i] * constant[r];
  }
  return responses;
}
