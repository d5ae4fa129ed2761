import { columnOf, dot, pickColumns } from "./columns.ts";
import { LOG_TWO_PI_E } from "./criterion.ts";
import type { Estimation } from "./estimation.ts";
import type { Solution } from "./minimise.ts";
import { asOneColumn, weightBlocks } from "./residuals.ts";
import { centredResponses } from "./responses.ts";
import { residualCovariance } from "./weighting.ts";

export interface FitMeasures {
  readonly logLikelihood: number;
  readonly aic: number;
  readonly bic: number;
  /** By equation, all of them. */
  readonly rSquared: number[];
  readonly systemRSquared: number;
}

/**
 * Log-likelihood −(T/2)[g(1 + ln 2π) + ln|Σ̂|] of the g equations estimated; AIC −2 lnL + 2F and BIC
 * −2 lnL + F ln T with F the free coefficients; R² by equation, 1 − e'e/(w − w̄)'(w − w̄); and McElroy's
 * (1977, Journal of Econometrics 6) R² of the system, 1 − gT/Σ_t (w_t − w̄)'Σ̂⁻¹(w_t − w̄).
 */
export function fitMeasures(estimation: Estimation, solution: Solution): FitMeasures {
  const { moments, equations, form } = estimation;
  const { rows } = moments;
  const { weight, logDeterminant } = residualCovariance(solution.residuals, rows, equations, moments.responseLabels);
  const logLikelihood = -(rows / 2) * (equations.length * LOG_TWO_PI_E + logDeterminant);
  const centred = centredResponses(estimation);
  const spread = weightBlocks(asOneColumn(pickColumns(centred, equations)), centred.rows, weight);
  return {
    logLikelihood,
    aic: -2 * logLikelihood + 2 * form.free,
    bic: -2 * logLikelihood + form.free * Math.log(rows),
    rSquared: Array.from({ length: centred.columns }, (_, i) => {
      const residual = columnOf(solution.residuals, i);
      const total = columnOf(centred, i);
      return 1 - dot(residual, residual) / dot(total, total);
    }),
    systemRSquared: 1 - (equations.length * rows) / dot(spread.values, spread.values),
  };
}
