import type { CoefficientForm } from "./coefficient-form.ts";
import { type Columns, columnOf, zeros } from "./columns.ts";
import type { Moments } from "./moments.ts";

/**
 * The factor of the residuals of every equation, E = W − Z C(φ)', r × n: E'E = Σ_t h_t e_t e_t'.
 * It costs the same for a thousand rows as for a hundred million.
 */
export function residualFactor(moments: Moments, form: CoefficientForm, free: readonly number[]): Columns {
  const { terms, responses } = moments;
  const coefficients = form.coefficients(free);
  const residuals: Columns = { ...responses, values: responses.values.slice() };
  for (let i = 0; i < responses.columns; i++) {
    const target = columnOf(residuals, i);
    for (let term = 0; term < terms.columns; term++) subtractMultiple(target, coefficients[i][term], terms, term);
  }
  return residuals;
}

/** ∂E/∂φ of the equations named, stacked one under another: (r·g) × F. */
export function residualJacobian(
  moments: Moments,
  form: CoefficientForm,
  free: readonly number[],
  equations: readonly number[],
): Columns {
  const { terms } = moments;
  const height = terms.rows;
  const placeOf = new Map(equations.map((equation, place) => [equation, place]));
  const jacobian = zeros(height * equations.length, form.free);
  form.derivatives(free).forEach((entries, f) => {
    const column = columnOf(jacobian, f);
    for (const [equation, term, value] of entries) {
      const place = placeOf.get(equation);
      if (place === undefined) continue;
      subtractMultiple(column.subarray(place * height, (place + 1) * height), value, terms, term);
    }
  });
  return jacobian;
}

function subtractMultiple(target: Float64Array, factor: number, matrix: Columns, column: number): void {
  if (factor === 0) return;
  const offset = column * matrix.rows;
  for (let r = 0; r < target.length; r++) target[r] -= factor * matrix.values[offset + r];
}

/**
 * Every r × g block of the stacked columns times V (g × g): residuals and derivatives in the metric in
 * which their sum of squares is weighted by V V'.
 */
export function weightBlocks(stacked: Columns, height: number, weight: Columns): Columns {
  const result = zeros(stacked.rows, stacked.columns);
  const sources = Array.from({ length: weight.rows }, (_, j) => sourcesOf(weight, j));
  for (let column = 0; column < stacked.columns; column++) {
    const base = column * stacked.rows;
    sources.forEach(({ places, factors }, j) => {
      for (let k = 0; k < places.length; k += 4) {
        addFour(result.values, base + j * height, stacked.values, base, height, places, factors, k);
      }
    });
  }
  return result;
}

/** The equations that column j of V takes in, and with what factor; zeros fill up to a multiple of four. */
function sourcesOf({ rows, values }: Columns, j: number): { places: number[]; factors: number[] } {
  const places = Array.from({ length: rows }, (_, i) => i).filter((i) => values[j * rows + i] !== 0);
  const factors = places.map((i) => values[j * rows + i]);
  while (places.length % 4 !== 0) {
    places.push(places[0]);
    factors.push(0);
  }
  return { places, factors };
}

/** Four blocks at a time: the target is read and written a quarter as often. */
function addFour(
  result: Float64Array,
  target: number,
  from: Float64Array,
  base: number,
  height: number,
  places: readonly number[],
  factors: readonly number[],
  k: number,
): void {
  const s0 = base + places[k] * height;
  const s1 = base + places[k + 1] * height;
  const s2 = base + places[k + 2] * height;
  const s3 = base + places[k + 3] * height;
  const f0 = factors[k];
  const f1 = factors[k + 1];
  const f2 = factors[k + 2];
  const f3 = factors[k + 3];
  for (let r = 0; r < height; r++) {
    result[target + r] += f0 * from[s0 + r] + f1 * from[s1 + r] + f2 * from[s2 + r] + f3 * from[s3 + r];
  }
}

/** A matrix of g columns of r as one column of r·g: the residuals beside their derivatives. */
export function asOneColumn(matrix: Columns): Columns {
  return { rows: matrix.rows * matrix.columns, columns: 1, values: matrix.values };
}
