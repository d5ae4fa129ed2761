import { spaced } from "../../shared/economics/curves/curve.ts";
import { demandCurves } from "../../shared/economics/curves/demand.ts";
import { engelCurves } from "../../shared/economics/curves/engel.ts";
import { type Drawn, type FigureFinding, figureFinding } from "../../shared/schemas/figure.ts";
import { sampleSystem } from "./sample-findings.ts";

/** Figures of the sample system as the engine would draw them: every number computed from its coefficients. */
const system = sampleSystem();
const { fitted, points, checks, tests } = system;

function figureOf(drawn: Drawn, pointName?: string): FigureFinding {
  return figureFinding.parse({
    kind: "figure",
    dataFingerprint: system.dataFingerprint,
    level: 0.95,
    ...(pointName && { pointName }),
    standardErrors: "conventional",
    intervals: "normal",
    drawn,
    checks,
    tests,
  });
}

export function sampleEngel(): FigureFinding {
  const goods = [0, 3];
  const asked = spaced(0.5, 2, 5, "logarithmic");
  const { totals, curves } = engelCurves(fitted, points.mean, asked, goods, { level: 0.95 });
  const named = curves.map((curve, i) => ({ good: fitted.goods[goods[i]], ...curve }));
  return figureOf({ show: "engel curves", totals, curves: named, leftOut: { points: 0, of: 5 } }, "mean");
}

export function sampleDemand(): FigureFinding {
  const { mean } = points;
  const own = mean.prices[4];
  const asked = [0.8, 0.9, 1, 1.1, 1.2].map((part) => part * own);
  const { prices, uncompensated, compensated } = demandCurves(fitted, mean, 4, asked, { level: 0.95 });
  const here = { price: own, quantity: uncompensated.values[2], total: mean.total };
  const leftOut = { points: 0, of: 5 };
  const good = fitted.goods[4];
  return figureOf(
    { show: "demand curve", good, prices, uncompensated, compensated, here, indexMoves: false, leftOut },
    "mean",
  );
}

const estimate = (value: number, error: number) => ({ value, error, low: value - 2 * error, high: value + 2 * error });
const estimates = (values: number[], error: number) => ({
  values,
  errors: values.map(() => error),
  low: values.map((value) => value - 2 * error),
  high: values.map((value) => value + 2 * error),
});

/** One of each kind that is drawn from rows, with numbers chosen. */
export function chosenFigures(): FigureFinding[] {
  const fifths = { of: "total expenditure", quantiles: 2 };
  const bearer = (name: string, share: number) => ({
    name,
    rows: 450,
    weightShare: 0.5,
    share: estimate(share, 0.001),
    amount: estimate(100 * share, 0.1),
  });
  const groups = ["lowest half", "highest half"];
  const totals = [1, 2, 3];
  return [
    figureOf({
      show: "elasticities",
      goods: ["a & b", "c"],
      groupedBy: fifths,
      groups: groups.map((name) => ({
        name,
        rows: 450,
        total: 2,
        expenditure: estimates([0.8, 1.3], 0.05),
        own: estimates([-0.6, -1.2], 0.05),
        ownCompensated: estimates([-0.4, -0.9], 0.05),
      })),
      without: [],
    }),
    figureOf({
      show: "fit of shares",
      rows: 900,
      goods: ["a & b", "c"].map((good) => ({
        good,
        bins: [0.2, 0.3].map((predicted) => ({
          rows: 450,
          weightShare: 0.5,
          predicted,
          observed: estimate(predicted + 0.01, 0.004),
        })),
      })),
    }),
    figureOf({
      show: "largest eigenvalue",
      totals,
      eigenvalue: estimates([-0.02, -0.01, 0.01], 0.004),
      breaks: [{ from: 2.5, to: 3 }],
      leftOut: { points: 1, of: 4 },
    }),
    figureOf({
      show: "incidence",
      measure: "compensating variation",
      groupedBy: fifths,
      groups: [bearer(groups[0], 0.03), bearer(groups[1], 0.01)],
      all: { ...bearer("all rows", 0.02), rows: 900, weightShare: 1 },
      without: [],
      notDefined: 0,
    }),
    figureOf({
      show: "shares by group",
      goods: ["a & b", "c"],
      groupedBy: fifths,
      groups: groups.map((name, g) => ({
        name,
        rows: 450,
        weightShare: 0.5,
        total: g + 1,
        shares: estimates([0.6 - 0.1 * g, 0.4 + 0.1 * g], 0.01),
      })),
    }),
    figureOf({
      show: "price distribution",
      good: "a & b",
      rows: 900,
      different: 40,
      edges: [1, 2, 3],
      shares: [0.4, 0.58],
      below: 0.01,
      above: 0.01,
      quartiles: [1.5, 2, 2.5],
    }),
  ];
}
