import type { z } from "zod";
import type { DataFinding, qualityFlag } from "../../../shared/schemas/data.ts";
import { counted, listWords } from "../../../shared/study/words.ts";
import { printPercent, printQuantity, printSize } from "../../../shared/tables/numbers.ts";
import type { Clusters } from "./clusters.ts";
import { implausibleAt, outlyingAt } from "./distances.ts";
import { subjectKey } from "./flag-parts.ts";
import { distinctPrices, priceStructure } from "./price-structure.ts";
import { type Weights, weightedDeviation } from "./weighted.ts";

type QualityFlag = z.infer<typeof qualityFlag>;
type Parts = NonNullable<QualityFlag["parts"]>;

/** Above this share of rows that bought none, equations that ignore the zeros mislead. */
const MANY_ZEROS = 0.05;
/** Below this a price hardly varies: one per cent up or down. */
const LITTLE_VARIATION = 0.01;
const NEARLY_COLLINEAR = 0.95;
const ILL_CONDITIONED = 30;
const MOST_PAIRS_TOLD = 3;
/** So many different prices or fewer are a list of tariffs rather than a market. */
const FEW_PRICES = 5;
const MOST_ROWS_NAMED = 200;

export interface FlaggedData {
  readonly goods: DataFinding["goods"];
  readonly shares: readonly Float64Array[];
  readonly logPrices: readonly Float64Array[];
  readonly weights: Weights;
  readonly clusters?: Clusters;
  readonly clusterColumn?: string;
  readonly rowNumbers: Int32Array;
  /** |Σ w − 1| of each row before its shares were made to sum to one exactly; absent when the total is the sum. */
  readonly shareGaps?: Float64Array;
}

/** What is worth knowing before estimating, one sentence each. */
export function qualityFlags(data: FlaggedData): QualityFlag[] {
  return [
    zeros(data),
    outliers(data),
    ...unitValues(data),
    priceVariation(data),
    collinearity(data),
    ...(data.shareGaps ? shares(data.shareGaps, data.rowNumbers) : []),
  ];
}

function zeros({ goods, shares }: FlaggedData): QualityFlag {
  const some = goods.filter((good) => good.boughtNone > 0).sort((a, b) => b.boughtNone - a.boughtNone);
  if (some.length === 0) return { about: "zeros", sentence: "Every good is bought in every row used.", rows: [] };
  // Goods that next to every household buys are not worth a word beside others.
  const told = some
    .filter(({ boughtNone }, at) => at === 0 || boughtNone >= 0.0005)
    .map((good) => `${good.name} in ${printPercent(good.boughtNone)}`);
  const judged =
    some[0].boughtNone < MANY_ZEROS
      ? `Below ${printPercent(MANY_ZEROS, 0)}, so shares are taken as they are.`
      : `From ${printPercent(MANY_ZEROS, 0)} on, equations that take the zeros as ordinary shares may be biased for that good.`;
  return {
    about: "zeros",
    sentence: `Not bought: ${listWords(told)} of the rows used. ${judged}`,
    rows: [],
    parts: zeroParts(goods, shares),
  };
}

function zeroParts(goods: FlaggedData["goods"], shares: FlaggedData["shares"]): Parts {
  return goods.flatMap(({ name }, good) => {
    let count = 0;
    for (const share of shares[good]) if (share === 0) count++;
    return count === 0 ? [] : [{ key: subjectKey(["zeros", name]), words: name, count }];
  });
}

/** Log prices far from the median of their cluster, measured by the median of all such distances. */
function outliers(data: FlaggedData): QualityFlag {
  const { clusterColumn, rowNumbers, goods } = data;
  const among = clusterColumn === undefined ? "from their median" : `from the median of their ${clusterColumn}`;
  let count = 0;
  const outlying = new Set<number>();
  const parts: Parts = [];
  data.logPrices.forEach((prices, good) => {
    const { at } = outlyingAt(prices, data.clusters);
    count += at.length;
    for (const row of at) outlying.add(rowNumbers[row]);
    const { name } = goods[good];
    if (at.length > 0) parts.push({ key: subjectKey(["outliers", name]), words: name, count: at.length });
  });
  const rows = [...outlying].sort((a, b) => a - b).slice(0, MOST_ROWS_NAMED);
  const far = `more than five median deviations ${among}`;
  if (count === 0) return { about: "outliers", sentence: `No log price lies ${far}.`, rows };
  const kept = count === 1 ? "It is kept." : "They are kept.";
  const sentence = `${counted(count, "log price lies", "log prices lie")} ${far}. ${kept}`;
  return { about: "outliers", sentence, rows, parts };
}

/** Prices that look as though they stood in other units. */
function unitValues({ goods, logPrices, rowNumbers }: FlaggedData): QualityFlag[] {
  const rows = new Set<number>();
  const parts = logPrices.flatMap((prices, good) => {
    const { at } = implausibleAt(prices);
    for (const row of at) rows.add(rowNumbers[row]);
    const { name } = goods[good];
    return at.length === 0 ? [] : [{ key: subjectKey(["unit values", name]), words: name, count: at.length }];
  });
  if (parts.length === 0) return [];
  const count = parts.reduce((sum, part) => sum + part.count, 0);
  const sentence = `${counted(count, "price is", "prices are")} more than ten times the median of the good, or less than a tenth. See whether quantities there are in other units.`;
  return [{ about: "unit values", sentence, rows: [...rows].sort((a, b) => a - b).slice(0, MOST_ROWS_NAMED), parts }];
}

function priceVariation({ goods, logPrices, weights, clusters, clusterColumn }: FlaggedData): QualityFlag {
  const byDeviation = [...goods].sort((a, b) => a.logPriceDeviation - b.logPriceDeviation);
  const [least] = byDeviation;
  const most = byDeviation[byDeviation.length - 1];
  const print = (good: (typeof goods)[number]) =>
    `${good.logPriceDeviation > 0 && good.logPriceDeviation < 0.001 ? printSize(good.logPriceDeviation) : printQuantity(good.logPriceDeviation, "deviation")} (${good.name})`;
  const sentences = [`Standard deviations of log prices run from ${print(least)} to ${print(most)}.`];
  const flat = byDeviation.filter((good) => good.logPriceDeviation < LITTLE_VARIATION).map((good) => good.name);
  if (flat.length > 0) {
    sentences.push(`So little variation in the price of ${listWords(flat)} tells next to nothing about its effects.`);
  }
  if (clusters && clusterColumn && most.logPriceDeviation > 0) {
    const between = betweenClusters(logPrices, weights, clusters);
    sentences.push(`Differences from one ${clusterColumn} to another account for ${printPercent(between, 0)} of it.`);
  }
  const { told, parts } = fewPrices(goods, logPrices);
  if (told.length > 0) sentences.push(told);
  return { about: "price variation", sentence: sentences.join(" "), rows: [], ...(parts.length > 0 && { parts }) };
}

/** Goods of few different prices: how many, and where the commonest stands. */
function fewPrices(goods: FlaggedData["goods"], logPrices: FlaggedData["logPrices"]) {
  const few = goods.flatMap(({ name }, good) => {
    const prices = logPrices[good].length > 4 * FEW_PRICES ? distinctPrices(logPrices[good], FEW_PRICES) : undefined;
    return prices ? [{ name, ...prices }] : [];
  });
  const words = few.filter(({ count }) => count > 1).map(({ name, count }) => `${name} only ${count}`);
  return {
    told: words.length === 0 ? "" : `Different prices: ${listWords(words)}.`,
    parts: few.map(({ name, at }): Parts[number] => ({
      key: subjectKey(["price variation", name]),
      words: `${name} at its commonest price`,
      count: at.length,
    })),
  };
}

/** Variance of cluster means over total variance, averaged over goods whose prices vary. */
function betweenClusters(logPrices: readonly Float64Array[], weights: Weights, clusters: Clusters): number {
  const parts = logPrices.flatMap((prices) => {
    const means = clusterMeans(prices, weights, clusters);
    const whole = weightedDeviation(prices, weights);
    return whole > 0 ? [(weightedDeviation(means, weights) / whole) ** 2] : [];
  });
  return parts.reduce((sum, part) => sum + part, 0) / parts.length;
}

/** In each row, the weighted mean of its cluster. */
function clusterMeans(values: Float64Array, weights: Weights, { codes, labels }: Clusters): Float64Array {
  const sums = new Float64Array(labels.length);
  const sizes = new Float64Array(labels.length);
  for (let row = 0; row < values.length; row++) {
    const weight = weights ? weights[row] : 1;
    sums[codes[row]] += weight * values[row];
    sizes[codes[row]] += weight;
  }
  return values.map((_, row) => sums[codes[row]] / sizes[codes[row]]);
}

function collinearity({ goods, logPrices, weights }: FlaggedData): QualityFlag {
  const { pairs, condition } = priceStructure(logPrices, weights);
  const close = pairs.filter(({ correlation }) => Math.abs(correlation) > NEARLY_COLLINEAR);
  const largest = pairs.at(0)?.correlation ?? 0;
  // Rounded away from zero, so that "above" stays true.
  const bound = printQuantity(Math.min(1, Math.ceil(Math.abs(largest) * 100) / 100), "money");
  const named = ({ goods: [i, j] }: (typeof pairs)[number]) => `${goods[i].name} and ${goods[j].name}`;
  const told = close
    .slice(0, MOST_PAIRS_TOLD)
    .map((pair) => `${named(pair)} correlate by ${printQuantity(pair.correlation, "deviation")}`);
  const more = close.length > told.length ? `, and ${counted(close.length - told.length, "more pair")} as closely` : "";
  const first =
    close.length > 0
      ? `Log prices of ${told.join("; ")}${more}: their effects can hardly be told apart.`
      : `No two log prices correlate above ${bound}${largest < 0 ? " in size" : ""}.`;
  const parts = close.slice(0, MOST_PAIRS_TOLD).map((pair) => ({
    key: subjectKey(["collinearity", goods[pair.goods[0]].name, goods[pair.goods[1]].name]),
    words: `where ${named(pair)} part most`,
    count: logPrices[0].length,
  }));
  const sentence = condition === undefined ? first : `${first} ${conditionInWords(condition)}`;
  return { about: "collinearity", sentence, rows: [], ...(parts.length > 0 && { parts }) };
}

function conditionInWords(condition: number): string {
  if (condition > 1e8) return "The correlation matrix of all is singular to working precision.";
  const number = `The condition number of the correlation matrix of all is ${printQuantity(condition, "percent")}`;
  return condition > ILL_CONDITIONED
    ? `${number}; beyond ${ILL_CONDITIONED} estimates depend on small errors.`
    : `${number}.`;
}

function shares(gaps: Float64Array, rowNumbers: Int32Array): QualityFlag[] {
  let largest = 0;
  const rows: number[] = [];
  let count = 0;
  gaps.forEach((gap, row) => {
    // A difference of a few units in the last place is how the sum is formed, not how it was printed.
    if (!(gap > 1e-12)) return;
    count++;
    largest = Math.max(largest, gap);
    if (rows.length < MOST_ROWS_NAMED) rows.push(rowNumbers[row]);
  });
  if (count === 0) return [];
  const sentence = `Printed shares of ${counted(count, "row")} miss one by up to ${printSize(largest)}; they were divided by their sum.`;
  return [{ about: "shares", sentence, rows, parts: [{ key: subjectKey(["shares"]), words: "these rows", count }] }];
}
