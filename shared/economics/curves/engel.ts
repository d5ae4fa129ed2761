import type { Point } from "../../systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../../systems/index.ts";
import { evaluateAt } from "../evaluation.ts";
import { createRowChecker } from "../sample.ts";
import { type Curve, type CurveOptions, curveOf, drawnCurves, withError } from "./curve.ts";

/** Predicted shares along total expenditure. */
export interface EngelCurves {
  /** Of the totals asked for, those at which the system is defined. */
  readonly totals: number[];
  /** w_i(p, x, z), a curve for each good asked for. */
  readonly curves: Curve[];
  /** Draws behind the percentiles. */
  readonly draws?: number;
}

/**
 * Engel curves: w_i(p, x, z) for each of `totals` at the prices and demographics of `point`, all in units of estimation, with
 * standard errors by the delta method (∂w_i/∂θ exact). Shapes: `goods` are places among the system's n goods.
 * Where the system predicts no shares or has no utility, a total is left out.
 */
export function engelCurves(
  fitted: FittedCoefficients,
  point: Point,
  totals: readonly number[],
  goods: readonly number[],
  options: CurveOptions,
): EngelCurves {
  const kept = whereDefined(fitted, point, totals);
  const evaluated = kept.map((total) => {
    options.poll?.();
    const { slopes, derivatives } = evaluateAt(fitted, { ...point, total });
    return { shares: slopes.shares, byTheta: derivatives.shares };
  });
  const drawn = drawnCurves(fitted, options, (draw) => sharesAlong(draw, point, kept));
  return {
    totals: kept,
    curves: goods.map((i) =>
      curveOf(
        evaluated.map(({ shares, byTheta }) =>
          withError({ value: shares[i], gradient: byTheta[i] }, fitted.covariance),
        ),
        options.level,
        drawn?.map((along) => along.map((shares) => shares[i])),
      ),
    ),
    ...(drawn && { draws: drawn.length }),
  };
}

/** The totals at which the system predicts shares and has utility. */
export function whereDefined(
  fitted: FittedCoefficients,
  { prices, demographics }: Point,
  totals: readonly number[],
): number[] {
  const checker = createRowChecker(fitted);
  const logPrices = prices.map(Math.log);
  return totals.filter((total) => {
    checker.evaluate(logPrices, Math.log(total), demographics);
    return checker.isDefined();
  });
}

/** Shares at each total; undefined where the system has none at one of them. */
function sharesAlong(fitted: FittedCoefficients, { prices, demographics }: Point, totals: readonly number[]) {
  const { system, size } = systemOf(fitted);
  const evaluator = system.evaluator(fitted.theta, size);
  const logPrices = prices.map(Math.log);
  const along = totals.map((total) => {
    evaluator.at(logPrices, Math.log(total), demographics);
    return Array.from(evaluator.shares);
  });
  return along.every((shares) => shares.every(Number.isFinite)) ? along : undefined;
}
