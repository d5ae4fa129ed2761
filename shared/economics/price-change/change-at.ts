import { standardError } from "../../numerics/matrix.ts";
import type {
  ChangeAtPoint,
  Effects,
  Estimate,
  Estimates,
  PriceQuestion,
  TaxEffects,
} from "../../schemas/price-change.ts";
import { capital } from "../../study/words.ts";
import type { Point } from "../../systems/demand-system.ts";
import type { FittedCoefficients } from "../../systems/index.ts";
import { overDraws } from "../percentile.ts";
import type { Bundle } from "./bundle.ts";
import type { Dual } from "./dual.ts";
import { type Interval, intervalOf } from "./interval.ts";
import { type Measures, measuresAt } from "./measures.ts";

export interface ChangeOptions {
  /** Divisors that lead from units of estimation back to those uploaded. */
  readonly priceScale: readonly number[];
  readonly totalScale: number;
  /** Of confidence. */
  readonly level: number;
  /** Bootstrap draws of θ: intervals are their percentiles. */
  readonly draws?: readonly (readonly number[])[];
}

/**
 * What a price change does at a point, in the units uploaded, with standard errors √(g'V g) and intervals: the one function
 * that the server's answer and the one beside a slider come from.
 * Errors: as for `measuresAt`.
 */
export function changeAt(
  fitted: FittedCoefficients,
  point: Point,
  question: PriceQuestion,
  options: ChangeOptions,
): ChangeAtPoint {
  const { priceScale, totalScale } = options;
  const measures = measuresAt({ fitted, derivatives: true }, point, question, priceScale);
  const drawn = options.draws && drawnMeasures(fitted, point, question, options.draws, priceScale, measures);
  const told: Teller = (select, scale = 1) => {
    const { value, gradient } = select(measures) as Dual;
    const error = standardError(fitted.covariance, [...gradient]);
    const draws = drawn?.map((one) => scale * (select(one) as Dual).value);
    const [low, high]: Interval = intervalOf({ value: scale * value, error: scale * error }, options.level, draws);
    return { value: scale * value, error: scale * error, low, high };
  };
  return inWords(measures, told, { priceScale, totalScale, goods: fitted.goods, draws: drawn?.length });
}

type Teller = (select: (measures: Measures) => Dual | undefined, scale?: number) => Estimate;

/** The draws at which everything is defined that is at the estimates. */
function drawnMeasures(
  fitted: FittedCoefficients,
  point: Point,
  question: PriceQuestion,
  draws: readonly (readonly number[])[],
  priceScale: readonly number[],
  at: Measures,
): Measures[] {
  return overDraws(fitted, draws, (draw) => {
    try {
      return measuresAt({ fitted: draw, derivatives: false }, point, question, priceScale);
    } catch (error) {
      if (error instanceof RangeError) return undefined;
      throw error;
    }
  }).filter(
    (one): one is Measures =>
      one !== undefined && !(at.hicks && !one.hicks) && !(at.tax?.marginalCost && !one.tax?.marginalCost),
  );
}

interface Units {
  readonly priceScale: readonly number[];
  readonly totalScale: number;
  readonly goods: readonly string[];
  readonly draws: number | undefined;
}

function inWords(measures: Measures, told: Teller, { priceScale, totalScale, goods, draws }: Units): ChangeAtPoint {
  const { bundles, after, taxes, absent, costOfLiving } = measures;
  const unit = priceScale.map((scale) => totalScale / scale);
  const each = (select: (measures: Measures, i: number) => Dual | undefined, scales?: readonly number[]): Estimates => {
    const all = goods.map((_, i) => told((one) => select(one, i), scales?.[i]));
    return {
      values: all.map(({ value }) => value),
      errors: all.map(({ error }) => error),
      low: all.map(({ low }) => low),
      high: all.map(({ high }) => high),
    };
  };
  const both = (which: "hicks" | "slutsky" | "infinitesimal"): Effects => ({
    substitution: each((one, i) => one[which]?.substitution[i], unit),
    income: each((one, i) => one[which]?.income[i], unit),
  });
  const money = (select: (measures: Measures) => Dual | undefined) => told(select, totalScale);
  const bought = (which: keyof Measures["bundles"]) => each((one, i) => one.bundles[which]?.quantities[i], unit);
  const spent = (which: keyof Measures["bundles"]) => each((one, i) => one.bundles[which]?.shares[i]);
  return {
    pricesBefore: bundles.before.prices.map((price, i) => price * priceScale[i]),
    pricesAfter: after.prices.map((price, i) => price * priceScale[i]),
    taxes: taxes.map((tax, i) => tax * priceScale[i]),
    totalBefore: bundles.before.total.value * totalScale,
    totalAfter: after.total * totalScale,
    ...(draws !== undefined && { draws }),
    shares: {
      before: spent("before"),
      ...(bundles.hicks && { compensated: spent("hicks") }),
      ...(bundles.after && { after: spent("after") }),
    },
    quantities: {
      before: bought("before"),
      ...(bundles.hicks && { hicks: bought("hicks") }),
      ...(bundles.slutsky && { slutsky: bought("slutsky") }),
      ...(bundles.after && { after: bought("after") }),
    },
    ...(measures.total && { total: each((one, i) => one.total?.[i], unit) }),
    ...(measures.hicks && { hicks: both("hicks") }),
    ...(measures.slutsky && { slutsky: both("slutsky") }),
    infinitesimal: both("infinitesimal"),
    ...(measures.compensating && {
      welfare: { compensating: money((one) => one.compensating), equivalent: money((one) => one.equivalent) },
    }),
    secondOrder: money((one) => one.secondOrder),
    ...(measures.marshallian && { marshallian: money((one) => one.marshallian) }),
    costOfLiving: {
      ...(costOfLiving.atUtilityBefore && { atUtilityBefore: told((one) => one.costOfLiving.atUtilityBefore) }),
      laspeyres: told((one) => one.costOfLiving.laspeyres),
      ...(costOfLiving.paasche && { paasche: told((one) => one.costOfLiving.paasche) }),
    },
    ...(measures.tax && { tax: taxInWords(measures.tax, money, told) }),
    ...(absent !== undefined && { absent: `${capital(absent)}.` }),
    outside: outsideUnitOf(bundles, goods),
  };
}

function taxInWords(tax: NonNullable<Measures["tax"]>, money: Teller, told: Teller): TaxEffects {
  return {
    revenue: money((one) => one.tax?.revenue),
    paidByBuyers: money((one) => one.tax?.paidByBuyers),
    ...(tax.excessBurden && { excessBurden: money((one) => one.tax?.excessBurden) }),
    ...(tax.noExcessBurden !== undefined && { noExcessBurden: `${capital(tax.noExcessBurden)}.` }),
    ...(tax.marginalCost && { marginalCost: told((one) => one.tax?.marginalCost) }),
    ...(tax.noMarginalCost !== undefined && { noMarginalCost: `${capital(tax.noMarginalCost)}.` }),
  };
}

/** Shares that leave [0, 1] before, at the compensated bundle or after: said, never clipped. */
function outsideUnitOf({ before, hicks, after }: Measures["bundles"], goods: readonly string[]) {
  const looked = [
    ["before", before],
    ["compensated", hicks],
    ["after", after],
  ] as const;
  return looked.flatMap(([where, bundle]) =>
    goods.flatMap((good, i) => {
      const share = (bundle as Bundle | undefined)?.shares[i].value;
      return share !== undefined && !(share >= 0 && share <= 1) ? [{ good, where, share }] : [];
    }),
  );
}
