import { statesNegativity } from "../../../shared/economics/checks.ts";
import { type Curve, spaced } from "../../../shared/economics/curves/curve.ts";
import { demandCurves } from "../../../shared/economics/curves/demand.ts";
import { engelCurves } from "../../../shared/economics/curves/engel.ts";
import { eigenvalueCurve } from "../../../shared/economics/curves/largest-eigenvalue.ts";
import { capital } from "../../../shared/study/words.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { Refusal } from "../refusal.ts";
import { polling } from "../run.ts";
import type { AskedOfSystem, DrawnWith } from "./figure-asked.ts";
import { refusingRanges } from "./refusing.ts";
import { pointOf } from "./slutsky-point.ts";
import { weightedQuantiles } from "./weighted.ts";

const CURVE_POINTS = 41;
/** Curves go no further than the sample: beyond these percentiles few rows speak for them. */
const OUTERMOST = [0.01, 0.99];

type Asked = Pick<AskedOfSystem, "specification" | "system" | "data" | "control">;

/** Predicted shares from the 1st to the 99th percentile of expenditure. */
export function engelDrawn({ goods, ...asked }: AskedOfSystem): DrawnWith {
  requireShares(asked, "Engel curves");
  const { system, data } = asked;
  const { point, pointName, options, totals } = alongTotals(asked);
  const { totals: kept, curves, draws } = engelCurves(system.fitted, point, totals, goods, options);
  requirePoints(kept.length, totals.length, pointName);
  return {
    pointName,
    intervals: draws ? "percentile" : "normal",
    drawn: {
      show: "engel curves",
      totals: kept.map((total) => total * data.totalScale),
      curves: curves.map((curve, place) => ({ good: system.fitted.goods[goods[place]], ...curve })),
      leftOut: { points: totals.length - kept.length, of: totals.length },
      ...(draws && { draws }),
    },
  };
}

/** Quantities of a good along its own price, from the 1st to the 99th percentile of it and through the point. */
export function demandDrawn({ goods: [good], ...asked }: AskedOfSystem): DrawnWith {
  requireShares(asked, "demand curves");
  const { specification, system, data, control } = asked;
  const { fitted } = system;
  const { point, pointName } = pointOf(specification.at ?? "mean", system, data);
  const [low, high] = weightedQuantiles(data.logPrices[good], OUTERMOST, data.weights).map(Math.exp);
  const [from, to] = [Math.min(low, point.prices[good]), Math.max(high, point.prices[good])];
  if (!(to > from)) {
    const sentence = `All rows have one price of ${fitted.goods[good]}, ${from * data.priceScale[good]}: there is no curve along it.`;
    throw new Refusal([{ sentence, key: ["goods"] }]);
  }
  // The price of the point is one of the curve's own, so that where the curves meet is a point of both.
  const prices = withPoint(spaced(from, to, CURVE_POINTS), point.prices[good]);
  const options = { level: specification.level, ...drawsOf(system), poll: polling(control, "drawing a demand curve") };
  const { prices: kept, ...curves } = refusingRanges(
    () => demandCurves(fitted, point, good, prices, options),
    pointName,
  );
  const here = kept.indexOf(point.prices[good]);
  requirePoints(here < 0 ? 0 : kept.length, prices.length, pointName);
  const unit = data.totalScale / data.priceScale[good];
  return {
    pointName,
    intervals: curves.draws ? "percentile" : "normal",
    drawn: {
      show: "demand curve",
      good: fitted.goods[good],
      prices: kept.map((price) => price * data.priceScale[good]),
      uncompensated: scaled(curves.uncompensated, unit),
      ...(curves.compensated && { compensated: scaled(curves.compensated, unit) }),
      ...(curves.noCompensated && { noCompensated: `${capital(curves.noCompensated)}.` }),
      here: {
        price: kept[here] * data.priceScale[good],
        quantity: curves.uncompensated.values[here] * unit,
        total: point.total * data.totalScale,
      },
      indexMoves: SYSTEMS[fitted.form].sharesNear !== undefined,
      leftOut: { points: prices.length - kept.length, of: prices.length },
      ...(curves.draws && { draws: curves.draws }),
    },
  };
}

/** The largest eigenvalue along expenditure, and where it is above nought. */
export function eigenvalueDrawn(asked: Asked): DrawnWith {
  const { system, data } = asked;
  requireShares(asked, "eigenvalues along expenditure");
  if (!statesNegativity(system.fitted)) {
    throw new Refusal([
      { sentence: "Without homogeneity, negativity cannot be stated, and its eigenvalue is not drawn.", key: ["show"] },
    ]);
  }
  const { point, pointName, options, totals } = alongTotals(asked);
  const { totals: kept, eigenvalue, breaks, draws } = eigenvalueCurve(system.fitted, point, totals, options);
  requirePoints(kept.length, totals.length, pointName);
  return {
    pointName,
    intervals: draws ? "percentile" : "normal",
    drawn: {
      show: "largest eigenvalue",
      totals: kept.map((total) => total * data.totalScale),
      eigenvalue,
      breaks: breaks.map(({ from, to }) => ({ from: from * data.totalScale, to: to * data.totalScale })),
      leftOut: { points: totals.length - kept.length, of: totals.length },
      ...(draws && { draws }),
    },
  };
}

function alongTotals({ specification, system, data, control }: Asked) {
  const { point, pointName } = pointOf(specification.at ?? "mean", system, data);
  const [low, high] = weightedQuantiles(data.logTotal, OUTERMOST, data.weights).map(Math.exp);
  const options = { level: specification.level, ...drawsOf(system), poll: polling(control, "drawing curves") };
  return { point, pointName, options, totals: spaced(low, high, CURVE_POINTS, "logarithmic") };
}

const drawsOf = ({ bootstrap }: AskedOfSystem["system"]) => (bootstrap?.draws ? { draws: bootstrap.draws } : {});

function withPoint(prices: readonly number[], own: number): number[] {
  return [...new Set([...prices, own])].sort((a, b) => a - b);
}

function scaled({ values, errors, low, high }: Curve, unit: number): Curve {
  const [value, error, from, to] = [values, errors, low, high].map((all) => all.map((one) => one * unit));
  return { values: value, errors: error, low: from, high: to };
}

/** A system in differences predicts no shares at a point, so that nothing runs along one. */
export function requireShares({ system }: Pick<Asked, "system">, what: string): void {
  const absent = SYSTEMS[system.fitted.form].shareFunction?.absent;
  if (absent === undefined) return;
  throw new Refusal([{ sentence: `There are no ${what}: ${absent.replace(/\.$/, "")}.`, key: ["show"] }]);
}

/** One point is no curve. */
function requirePoints(defined: number, of: number, pointName: string): void {
  if (defined > 1) return;
  throw new Refusal([
    {
      sentence: `With prices at ${withArticle(pointName)} the system is defined at ${defined} of ${of} points, and a curve takes two.`,
      key: ["at"],
    },
  ]);
}
