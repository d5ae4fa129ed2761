import { TOTAL_EXPENDITURE } from "../../../shared/schemas/elasticities.ts";
import type { FigureSpecification } from "../../../shared/schemas/figure.ts";
import type { Estimate, Estimates } from "../../../shared/schemas/price-change.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { rowGroups } from "./elasticity-groups.ts";
import { meanOver, weightOver } from "./elasticity-points.ts";
import type { DrawnWith } from "./figure-asked.ts";
import { meanErrorsPhrase, meanWithError } from "./figure-means.ts";
import { weightedQuantiles } from "./weighted.ts";

const TENTHS = { of: TOTAL_EXPENDITURE, quantiles: 10 };

/** Weighted mean shares of each group of rows, observed ones. */
export function sharesByGroup(
  { groups: groupedBy = TENTHS, level }: FigureSpecification,
  goods: readonly number[],
  data: PreparedData,
): DrawnWith {
  const all = weightOver(undefined, data.weights, data.rows);
  return {
    intervals: "normal",
    standardErrors: meanErrorsPhrase(data),
    drawn: {
      show: "shares by group",
      goods: goods.map((i) => data.goods[i]),
      groupedBy,
      groups: rowGroups(groupedBy, data).map(({ name, rows }) => ({
        name,
        rows: rows.length,
        weightShare: weightOver(rows, data.weights) / all,
        total: Math.exp(meanOver(data.logTotal, rows, data.weights)) * data.totalScale,
        shares: together(goods.map((i) => meanWithError(data.shares[i], rows, data, level))),
      })),
    },
  };
}

export function together(all: readonly Estimate[]): Estimates {
  return {
    values: all.map(({ value }) => value),
    errors: all.map(({ error }) => error),
    low: all.map(({ low }) => low),
    high: all.map(({ high }) => high),
  };
}

const BINS = 30;

/**
 * How the prices of a good are spread, each row by its weight, between the 1st and the 99th percentile; what lies beyond is
 * counted, not drawn, so that no single household's price is an end of the axis.
 */
export function priceDistribution(good: number, data: PreparedData): DrawnWith {
  const scale = data.priceScale[good];
  const prices = data.logPrices[good].map((log) => Math.exp(log) * scale);
  const [low, first, middle, third, high] = weightedQuantiles(prices, [0.01, 0.25, 0.5, 0.75, 0.99], data.weights);
  if (!(high > low)) {
    const sentence = `From the 1st to the 99th percentile all rows have one price of ${data.goods[good]}, ${low}: there is no distribution to draw.`;
    throw new Refusal([{ sentence, key: ["goods"] }]);
  }
  const shares = new Array<number>(BINS).fill(0);
  let [below, above, all] = [0, 0, 0];
  for (const [t, price] of prices.entries()) {
    const weight = data.weights ? data.weights[t] : 1;
    all += weight;
    if (price < low) below += weight;
    else if (price > high) above += weight;
    else shares[Math.min(BINS - 1, Math.floor(((price - low) / (high - low)) * BINS))] += weight;
  }
  return {
    intervals: "normal",
    drawn: {
      show: "price distribution",
      good: data.goods[good],
      rows: data.rows,
      different: new Set(data.logPrices[good]).size,
      edges: Array.from({ length: BINS + 1 }, (_, i) => low + ((high - low) * i) / BINS),
      shares: shares.map((weight) => weight / all),
      below: below / all,
      above: above / all,
      quartiles: [first, middle, third],
    },
  };
}
