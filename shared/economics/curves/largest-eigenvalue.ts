import type { Point } from "../../systems/demand-system.ts";
import type { FittedCoefficients } from "../../systems/index.ts";
import { TOLERANCE } from "../checks.ts";
import { slutskyEigenvalues } from "../eigenvalues.ts";
import { evaluateAt } from "../evaluation.ts";
import { createRowChecker } from "../sample.ts";
import { slutskyDerivatives, slutskyMatrix } from "../slutsky-matrix.ts";
import { type Curve, type CurveOptions, curveOf, drawnCurves } from "./curve.ts";
import { whereDefined } from "./engel.ts";

/** The largest eigenvalue of the Slutsky matrix along total expenditure. */
export interface EigenvalueCurve {
  readonly totals: number[];
  readonly eigenvalue: Curve;
  /** Stretches of the totals in which it is above nought, their ends found between points. */
  readonly breaks: { from: number; to: number }[];
  readonly draws?: number;
}

/**
 * The largest eigenvalue of ½(K + K') away from the null direction ι, at the prices and demographics of `point` and each of
 * `totals`, in share form; standard errors by the delta method with dλ = v'dK v (Magnus 1985, Econometric Theory 1).
 * Error: `RangeError` without homogeneity, where negativity is not stated.
 */
export function eigenvalueCurve(
  fitted: FittedCoefficients,
  point: Point,
  totals: readonly number[],
  options: CurveOptions,
): EigenvalueCurve {
  const kept = whereDefined(fitted, point, totals);
  const points = kept.map((total) => {
    options.poll?.();
    const { slopes, derivatives } = evaluateAt(fitted, { ...point, total });
    const byTheta = slutskyDerivatives(slopes, derivatives);
    const [{ value, standardError }] = slutskyEigenvalues(
      slutskyMatrix(slopes),
      byTheta,
      fitted.covariance,
      fitted.goods,
    );
    return { value, error: standardError };
  });
  const drawn = drawnCurves(fitted, options, (draw) => {
    const at = largestAlong(draw, point);
    const along = kept.map(at);
    return along.every(Number.isFinite) ? along : undefined;
  });
  return {
    totals: kept,
    eigenvalue: curveOf(points, options.level, drawn),
    breaks: breaksOf(
      kept,
      points.map(({ value }) => value),
      largestAlong(fitted, point),
    ),
    ...(drawn && { draws: drawn.length }),
  };
}

/** The largest eigenvalue as a function of total expenditure; NaN where the system is not defined. */
function largestAlong(fitted: FittedCoefficients, { prices, demographics }: Point): (total: number) => number {
  const checker = createRowChecker(fitted);
  const logPrices = prices.map(Math.log);
  return (total) => {
    checker.evaluate(logPrices, Math.log(total), demographics);
    return checker.isDefined() ? checker.largestEigenvalue() : Number.NaN;
  };
}

const breaks = (value: number) => value > TOLERANCE;
/** Halvings of a step: the end of a stretch to six digits of the step. */
const HALVINGS = 20;

function breaksOf(totals: readonly number[], values: readonly number[], at: (total: number) => number) {
  const stretches: { from: number; to: number }[] = [];
  let from: number | undefined;
  for (const [t, total] of totals.entries()) {
    const before = t > 0 && breaks(values[t - 1]) !== breaks(values[t]);
    const edge = before ? crossing(totals[t - 1], total, at) : total;
    if (breaks(values[t])) from ??= edge;
    else if (from !== undefined) {
      stretches.push({ from, to: edge });
      from = undefined;
    }
  }
  if (from !== undefined) stretches.push({ from, to: totals[totals.length - 1] });
  return stretches;
}

/** Where between two totals the law begins or ceases to hold. */
function crossing(low: number, high: number, at: (total: number) => number): number {
  const isBroken = breaks(at(low));
  let [left, right] = [low, high];
  for (let i = 0; i < HALVINGS; i++) {
    const middle = (left + right) / 2;
    if (breaks(at(middle)) === isBroken) left = middle;
    else right = middle;
  }
  return right;
}
