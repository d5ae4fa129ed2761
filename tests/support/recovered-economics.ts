import { elasticitiesAt, elasticityValues } from "../../shared/economics/elasticities.ts";
import { overDraws, percentileInterval } from "../../shared/economics/percentile.ts";
import { responsesAt } from "../../shared/economics/responses.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { compensatingVariation } from "../../shared/economics/welfare.ts";
import { compensatingVariationWithError } from "../../shared/economics/welfare-errors.ts";
import type { FittedCoefficients } from "../../shared/systems/index.ts";
import { systemOf } from "../../shared/systems/index.ts";
import { type Interval, normalInterval } from "./coverage.ts";
import type { Estimated, Sample } from "./recovery.ts";

/** What is derived from coefficients: η_i and k_ij at the base point, CV of a price a fifth higher there. */
export interface DerivedIntervals {
  readonly elasticities: Interval[];
  readonly slutsky: Interval[];
  /** Empty in systems without a cost function. */
  readonly welfare: Interval[];
}

/** The truth is the same function of the true θ; observed means that stand in it (Rotterdam, indices) are the sample's. */
export function derivedIntervals({ theta, data }: Sample, { fitted, bootstrap }: Estimated): DerivedIntervals {
  const prices = data.goods.map(() => 1);
  const point = { prices, total: 1, demographics: [] };
  const raised = prices.map((price, i) => (i === 0 ? 1.2 : price));
  const hasCost = !("absent" in systemOf(fitted).system.cost);
  const values = (at: FittedCoefficients) => {
    const { responses } = responsesAt(at, point);
    return {
      elasticities: elasticityValues(responses).expenditure,
      slutsky: responses.compensated.flat(),
      welfare: hasCost ? [compensatingVariation(at, point, raised)] : [],
    };
  };
  const truth = values({ ...fitted, theta: [...theta] });
  if (bootstrap?.draws) {
    const draws = overDraws(fitted, bootstrap.draws, values);
    const intervals = (of: keyof DerivedIntervals) =>
      truth[of].map((value, k) => {
        const [low, high] = percentileInterval(draws.map((drawn) => drawn[of][k]));
        return { truth: value, low, high };
      });
    return { elasticities: intervals("elasticities"), slutsky: intervals("slutsky"), welfare: intervals("welfare") };
  }
  const { expenditure, expenditureErrors } = elasticitiesAt(fitted, point);
  const matrix = matrixAt(fitted, point, { priceScale: prices, totalScale: 1, pointName: "base point" });
  const errors = matrix.shareErrors.flat();
  const variation = hasCost ? [compensatingVariationWithError(fitted, point, raised)] : [];
  return {
    elasticities: expenditure.map((value, i) => normalInterval(truth.elasticities[i], value, expenditureErrors[i])),
    slutsky: matrix.share.flat().map((value, k) => normalInterval(truth.slutsky[k], value, errors[k])),
    welfare: variation.map(({ value, standardError }, k) => normalInterval(truth.welfare[k], value, standardError)),
  };
}
