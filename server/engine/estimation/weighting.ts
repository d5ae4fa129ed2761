import { Refusal } from "../refusal.ts";
import { type Columns, crossProduct, pickColumns, zeros } from "./columns.ts";
import { triangularFactor } from "./householder.ts";
import { invertUpper } from "./triangle.ts";

/** Σ̂ of the equations estimated, as everything else wants it. */
export interface ResidualCovariance {
  /** V upper triangular with V V' = Σ̂⁻¹. */
  readonly weight: Columns;
  readonly logDeterminant: number;
}

/** A residual whose part orthogonal to the other equations' is below this, relative to itself, makes Σ̂ singular. */
const SINGULAR = 1e-9;

/**
 * Σ̂ = E'E/T of the equations named, through the triangular factor of E rather than E'E itself.
 *
 * Errors: a residual covariance that is singular (an equation fitted exactly, or one that follows from
 * the others), with the equation named.
 */
export function residualCovariance(
  residuals: Columns,
  rows: number,
  equations: readonly number[],
  labels: readonly string[],
): ResidualCovariance {
  const chosen = pickColumns(residuals, equations);
  const triangle = triangularFactor(chosen);
  let logDeterminant = -equations.length * Math.log(rows);
  for (let j = 0; j < equations.length; j++) {
    const pivot = j < triangle.rows ? triangle.values[j * triangle.rows + j] : 0;
    const length = Math.sqrt(sumOfSquares(triangle, j));
    if (!(pivot > SINGULAR * length)) {
      throw new Refusal(
        `The residual covariance is singular: the residuals of ${labels[equations[j]]} are ${length === 0 ? "all zero" : "a linear combination of those of the other equations"} (${rows} rows, ${equations.length} equations).`,
      );
    }
    logDeterminant += 2 * Math.log(pivot);
  }
  const weight = invertUpper(triangle);
  for (let k = 0; k < weight.values.length; k++) weight.values[k] *= Math.sqrt(rows);
  return { weight, logDeterminant };
}

/**
 * V with V V' = I + ιι' (g × g): the sum of squares of g equations so weighted is that of all g + 1
 * equations of a system that adds up, whichever was dropped.
 */
export function equalWeights(equations: number, addsUp: boolean): Columns {
  const weight = zeros(equations, equations);
  const shift = addsUp ? (Math.sqrt(1 + equations) - 1) / equations : 0;
  for (let i = 0; i < equations; i++) {
    for (let j = 0; j < equations; j++) weight.values[j * equations + i] = (i === j ? 1 : 0) + shift;
  }
  return weight;
}

/** E'E/T of all equations, rows of numbers. */
export function covarianceOf(residuals: Columns, rows: number): number[][] {
  const product = crossProduct(residuals, residuals);
  return Array.from({ length: product.rows }, (_, i) =>
    Array.from({ length: product.columns }, (_, j) => product.values[j * product.rows + i] / rows),
  );
}

function sumOfSquares(triangle: Columns, column: number): number {
  let sum = 0;
  for (let i = 0; i < triangle.rows; i++) sum += triangle.values[column * triangle.rows + i] ** 2;
  return sum;
}
