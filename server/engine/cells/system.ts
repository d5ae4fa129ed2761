import { theoryChecksAt } from "../../../shared/economics/checks.ts";
import { drawnIntervals, withDrawnLargest } from "../../../shared/economics/drawn-intervals.ts";
import { expenditureElasticitiesAt } from "../../../shared/economics/elasticities.ts";
import { type SystemFinding, type SystemSpecification, systemFinding } from "../../../shared/schemas/system.ts";
import type { Point } from "../../../shared/systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { withTimeTerms } from "../columns/seasonal-terms.ts";
import { easiSizeOf } from "../estimation/easi/specification.ts";
import {
  accumulateMoments,
  estimateSystem,
  type Moments,
  type MomentsRequest,
  momentsRequest,
  requireRows,
} from "../estimation/index.ts";
import { polling, QUIET, type RunControl } from "../run.ts";
import { curvaturePoint } from "./curvature-point.ts";
import { expenditureReport } from "./expenditure-report.ts";
import { basePoint, meanPoint } from "./points.ts";
import { refusingRanges } from "./refusing.ts";
import { checkSample } from "./sample-checks.ts";
import { weightedQuantiles } from "./weighted.ts";

/**
 * A system cell: moments, estimates, and what the estimates say at the base point (of data not normalised,
 * the mean) and over the sample.
 * Errors: `Refusal` (fewer rows than coefficients, singular, not converged …), `Cancelled`.
 */
export function runSystem(given: SystemSpecification, data: PreparedData, control: RunControl = QUIET): SystemFinding {
  const specification = withTimeTerms(given, data);
  const poll = polling(control, "reading the specification");
  requireRows(specification, data);
  poll();
  const request = momentsRequest(specification, data);
  poll();
  const moments = momentsOf(data, request, control);
  const estimate = estimateSystem(specification, data, moments, control, curvaturePoint(specification, data));
  const { fitted } = estimate;
  const base = basePoint(data, fitted.demographics);
  const mean = meanPoint(data, fitted.demographics);
  // What is not normalised is nowhere near p = x = 1: then the head of the finding stands at the sample mean.
  const [point, pointName] = data.finding.normalise === "mean" ? [base, "base point"] : [mean, "mean"];
  poll();
  const elasticities = refusingRanges(() => expenditureElasticitiesAt(fitted, point), pointName);
  poll();
  const checks = refusingRanges(() => theoryChecksAt(fitted, point, pointName), pointName);
  poll();
  const draws = estimate.bootstrap?.draws;
  const lawsHere = withDrawnLargest(checks, draws && drawnIntervals(fitted, draws, point));
  return refusingRanges(() => {
    const { expenditure, expenditureErrors } = elasticities;
    const expenditureOfLes = expenditureReport(fitted, data, point);
    return systemFinding.parse({
      ...estimate,
      ...(expenditureOfLes && { expenditure: expenditureOfLes }),
      ...unitsMatter(specification, data),
      ...(specification["conditional on"] !== undefined && { conditionalOn: specification["conditional on"] }),
      points: { base, mean },
      expenditureElasticities: fitted.goods.map((good, i) => ({
        good,
        estimate: expenditure[i],
        standardError: expenditureErrors[i],
      })),
      engel: engelCurves(fitted, data, mean),
      checks: { ...lawsHere, sample: { ...checkSample(fitted, data, control), ...equationsOf(estimate) } },
    });
  });
}

/** T, where it is not the number of rows at which laws are judged. */
function equationsOf({ rows, equations }: Pick<SystemFinding, "rows" | "equations">): { equations?: number } {
  return equations !== undefined && equations.leftOut > 0 ? { equations: rows } : {};
}

/** AIDS with α₀ fixed and Stone's index are not invariant to units (Moschini 1995, American Journal of Agricultural Economics 77). */
function unitsMatter(specification: SystemSpecification, data: PreparedData): Pick<SystemFinding, "unitsMatterBy"> {
  if (data.finding.normalise === "mean") return {};
  const { form, index } = specification;
  // Straight Engel curves in y stay straight in other units, curved ones do not.
  if (form === "easi" && easiSizeOf(specification).degree > 1)
    return { unitsMatterBy: "real expenditure at unit prices" };
  if (form === "aids" || form === "quaids") return { unitsMatterBy: "a fixed α₀" };
  if (form !== "la-aids") return {};
  if (index === "lagged stone") return { unitsMatterBy: "the lagged Stone index" };
  return index === "stone" ? { unitsMatterBy: "Stone's index" } : {};
}

/** Specifications on the same rows that need the same moments read the rows once between them. */
const MOMENTS = new WeakMap<PreparedData, Map<string, Moments>>();

export function momentsOf(data: PreparedData, request: MomentsRequest, control: RunControl): Moments {
  const kept = MOMENTS.get(data) ?? new Map<string, Moments>();
  MOMENTS.set(data, kept);
  const moments = kept.get(request.key) ?? accumulateMoments(data, request, control);
  kept.set(request.key, moments);
  return moments;
}

const CURVE_POINTS = 25;

/**
 * Predicted shares against ln x at mean prices and demographics, from the 1st to the 99th percentile of ln x, where the
 * system is defined; none in a system in differences.
 */
function engelCurves(fitted: FittedCoefficients, data: PreparedData, mean: Point): SystemFinding["engel"] {
  const { system, size } = systemOf(fitted);
  if (system.kind === "differences") return { logTotal: [], shares: fitted.goods.map(() => []) };
  const [low, high] = weightedQuantiles(data.logTotal, [0.01, 0.99], data.weights);
  const logTotal = Array.from({ length: CURVE_POINTS }, (_, i) => low + ((high - low) * i) / (CURVE_POINTS - 1));
  const evaluator = system.evaluator(fitted.theta, size);
  const logPrices = mean.prices.map(Math.log);
  const curves = logTotal.flatMap((log) => {
    evaluator.at(logPrices, log, mean.demographics);
    return Number.isNaN(evaluator.shares[0]) ? [] : [{ log, shares: Array.from(evaluator.shares) }];
  });
  // One point is no curve.
  if (curves.length < 2) return { logTotal: [], shares: fitted.goods.map(() => []) };
  return {
    logTotal: curves.map(({ log }) => log),
    shares: fitted.goods.map((_, i) => curves.map(({ shares }) => shares[i])),
  };
}
