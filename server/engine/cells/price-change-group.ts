import { combination, type Dual } from "../../../shared/economics/price-change/dual.ts";
import { intervalOf } from "../../../shared/economics/price-change/interval.ts";
import { ROW_GAPS, type RowGap } from "../../../shared/economics/price-change/row-change.ts";
import { taxMeasures } from "../../../shared/economics/price-change/tax.ts";
import { standardError } from "../../../shared/numerics/matrix.ts";
import type { Estimate, IncidenceGroup, PriceQuestion, TaxEffects } from "../../../shared/schemas/price-change.ts";
import { capital, listWords } from "../../../shared/study/words.ts";
import { type FittedCoefficients, whyNotDefined } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { DERIVED, type MeanDerivatives } from "./price-change-derivatives.ts";
import { goodPlace, type SumName, sumPlace } from "./price-change-rows.ts";

/** What the sums of a group are told with. */
export interface Told {
  readonly fitted: FittedCoefficients;
  readonly question: PriceQuestion;
  readonly data: Pick<PreparedData, "priceScale" | "totalScale">;
  readonly level: number;
  /** Weight of all rows used. */
  readonly weight: number;
  readonly taxed: boolean;
  readonly hasScale: boolean;
  /** Why there is no cost function, if there is none. */
  readonly noCost: string | undefined;
}

/** The sums of a group's rows as weighted means with standard errors, in the units uploaded. */
export function describedGroup(
  name: string,
  sums: Float64Array,
  derivatives: MeanDerivatives,
  told: Told,
): IncidenceGroup {
  const { fitted, question, data, taxed, hasScale, noCost } = told;
  const { totalScale, priceScale } = data;
  const n = fitted.goods.length;
  const sum = (of: SumName) => sums[sumPlace[of]];
  const weight = sum("weight");
  const derivative = (place: number): number[] => {
    const k = fitted.theta.length;
    return Array.from(derivatives.subarray(place * k, (place + 1) * k));
  };
  const mean = (of: SumName & keyof typeof DERIVED): Dual => ({
    value: sum(of) / weight,
    gradient: derivative(DERIVED[of] as number),
  });
  const estimate = (dual: Dual, scale = totalScale) => estimated(dual, scale, told);
  const byGood = (which: 1 | 2) =>
    together(
      fitted.goods.map((_, i) => {
        const gradient = derivative((which === 1 ? DERIVED.change : DERIVED.substitution)(n, i));
        return estimate({ value: sums[goodPlace(n, which, i)] / weight, gradient }, totalScale / priceScale[i]);
      }),
    );
  const expenditure = sum("expenditure") / weight;
  const equivalent = mean("equivalent");
  const variations = (scale: number) => ({
    compensating: estimate(mean("compensating"), scale),
    equivalent: estimate(equivalent, scale),
  });
  const paidByBuyers = mean("paidByBuyers");
  const tax = { revenue: mean("revenue"), paidByBuyers, lost: paidByBuyers, raised: mean("raised") };
  return {
    name,
    rows: sum("rows") + sum("undefinedRows"),
    weightShare: (weight + sum("undefinedWeight")) / told.weight,
    expenditure: expenditure * totalScale,
    ...(hasScale && { perAdult: (sum("perAdult") / weight) * totalScale }),
    ...(noCost === undefined && { welfare: variations(totalScale), welfareShare: variations(1 / expenditure) }),
    secondOrder: estimate(mean("secondOrder")),
    secondOrderShare: estimate(mean("secondOrder"), 1 / expenditure),
    ...(taxed && {
      tax: taxEffects(tax, question, noCost === undefined ? { equivalent } : { absent: noCost }, estimate),
      revenueShare: estimate(tax.revenue, 1 / expenditure),
    }),
    quantitiesBefore: fitted.goods.map((_, i) => ((sums[goodPlace(n, 0, i)] / weight) * totalScale) / priceScale[i]),
    quantityChange: byGood(1),
    ...(noCost === undefined && { substitution: byGood(2) }),
    ...(sum("undefinedRows") > 0 && {
      notDefined: {
        rows: sum("undefinedRows"),
        weightedShare: sum("undefinedWeight") / (weight + sum("undefinedWeight")),
        reason: gapsInWords(sums, fitted.form),
      },
    }),
    outside: { system: sum("outsideSystem"), household: sum("outsideHousehold") },
  };
}

/** Why the answer is not defined in the rows counted, as a clause. */
export function gapsInWords(sums: Float64Array, form: FittedCoefficients["form"]): string {
  return listWords(ROW_GAPS.filter((gap) => sums[sumPlace[gap]] > 0).map((gap) => gapInWords(gap, form)));
}

export function gapInWords(gap: RowGap, form: FittedCoefficients["form"]): string {
  if (gap === "price") return "a subsidy leaves no positive price";
  if (gap === "shares") return whyNotDefined(form);
  return gap === "utility before"
    ? "the utility before the change, or its cost at the new prices, is not defined"
    : "the utility after the change, or its cost at the prices before, is not defined";
}

function taxEffects(
  sums: Parameters<typeof taxMeasures>[0],
  question: PriceQuestion,
  exact: Parameters<typeof taxMeasures>[2],
  estimate: (dual: Dual, scale?: number) => Estimate,
): TaxEffects {
  const { revenue, paidByBuyers, excessBurden, noExcessBurden, marginalCost, noMarginalCost } = taxMeasures(
    sums,
    question,
    exact,
  );
  return {
    revenue: estimate(revenue),
    paidByBuyers: estimate(paidByBuyers),
    ...(excessBurden && { excessBurden: estimate(excessBurden) }),
    ...(noExcessBurden !== undefined && { noExcessBurden: `${capital(noExcessBurden)}.` }),
    ...(marginalCost && { marginalCost: estimate(marginalCost, 1) }),
    ...(noMarginalCost !== undefined && { noMarginalCost: `${capital(noMarginalCost)}.` }),
  };
}

function estimated(dual: Dual, scale: number, { fitted, level }: Told): Estimate {
  const { value, gradient } = combination([scale, dual]);
  const error = standardError(fitted.covariance, [...gradient]);
  const [low, high] = intervalOf({ value, error }, level);
  return { value, error, low, high };
}

function together(all: readonly Estimate[]) {
  return {
    values: all.map(({ value }) => value),
    errors: all.map(({ error }) => error),
    low: all.map(({ low }) => low),
    high: all.map(({ high }) => high),
  };
}
