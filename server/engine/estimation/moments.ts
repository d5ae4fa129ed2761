import { type Poll, polling, type RunControl } from "../run.ts";
import { type Columns, columnOf, multiply, zeros } from "./columns.ts";
import { whiteningOf } from "./find-whitening.ts";
import { type MomentSource, ordered, type TermPair, termOf } from "./moment-source.ts";
import { reflectedFactor, summedFactor } from "./row-factors.ts";
import type { DependentColumn, Whitening } from "./whitening.ts";

/**
 * All that estimation needs of the rows: a factor [Z W] of r ≤ |Z| + n rows with
 * [Z W]'[Z W] = Σ_t h_t [Z_t W_t]'[Z_t W_t]. Plain data but for `local`: it can be stored, and sent between threads.
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
  /** Where the form's terms move with θ: moments of any θ. These here are then those of the form estimated first. */
  readonly local?: LocalMoments;
}

/** Moments of a form whose terms move with θ, at any θ: each costs a pass over the rows. */
export interface LocalMoments {
  /** Those of the form without such terms, for the same rows and responses. */
  readonly nearby: Moments;
  /** One structured pass: the second moments of (Z(θ), W). Those of the θ asked for last are kept. */
  at(theta: readonly number[], control: RunControl): Moments;
  /** θ of moments that are kept, where there are any within 1e-8 of `theta`. */
  kept(theta: readonly number[]): readonly number[] | undefined;
  /** A light pass: a factor of the residuals of every equation, n × n. */
  residuals(theta: readonly number[], control: RunControl): Columns;
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
  const plan = planReduction(source, control);
  const poll = polling(control, "forming moments");
  const few = source.rows * plan.whitened.length ** 2 <= REFLECTED_WORK;
  const reduce = (reduction ?? (few ? "reflected" : "summed")) === "reflected" ? reflectedFactor : summedFactor;
  return momentsOfFactor(source, key, plan, reduce(source, plan.whitening, plan.whitened, control), poll);
}

/** How the rows of a source are reduced: one whitening serves every subset of the rows, and every weighting of them. */
export interface ReductionPlan {
  readonly whitening: Whitening;
  readonly dependent: readonly DependentColumn[];
  /** Whitened terms, then the responses as terms [0, place]. */
  readonly whitened: readonly TermPair[];
}

export function planReduction(source: MomentSource, control: RunControl): ReductionPlan {
  const responses: TermPair[] = source.responses.map((_, i) => [0, source.columns.length + 1 + i]);
  const combined = new Set(source.combinations?.map(({ term }) => term));
  const terms = source.terms.filter((_, term) => !combined.has(term));
  return {
    ...whiteningOf(source, control),
    whitened: [...closure({ ...source, terms }, polling(control, "forming terms")), ...responses],
  };
}

/** The moments whose factor in the whitened columns of a plan is given (r × columns of the plan). */
export function momentsOfFactor(
  source: MomentSource,
  key: string,
  { whitening, dependent, whitened }: ReductionPlan,
  factor: Columns,
  poll?: Poll,
): Moments {
  const terms = whitened.slice(0, whitened.length - source.responses.length);
  const parts = splitColumns(factor, terms.length);
  return {
    key,
    rows: source.rows,
    weighted: source.weights !== undefined,
    responseLabels: source.responseLabels,
    terms: multiply(parts.left, combine(termMap(source.terms, terms, whitening, poll), source), poll),
    responses: shiftBack(parts.right, columnOf(parts.left, 0), whitening.shift.subarray(source.columns.length)),
    dependent,
  };
}

/** Every whitened term that a term of the list is made of; the constant first, products of three after those of two. */
export function closure({ terms, groups }: Pick<MomentSource, "terms" | "groups">, poll: Poll = () => {}): TermPair[] {
  const found = new Map<string, TermPair>();
  for (const term of terms) {
    poll();
    for (const product of productsOf(term, (place) => placesBelow(place, groups))) {
      found.set(product.join(), product);
    }
  }
  return [...found.values()].sort(
    (one, two) => one.length - two.length || one[1] - two[1] || one[0] - two[0] || (one[2] ?? 0) - (two[2] ?? 0),
  );
}

/** The place itself, those of its group before it that whiten it, and the constant. */
function placesBelow(place: number, groups: readonly number[] | undefined): number[] {
  const all = Array.from({ length: place + 1 }, (_, at) => at);
  return groups === undefined ? all : all.filter((at) => at === 0 || groups[at - 1] === groups[place - 1]);
}

function productsOf(term: TermPair, below: (place: number) => number[]): TermPair[] {
  let products: number[][] = [[]];
  for (const place of term) products = products.flatMap((product) => below(place).map((at) => [...product, at]));
  return products.map(termOf);
}

/** T', |Z̃| × |Z|: b_j b_k = Σ_a Σ_b F_aj F_bk u_a u_b with u₀ = 1, F_0j = shift_j and F_aj = R_aj. */
export function termMap(
  terms: readonly TermPair[],
  whitened: readonly TermPair[],
  { shift, triangle }: Whitening,
  poll: Poll = () => {},
): Columns {
  const place = new Map(whitened.map((term, at) => [term.join(), at]));
  const entry = (a: number, j: number): number => {
    if (j === 0) return a === 0 ? 1 : 0;
    return a === 0 ? shift[j - 1] : triangle.values[(j - 1) * triangle.rows + a - 1];
  };
  const map = zeros(whitened.length, terms.length);
  terms.forEach((factors, term) => {
    poll();
    const column = columnOf(map, term);
    const [j, k] = factors;
    if (factors.length > 2) {
      spread(factors, [], 1, column);
      return;
    }
    for (let a = 0; a <= j; a++) {
      for (let b = 0; b <= k; b++) {
        const at = place.get(ordered(a, b).join());
        // Columns of another group take no part, and those of combinations none at all.
        if (at !== undefined) column[at] += entry(a, j) * entry(b, k);
      }
    }
  });
  return map;

  function spread(rest: readonly number[], chosen: readonly number[], weight: number, column: Float64Array): void {
    const [first, ...others] = rest;
    if (first === undefined) {
      column[place.get(termOf(chosen).join())!] += weight;
      return;
    }
    for (let a = 0; a <= first; a++) {
      const factor = entry(a, first);
      if (factor !== 0) spread(others, [...chosen, a], weight * factor, column);
    }
  }
}

/** Puts the columns of terms that are combinations of others in their places. */
function combine(map: Columns, { combinations = [] }: Pick<MomentSource, "combinations">): Columns {
  for (const { term, of } of combinations) {
    const column = columnOf(map, term).fill(0);
    for (const [other, weight] of of) {
      const from = columnOf(map, other);
      for (let r = 0; r < column.length; r++) column[r] += weight * from[r];
    }
  }
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
