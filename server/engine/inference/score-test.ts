import { chiSquareTail } from "../../../shared/numerics/distributions.ts";
import type { ChiSquareStatistic } from "../../../shared/schemas/tests.ts";
import { pickColumns } from "../estimation/columns.ts";
import type { Estimation } from "../estimation/estimation.ts";
import { normalFactor } from "../estimation/normal-factor.ts";
import { asOneColumn, residualFactor, residualJacobian, weightBlocks } from "../estimation/residuals.ts";
import { residualCovariance } from "../estimation/weighting.ts";
import { QUIET, type RunControl } from "../run.ts";

/**
 * Rao's (1948) score test, also the Lagrange multiplier test, of a restricted fit in a wider model: g'A⁻¹g with
 * g = Ĵ'ê the score of the wide model's free coefficients at the restricted θ̃ and A = Ĵ'Ĵ their information, both
 * in the metric of the restricted Σ̃ (divisor T), terms that move with θ being those at θ̃. It is the squared length of ê projected on Ĵ.
 */
export function scoreTest(
  wide: Estimation,
  theta: readonly number[],
  restrictions: number,
  control: RunControl = QUIET,
): ChiSquareStatistic {
  const { form, equations } = wide;
  const moments = wide.moments.local?.at(theta, control) ?? wide.moments;
  const free = form.expand.places.map((place) => theta[place]);
  const residuals = residualFactor(moments, form, free);
  const { weight } = residualCovariance(residuals, moments.rows, equations, moments.responseLabels);
  const height = residuals.rows;
  const weighted = weightBlocks(asOneColumn(pickColumns(residuals, equations)), height, weight);
  const jacobian = weightBlocks(residualJacobian(moments, form, free, equations), height, weight);
  const { projected, dependent } = normalFactor(jacobian, weighted);
  if (dependent.length > 0) {
    const names = dependent.map((f) => wide.coefficientLabels[form.expand.places[f]]).slice(0, 3);
    return {
      absent: `At the restricted estimates the data do not tell ${names.join(", ")} apart from the other coefficients.`,
    };
  }
  const statistic = projected.reduce((sum, value) => sum + value * value, 0);
  return { statistic, pValue: chiSquareTail(statistic, restrictions) };
}
