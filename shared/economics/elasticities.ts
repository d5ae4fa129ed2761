import { type Matrix, standardError } from "../numerics/matrix.ts";
import type { Point } from "../systems/demand-system.ts";
import type { FittedCoefficients } from "../systems/index.ts";
import { combined } from "./evaluation.ts";
import { type ResponseGradients, type ResponseOptions, type Responses, responsesAt, slopesAt } from "./responses.ts";

/** Elasticities, and the shares that stand in them. */
export interface ElasticityValues {
  readonly shares: number[];
  /** η_i = 1 + μ_i/w_i, n. */
  readonly expenditure: number[];
  /** ε_ij = μ_ij/w_i − δ_ij (Marshall), n × n. */
  readonly uncompensated: Matrix;
  /** ε*_ij = ε_ij + η_i w_j = k_ij/w_i (Hicks), n × n. */
  readonly compensated: Matrix;
}

/** Elasticities with standard errors by the exact-derivative delta method. */
export interface Elasticities extends ElasticityValues {
  readonly expenditureErrors: number[];
  readonly uncompensatedErrors: Matrix;
  readonly compensatedErrors: Matrix;
}

/**
 * Expenditure, uncompensated and compensated elasticities at (p, x, z). The shares in them are the predicted
 * ones unless observed ones are given.
 *
 * Error: a share of exactly zero, by which nothing can be divided.
 */
export function elasticitiesAt(fitted: FittedCoefficients, point: Point, options: ResponseOptions = {}): Elasticities {
  const { responses, gradients } = responsesAt(fitted, point, options);
  nonZeroShares(responses.shares, fitted.goods);
  return elasticitiesOf(responses, gradients, fitted.covariance);
}

/** Expenditure elasticities alone, with standard errors. Error: as `elasticitiesAt`. */
export function expenditureElasticitiesAt(
  fitted: FittedCoefficients,
  point: Point,
): Pick<Elasticities, "expenditure" | "expenditureErrors"> {
  const { slopes, derivatives } = slopesAt(fitted, point);
  const shares = nonZeroShares(slopes.shares, fitted.goods);
  return {
    expenditure: shares.map((share, i) => 1 + slopes.total[i] / share),
    expenditureErrors: expenditureErrors(slopes, derivatives, fitted.covariance),
  };
}

/** The elasticities alone. */
export function elasticityValues({ shares, total, prices, compensated }: Responses): ElasticityValues {
  return {
    shares,
    expenditure: shares.map((share, i) => 1 + total[i] / share),
    uncompensated: prices.map((row, i) => row.map((slope, j) => slope / shares[i] - (i === j ? 1 : 0))),
    compensated: compensated.map((row, i) => row.map((entry) => entry / shares[i])),
  };
}

/**
 * Elasticities as quotients of responses, with √(g'V g) from the responses' derivatives. Of many goods that takes
 * seconds: `poll` is called between rows, and may throw.
 */
export function elasticitiesOf(
  responses: Responses,
  gradients: ResponseGradients,
  covariance: FittedCoefficients["covariance"],
  poll: () => void = () => {},
): Elasticities {
  const { shares, prices, compensated } = responses;
  const errorOf = (gradient: readonly number[]) => standardError(covariance, gradient);
  const quotientErrors = (entries: Matrix, of: number[][][]) =>
    entries.map((row, i) => {
      poll();
      return row.map((entry, j) => errorOf(ratioGradient(entry, of[i][j], shares[i], gradients.shares[i])));
    });
  return {
    ...elasticityValues(responses),
    expenditureErrors: expenditureErrors(responses, gradients, covariance),
    uncompensatedErrors: quotientErrors(prices, gradients.prices),
    compensatedErrors: quotientErrors(compensated, gradients.compensated),
  };
}

function expenditureErrors(
  { shares, total }: Pick<Responses, "shares" | "total">,
  gradients: Pick<ResponseGradients, "shares" | "total">,
  covariance: FittedCoefficients["covariance"],
): number[] {
  return shares.map((share, i) =>
    standardError(covariance, ratioGradient(total[i], gradients.total[i], share, gradients.shares[i])),
  );
}

/** Derivatives in θ (k) of expenditure (n × k), uncompensated and compensated elasticities (n × n × k). */
export function elasticityGradients({ shares, total, prices, compensated }: Responses, gradients: ResponseGradients) {
  const byPrice = (entries: Matrix, of: number[][][]) =>
    entries.map((row, i) => row.map((entry, j) => ratioGradient(entry, of[i][j], shares[i], gradients.shares[i])));
  return {
    expenditure: shares.map((share, i) => ratioGradient(total[i], gradients.total[i], share, gradients.shares[i])),
    uncompensated: byPrice(prices, gradients.prices),
    compensated: byPrice(compensated, gradients.compensated),
  };
}

/** ∂(a/w)/∂θ = ∂a/w − a ∂w/w². */
function ratioGradient(
  value: number,
  gradient: readonly number[],
  share: number,
  shareGradient: readonly number[],
): number[] {
  return combined([1 / share, gradient], [-value / share ** 2, shareGradient]);
}

/** ∂ε*_ij/∂θ from k_ij, ∂k_ij/∂θ, w_i and ∂w_i/∂θ. */
export function compensatedGradient(
  entry: number,
  gradient: readonly number[],
  share: number,
  shareGradient: readonly number[],
): number[] {
  return ratioGradient(entry, gradient, share, shareGradient);
}

/** The shares, refused where one is exactly zero. */
export function nonZeroShares(shares: number[], goods: readonly string[]): number[] {
  const zero = shares.indexOf(0);
  if (zero >= 0)
    throw new RangeError(`the predicted share of ${goods[zero]} is 0: it has no elasticities at this point`);
  return shares;
}
