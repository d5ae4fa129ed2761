import { type Columns, columnOf, zeros } from "../columns.ts";
import { reduceToTriangle } from "../householder.ts";

/** Rows reduced at a time: few enough to stay in the cache, many beside the columns. */
const BLOCK_ROWS = 512;

/** Numbers by row: a regressor, with what a person calls it. */
export interface Regressor {
  readonly label: string;
  readonly values: Float64Array;
}

/**
 * R of [√h, √h·X, √h·y] = QR, columns + 2 wide: the constant first, the regressors, then the response. Householder
 * reflections of the rows themselves, a block at a time on top of the triangle so far, so that no digits are lost to
 * squares however collinear the regressors.
 */
export function columnFactor(
  regressors: readonly Regressor[],
  response: Float64Array,
  weights: Float64Array | undefined,
): Columns {
  const inputs = [...regressors.map(({ values }) => values), response];
  const width = inputs.length + 1;
  const stacked = zeros(width + BLOCK_ROWS, width);
  for (let from = 0; from < response.length; from += BLOCK_ROWS) {
    const rows = Math.min(BLOCK_ROWS, response.length - from);
    for (let column = 0; column < width; column++) {
      const target = columnOf(stacked, column).subarray(width);
      for (let t = 0; t < rows; t++) {
        const root = weights === undefined ? 1 : Math.sqrt(weights[from + t]);
        target[t] = column === 0 ? root : root * inputs[column - 1][from + t];
      }
      target.fill(0, rows);
    }
    reduceToTriangle(stacked);
  }
  const triangle = zeros(width, width);
  for (let j = 0; j < width; j++) triangle.values.set(columnOf(stacked, j).subarray(0, j + 1), j * width);
  return triangle;
}

/** R of the constant and the regressors alone: without the response that stands last. */
export function ofRegressors(triangle: Columns): Columns {
  const size = triangle.columns - 1;
  const upper = zeros(size, size);
  for (let j = 0; j < size; j++) upper.values.set(columnOf(triangle, j).subarray(0, size), j * size);
  return upper;
}

/** A column whose part orthogonal to those before it is below this, relative to its deviations, is dependent on them. */
const DEPENDENT = 1e-10;
/** Deviations below this, relative to the mean, are rounding: the column is constant. */
const CONSTANT = 1e-13;

/** The first regressor that is constant or an exact combination of those before it, by its place. */
export function dependentRegressor(triangle: Columns): { place: number; constant: boolean } | undefined {
  for (let j = 1; j < triangle.columns - 1; j++) {
    const column = columnOf(triangle, j);
    let squares = 0;
    for (let i = 1; i <= j; i++) squares += column[i] * column[i];
    const deviations = Math.sqrt(squares);
    const constant = deviations <= CONSTANT * Math.abs(column[0]);
    if (constant || !(column[j] > DEPENDENT * deviations)) return { place: j - 1, constant };
  }
  return undefined;
}
