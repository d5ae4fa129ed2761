import type { Poll } from "../run.ts";
import type { Entry } from "./coefficient-form.ts";
import { type Columns, columnOf, crossProduct, multiply, transposed, zeros } from "./columns.ts";

/**
 * ∂C/∂φ of the equations estimated without its noughts: those of φ_f stand from `starts[f]` to before
 * `starts[f + 1]`, in the order of the terms, at place i·|Z| + t for term t of equation i.
 */
export interface SparseDerivatives {
  readonly equations: number;
  readonly terms: number;
  readonly starts: Int32Array;
  readonly places: Int32Array;
  readonly values: Float64Array;
}

export function sparseDerivatives(
  byFree: readonly (readonly Entry[])[],
  equations: readonly number[],
  terms: number,
): SparseDerivatives {
  const g = equations.length;
  const placeOf = new Map(equations.map((equation, place) => [equation, place]));
  const most = byFree.reduce((sum, entries) => sum + entries.length, 0);
  const starts = new Int32Array(byFree.length + 1);
  const places = new Int32Array(most);
  const values = new Float64Array(most);
  const sums = new Float64Array(terms * g);
  let end = 0;
  byFree.forEach((entries, f) => {
    for (const [equation, term, value] of entries) {
      const place = placeOf.get(equation);
      if (place === undefined || value === 0) continue;
      const at = term * g + place;
      if (sums[at] === 0) places[end++] = at;
      sums[at] += value;
    }
    places.subarray(starts[f], end).sort();
    for (let k = starts[f]; k < end; k++) {
      const at = places[k];
      // A place whose entries cancelled on the way stands here twice, and counts once.
      values[k] = sums[at];
      sums[at] = 0;
      places[k] = (at % g) * terms + Math.floor(at / g);
    }
    starts[f + 1] = end;
  });
  return { equations: g, terms, starts, places, values };
}

/** Z'Ê, |Z| × g: what gradient and curvature of the likelihood need of the residuals. */
export function residualProducts(weighted: Columns, terms: Columns): Columns {
  return crossProduct(terms, weighted);
}

/** Ĵ'ê, F. */
export function gradientOf(derivatives: SparseDerivatives, residuals: Columns, weight: Columns): Float64Array {
  const { starts, places, values } = derivatives;
  const back = multiply(residuals, transposed(weight)).values;
  return Float64Array.from({ length: starts.length - 1 }, (_, f) => {
    let sum = 0;
    for (let at = starts[f]; at < starts[f + 1]; at++) sum -= values[at] * back[places[at]];
    return sum;
  });
}

/**
 * B_ab,f = ê_a'Ĵ_f,b + ê_b'Ĵ_f,a of every pair a ≤ b, F × ½g(g+1); those of a < b times √2, as each stands for
 * two entries of a symmetric matrix.
 */
export function covarianceDerivatives(
  derivatives: SparseDerivatives,
  residuals: Columns,
  weight: Columns,
  poll: Poll,
): Columns {
  const { equations: g, terms, starts, places, values } = derivatives;
  const free = starts.length - 1;
  const result = zeros(free, (g * (g + 1)) / 2);
  const unweighted = zeros(g, g);
  for (let f = 0; f < free; f++) {
    poll();
    unweighted.values.fill(0);
    for (let at = starts[f]; at < starts[f + 1]; at++) {
      const term = places[at] % terms;
      const column = ((places[at] - term) / terms) * g;
      for (let a = 0; a < g; a++) unweighted.values[column + a] -= values[at] * residuals.values[a * terms + term];
    }
    const cross = multiply(unweighted, weight).values;
    let pair = 0;
    for (let a = 0; a < g; a++) {
      for (let b = a; b < g; b++) {
        result.values[pair++ * free + f] = (cross[b * g + a] + cross[a * g + b]) * (a === b ? 1 : Math.SQRT2);
      }
    }
  }
  return result;
}

/**
 * Ĵ'Ĵ of the weighted derivatives Ĵ_f = −Σ_t (V'v_ft) ⊗ Z_t without forming them:
 * A_fh = Σ v_fit (V V')_ij (Z'Z)_ts v_hjs. `products` is Z'Z. Squares of terms instead of derivatives: where terms
 * nearly cancel in these it has fewer digits than `normalFactor`. Upper triangle only.
 */
export function normalProducts(
  derivatives: SparseDerivatives,
  products: Columns,
  weight: Columns,
  poll: Poll,
): Columns {
  const { starts, places, values } = derivatives;
  const free = starts.length - 1;
  const spread = zeros(products.rows, weight.columns);
  const spreadOf = spreader(derivatives, products, multiply(weight, transposed(weight)));
  const result = zeros(free, free);
  for (let f = 0; f < free; f++) {
    poll();
    spreadOf(f, spread.values.fill(0));
    for (let h = 0; h <= f; h++) {
      let sum = 0;
      for (let at = starts[h]; at < starts[h + 1]; at++) sum += values[at] * spread.values[places[at]];
      result.values[f * free + h] = sum;
    }
  }
  return result;
}

/** Ĵ itself: (r·g) × F, the equations' blocks one under another. */
export function weightedJacobian(derivatives: SparseDerivatives, terms: Columns, weight: Columns, poll: Poll): Columns {
  const jacobian = zeros(terms.rows * weight.columns, derivatives.starts.length - 1);
  const spreadOf = spreader(derivatives, terms, weight);
  for (let f = 0; f < jacobian.columns; f++) {
    poll();
    const column = columnOf(jacobian, f);
    spreadOf(f, column);
    for (let r = 0; r < column.length; r++) column[r] = -column[r];
  }
  return jacobian;
}

/**
 * Adds X v_f' M to noughts, its columns one under another, for X with a column a term and M with a row an equation:
 * M first for a few terms in many equations, X first for many in a few.
 */
function spreader(
  { equations: g, terms, starts, places, values }: SparseDerivatives,
  x: Columns,
  metric: Columns,
): (f: number, target: Float64Array) => void {
  const height = x.rows;
  const factors = new Float64Array(g);
  const alone = new Float64Array(g * height);
  const taken = new Uint8Array(g);
  return (f, target) => {
    const [begin, end] = [starts[f], starts[f + 1]];
    taken.fill(0);
    let runs = 0;
    for (let at = begin; at < end; at++) {
      taken[Math.floor(places[at] / terms)] = 1;
      if (at === begin || places[at] % terms !== places[at - 1] % terms) runs++;
    }
    if (runs <= taken.reduce((sum, flag) => sum + flag, 0)) {
      for (let at = begin; at < end; ) {
        const term = places[at] % terms;
        factors.fill(0);
        for (; at < end && places[at] % terms === term; at++) {
          const equation = (places[at] - term) / terms;
          for (let j = 0; j < g; j++) factors[j] += metric.values[j * g + equation] * values[at];
        }
        for (let j = 0; j < g; j++) addMultiple(target, j * height, factors[j], x.values, term * height, height);
      }
      return;
    }
    alone.fill(0);
    for (let at = begin; at < end; at++) {
      const term = places[at] % terms;
      const equation = (places[at] - term) / terms;
      addMultiple(alone, equation * height, values[at], x.values, term * height, height);
    }
    for (let i = 0; i < g; i++) {
      if (taken[i] === 0) continue;
      for (let j = 0; j < g; j++) {
        addMultiple(target, j * height, metric.values[j * g + i], alone, i * height, height);
      }
    }
  };
}

/** A stretch of `target` plus so many times one of `source`. */
function addMultiple(
  target: Float64Array,
  to: number,
  factor: number,
  source: Float64Array,
  from: number,
  length: number,
): void {
  if (factor === 0) return;
  for (let k = 0; k < length; k++) target[to + k] += factor * source[from + k];
}
