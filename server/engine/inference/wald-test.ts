import { chiSquareTail } from "../../../shared/numerics/distributions.ts";
import type { ChiSquareStatistic } from "../../../shared/schemas/tests.ts";
import { type Columns, columnOf, zeros } from "../estimation/columns.ts";
import { semidefiniteCholesky, solveUpperTransposed } from "../estimation/triangle.ts";
import type { NestedForm } from "./nested-form.ts";

/** Combinations whose correlation with the others leaves less than this of their variance are not told apart. */
const SINGULAR = 1e-11;

/**
 * Wald's (1943) test of N'(φ − origin) = 0 from the unrestricted fit: d'(N'VN)⁻¹d with d = N'(φ̂ − origin), on q
 * degrees of freedom; V (F × F) the covariance of φ̂, of whatever kind. The same for every basis N.
 */
export function waldTest(
  free: readonly number[],
  covariance: readonly (readonly number[])[],
  { origin, normals }: NestedForm,
): ChiSquareStatistic {
  const count = normals.columns;
  const columns = Array.from({ length: count }, (_, q) => columnOf(normals, q));
  const spread = columns.map((normal) =>
    covariance.map((row) => row.reduce((sum, entry, f) => sum + entry * normal[f], 0)),
  );
  const between = columns.map((normal) =>
    spread.map((image) => image.reduce((sum, entry, f) => sum + entry * normal[f], 0)),
  );
  const scale = between.map((row, q) => Math.sqrt(row[q]));
  const { factor, dependent } = semidefiniteCholesky(correlations(between, scale), SINGULAR);
  const unknown = scale.filter((error) => !(error > 0)).length;
  if (dependent.length > 0 || unknown > 0) {
    const known = count - Math.max(dependent.length, unknown);
    return {
      absent: `The covariance of the estimates has rank ${known} where the ${count} restrictions need ${count}.`,
    };
  }
  const distance = Float64Array.from(
    columns,
    (normal, q) => normal.reduce((sum, entry, f) => sum + entry * (free[f] - origin[f]), 0) / scale[q],
  );
  solveUpperTransposed(factor, distance);
  const statistic = distance.reduce((sum, value) => sum + value * value, 0);
  return { statistic, pValue: chiSquareTail(statistic, count) };
}

function correlations(covariance: readonly (readonly number[])[], scale: readonly number[]): Columns {
  const matrix = zeros(scale.length, scale.length);
  covariance.forEach((row, i) => {
    row.forEach((entry, j) => {
      matrix.values[j * scale.length + i] = entry / (scale[i] * scale[j]);
    });
  });
  return matrix;
}
