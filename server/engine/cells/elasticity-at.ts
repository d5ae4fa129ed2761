import {
  classesByIntervals,
  type ElasticityIntervals,
  type Interval,
  normalIntervals,
} from "../../../shared/economics/classes.ts";
import { type Elasticities, type ElasticityValues, elasticitiesOf } from "../../../shared/economics/elasticities.ts";
import { percentileInterval } from "../../../shared/economics/percentile.ts";
import type { ResponseGradients, Responses } from "../../../shared/economics/responses.ts";
import type { ElasticityGroup, EstimatesByPrice } from "../../../shared/schemas/elasticities.ts";
import type { FittedCoefficients } from "../../../shared/systems/index.ts";
import { printQuantity } from "../../../shared/tables/numbers.ts";
import type { Poll } from "../run.ts";

/** The elasticities of a group with intervals and classes: what is said of it beside who it is. */
export type EvaluatedGroup = Omit<
  ElasticityGroup,
  "name" | "rows" | "weightShare" | "total" | "point" | "notPositive" | "notDefined"
>;

/**
 * From responses with their derivatives to elasticities, standard errors, intervals at `level` and classes. The
 * intervals are percentiles of the elasticities at every bootstrap draw where those are given.
 */
export function evaluatedGroup(
  fitted: FittedCoefficients,
  { responses, gradients }: { responses: Responses; gradients: ResponseGradients },
  level: number,
  poll: Poll,
  draws?: readonly ElasticityValues[],
): EvaluatedGroup {
  const elasticities = elasticitiesOf(responses, gradients, fitted.covariance, poll);
  const intervals = draws ? percentileIntervals(draws, level) : normalIntervals(elasticities, level);
  return estimatesOf(elasticities, intervals, fitted.goods, level);
}

/** Elasticities with their errors and intervals, and what those make of each good and pair. */
export function estimatesOf(
  elasticities: Elasticities,
  intervals: ElasticityIntervals,
  names: readonly string[],
  level: number,
): EvaluatedGroup {
  const { goods, net, gross } = classesByIntervals(intervals, names, level);
  return {
    shares: elasticities.shares,
    expenditure: {
      values: elasticities.expenditure,
      errors: elasticities.expenditureErrors,
      low: intervals.expenditure.map(([low]) => low),
      high: intervals.expenditure.map(([, high]) => high),
    },
    uncompensated: byPrice(elasticities, "uncompensated", intervals.uncompensated),
    compensated: byPrice(elasticities, "compensated", intervals.compensated),
    classes: goods.map(({ good, kind, normal, incomeNeutral, giffen }) => ({
      good,
      kind,
      normal,
      incomeNeutral,
      giffen,
    })),
    net,
    gross,
  };
}

function percentileIntervals(draws: readonly ElasticityValues[], level: number): ElasticityIntervals {
  const goods = draws[0].expenditure.map((_, i) => i);
  const ofMatrix = (which: "uncompensated" | "compensated") =>
    goods.map((i) =>
      goods.map((j) =>
        percentileInterval(
          draws.map((draw) => draw[which][i][j]),
          level,
        ),
      ),
    );
  return {
    expenditure: goods.map((i) =>
      percentileInterval(
        draws.map(({ expenditure }) => expenditure[i]),
        level,
      ),
    ),
    uncompensated: ofMatrix("uncompensated"),
    compensated: ofMatrix("compensated"),
  };
}

function byPrice(
  elasticities: Elasticities,
  of: "uncompensated" | "compensated",
  intervals: Interval[][],
): EstimatesByPrice {
  return {
    values: elasticities[of],
    errors: of === "compensated" ? elasticities.compensatedErrors : elasticities.uncompensatedErrors,
    low: intervals.map((row) => row.map(([low]) => low)),
    high: intervals.map((row) => row.map(([, high]) => high)),
  };
}

/** Why shares have no elasticities: the first good whose share is not positive; undefined where all are. */
export function notPositive(shares: readonly number[], goods: readonly string[], of: string): string | undefined {
  const at = shares.findIndex((share) => !(share > 0));
  if (at < 0) return undefined;
  return `The ${of} share of ${goods[at]} is ${printQuantity(shares[at], "share")} there, and an elasticity is divided by it.`;
}
