import type { Matrix } from "../numerics/matrix.ts";
import type { Point, SlopeDerivatives, Slopes } from "../systems/demand-system.ts";
import { type FittedCoefficients, SYSTEMS, systemOf } from "../systems/index.ts";
import { evaluateAt } from "./evaluation.ts";
import { type IndexResponse, withIndexWeights } from "./linear-index.ts";
import { differencesAtShares } from "./observed-shares.ts";
import { slutskyDerivatives, slutskyMatrix } from "./slutsky-matrix.ts";

/**
 * What elasticities are quotients of: shares w_i, their slopes μ_i in ln x and μ_ij in ln p_j, and the
 * compensated responses k_ij; at one point, or summed over rows.
 */
export interface Responses {
  /** w_i, n. */
  readonly shares: number[];
  /** μ_i, n. */
  readonly total: number[];
  /** μ_ij, n × n. */
  readonly prices: Matrix;
  /** k_ij, n × n. */
  readonly compensated: Matrix;
}

/** Derivatives of all of `Responses` in θ (k). */
export interface ResponseGradients {
  readonly shares: Matrix;
  readonly total: Matrix;
  readonly prices: number[][][];
  readonly compensated: number[][][];
}

export interface ResponseOptions {
  /** Shares to stand in the formulas instead of the model's predictions: observed ones, known without error (n). */
  readonly observed?: readonly number[];
  /** Of the linear approximate system; held unless said otherwise. */
  readonly index?: IndexResponse;
}

/** The slopes at a point that responses are formed from, with their derivatives in θ. */
export function slopesAt(
  fitted: FittedCoefficients,
  point: Point,
  options: ResponseOptions = {},
): { slopes: Slopes; derivatives: SlopeDerivatives } {
  const { slopes: held, derivatives: ofHeld } = evaluateAt(fitted, point);
  const at = chosen(fitted.form, { slopes: held, derivatives: ofHeld }, point.prices.map(Math.log), options);
  return { slopes: at.slopes, derivatives: at.derivatives as SlopeDerivatives };
}

/** Responses at a point with their derivatives in θ. */
export function responsesAt(
  fitted: FittedCoefficients,
  point: Point,
  options: ResponseOptions = {},
): { responses: Responses; gradients: ResponseGradients } {
  const { slopes, derivatives } = slopesAt(fitted, point, options);
  return {
    responses: { ...slopes, compensated: slutskyMatrix(slopes) },
    gradients: { ...derivatives, compensated: slutskyDerivatives(slopes, derivatives) },
  };
}

/** The same without derivatives. */
export function responsesValuesAt(fitted: FittedCoefficients, point: Point, options: ResponseOptions = {}): Responses {
  const { system, size } = systemOf(fitted);
  const held = system.slopes(fitted.theta, size, point);
  return responsesFrom(fitted.form, held, point.prices.map(Math.log), options);
}

/** The same without derivatives, from slopes already evaluated at the point's log prices. */
export function responsesFrom(
  form: FittedCoefficients["form"],
  held: Slopes,
  logPrices: readonly number[],
  options: ResponseOptions = {},
): Responses {
  const { slopes } = chosen(form, { slopes: held }, logPrices, options);
  return { ...slopes, compensated: slutskyMatrix(slopes) };
}

function chosen(
  form: FittedCoefficients["form"],
  held: { slopes: Slopes; derivatives?: SlopeDerivatives },
  logPrices: readonly number[],
  { observed, index = "held" }: ResponseOptions,
) {
  if (observed !== undefined && SYSTEMS[form].kind === "differences") return differencesAtShares(held, observed);
  const adjusted = form === "la-aids" ? withIndexWeights(held, index, logPrices, observed) : held;
  if (observed === undefined) return adjusted;
  const { slopes, derivatives } = adjusted;
  return {
    slopes: { ...slopes, shares: [...observed] },
    ...(derivatives && {
      derivatives: { ...derivatives, shares: derivatives.shares.map((gradient) => gradient.map(() => 0)) },
    }),
  };
}
