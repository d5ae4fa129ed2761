import { classesByIntervals, type Interval, normalIntervals } from "../../../shared/economics/classes.ts";
import { type Elasticities, elasticitiesOf } from "../../../shared/economics/elasticities.ts";
import type { ResponseGradients, Responses } from "../../../shared/economics/responses.ts";
import type { ElasticityGroup, EstimatesByPrice } from "../../../shared/schemas/elasticities.ts";
import type { FittedCoefficients } from "../../../shared/systems/index.ts";
import { printQuantity } from "../../../shared/tables/numbers.ts";

/** The elasticities of a group with intervals and classes: what is said of it beside who it is. */
export type EvaluatedGroup = Omit<ElasticityGroup, "name" | "rows" | "weightShare" | "total" | "point" | "notPositive">;

/** From responses with their derivatives to elasticities, standard errors, intervals at `level` and classes. */
export function evaluatedGroup(
  fitted: FittedCoefficients,
  { responses, gradients }: { responses: Responses; gradients: ResponseGradients },
  level: number,
): EvaluatedGroup {
  const elasticities = elasticitiesOf(responses, gradients, fitted.covariance);
  const intervals = normalIntervals(elasticities, level);
  const { goods, net, gross } = classesByIntervals(intervals, fitted.goods, level);
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
