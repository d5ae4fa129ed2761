import {
  type IncidenceGroup,
  type PriceChangeFinding,
  type PriceQuestion,
  priceChangeFinding,
} from "../../shared/schemas/price-change.ts";
import type { FittedSystem } from "../../shared/schemas/system.ts";
import { tryPrices } from "../../src/workers/try-prices.ts";
import { sampleSlutsky } from "./sample-findings.ts";

export const MEAT_AND_LEVY: PriceQuestion = {
  prices: { "meat & fish": { "per cent": 40 }, "sweet drinks": { "ad valorem": 25 } },
  expenditure: 0,
};

/** The answer at the point, as numbers of a group: whoever reads them sees at once whose they are. */
function group(name: string, rows: number, finding: Pick<PriceChangeFinding, "at">, part: number): IncidenceGroup {
  const { at } = finding;
  const scaled = <E extends { value: number; error: number; low: number; high: number }>({
    value,
    error,
    low,
    high,
  }: E) => ({
    value: part * value,
    error,
    low,
    high,
  });
  const welfare = at.welfare && {
    compensating: scaled(at.welfare.compensating),
    equivalent: scaled(at.welfare.equivalent),
  };
  const share = <E extends Parameters<typeof scaled>[0]>(one: E) => ({
    ...scaled(one),
    value: (part * one.value) / at.totalBefore,
  });
  return {
    name,
    rows,
    weightShare: part / 2,
    expenditure: at.totalBefore,
    ...(welfare && {
      welfare,
      welfareShare: { compensating: share(welfare.compensating), equivalent: share(welfare.equivalent) },
    }),
    secondOrder: scaled(at.secondOrder),
    secondOrderShare: share(at.secondOrder),
    ...(at.tax && { tax: at.tax, revenueShare: share(at.tax.revenue) }),
    quantitiesBefore: at.quantities.before.values,
    quantityChange: at.total ?? at.infinitesimal.substitution,
    outside: { system: 0, household: 0 },
  };
}

/**
 * A price change of the sample's system, answered at its point by the functions the engine answers with; its groups are
 * made up, one of them of few rows, and one row in each of the two ways is named.
 */
export function samplePriceChange(question = MEAT_AND_LEVY, fitted?: FittedSystem): PriceChangeFinding {
  const { kind: _, form: __, sample: ___, brokenRows: ____, at: _____, ...own } = sampleSlutsky("share", fitted);
  const priceRange = {
    low: own.priceScale.map((price) => 0.5 * price),
    high: own.priceScale.map((price) => 1.35 * price),
  };
  const tried = tryPrices({ ...own, question, level: 0.95, priceRange });
  const all = group("all rows", 912, tried, 1);
  return priceChangeFinding.parse({
    kind: "price change",
    ...own,
    question,
    ...tried,
    level: 0.95,
    standardErrors: "conventional",
    intervals: "normal",
    priceRange,
    incidence: {
      groupedBy: { of: "total expenditure", quantiles: 2 },
      groups: [group("lowest half", 12, tried, 0.5), group("highest half", 900, tried, 1.5)],
      all: { ...all, notDefined: { rows: 1, weightedShare: 0.001, reason: "utility has ended" } },
      without: [],
      brokenRows: [
        { row: 12, total: 41, notDefined: "utility has ended", outside: [] },
        { row: 907, total: 93, outside: [{ good: "dairy", share: -0.01, of: "household", when: "after" }] },
      ],
      namedRows: 2,
      unseen: [],
    },
  });
}
