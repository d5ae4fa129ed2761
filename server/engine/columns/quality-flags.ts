import type { z } from "zod";
import type { DataFinding, qualityFlag } from "../../../shared/schemas/data.ts";
import { counted, listWords } from "../../../shared/study/words.ts";
import { printPercent, printQuantity, printSize } from "../../../shared/tables/numbers.ts";
import { type ClusterGroups, type Clusters, groupByCluster } from "./clusters.ts";
import { pickRows } from "./pick-rows.ts";
import { type Weights, weightedCorrelation, weightedDeviation } from "./weighted.ts";

type QualityFlag = z.infer<typeof qualityFlag>;

/** Above this share of rows that bought none, equations that ignore the zeros mislead. */
const MANY_ZEROS = 0.05;
const OUTLYING_DEVIATIONS = 5;
/** Below this a price hardly varies: one per cent up or down. */
const LITTLE_VARIATION = 0.01;
const NEARLY_COLLINEAR = 0.95;
const MOST_ROWS_NAMED = 200;

export interface FlaggedData {
  readonly goods: DataFinding["goods"];
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
    priceVariation(data),
    collinearity(data),
    ...(data.shareGaps ? shares(data.shareGaps, data.rowNumbers) : []),
  ];
}

function zeros({ goods }: FlaggedData): QualityFlag {
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
  return { about: "zeros", sentence: `Not bought: ${listWords(told)} of the rows used. ${judged}`, rows: [] };
}

/** Log unit values far from the median of their cluster, measured by the median of all such distances. */
function outliers(data: FlaggedData): QualityFlag {
  const { clusterColumn, rowNumbers } = data;
  const among = clusterColumn === undefined ? "from their median" : `from the median of their ${clusterColumn}`;
  const groups = data.clusters && groupByCluster(data.clusters);
  let count = 0;
  const outlying = new Set<number>();
  for (const prices of data.logPrices) {
    const distances = distancesFromMedian(prices, groups);
    const typical = median(distances.slice().sort());
    if (!(typical > 0)) continue;
    for (let row = 0; row < distances.length; row++) {
      if (distances[row] <= OUTLYING_DEVIATIONS * typical) continue;
      count++;
      outlying.add(rowNumbers[row]);
    }
  }
  const rows = [...outlying].sort((a, b) => a - b).slice(0, MOST_ROWS_NAMED);
  const far = `more than five median deviations ${among}`;
  const sentence =
    count === 0
      ? `No log price lies ${far}.`
      : `${counted(count, "log price lies", "log prices lie")} ${far}. They are kept.`;
  return { about: "outliers", sentence: count === 1 ? sentence.replace("They are", "It is") : sentence, rows };
}

function distancesFromMedian(values: Float64Array, groups: ClusterGroups | undefined): Float64Array {
  if (groups === undefined) {
    const centre = median(values.slice().sort());
    return values.map((value) => Math.abs(value - centre));
  }
  const { order, starts } = groups;
  const distances = new Float64Array(values.length);
  for (let cluster = 0; cluster + 1 < starts.length; cluster++) {
    const members = order.subarray(starts[cluster], starts[cluster + 1]);
    const centre = median(pickRows(values, members).sort());
    for (let at = 0; at < members.length; at++) distances[members[at]] = Math.abs(values[members[at]] - centre);
  }
  return distances;
}

function median(sorted: Float64Array): number {
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
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
  return { about: "price variation", sentence: sentences.join(" "), rows: [] };
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
  let largest = 0;
  let pair = "";
  for (let i = 0; i < goods.length; i++) {
    for (let j = 0; j < i; j++) {
      const correlation = weightedCorrelation(logPrices[i], logPrices[j], weights);
      if (!(Math.abs(correlation) > Math.abs(largest))) continue;
      largest = correlation;
      pair = `${goods[j].name} and ${goods[i].name}`;
    }
  }
  // Rounded away from zero, so that "above" stays true.
  const bound = printQuantity(Math.min(1, Math.ceil(Math.abs(largest) * 100) / 100), "money");
  const sentence =
    Math.abs(largest) > NEARLY_COLLINEAR
      ? `Log prices of ${pair} correlate by ${printQuantity(largest, "deviation")}: their effects can hardly be told apart.`
      : `No two log prices correlate above ${bound}${largest < 0 ? " in size" : ""}.`;
  return { about: "collinearity", sentence, rows: [] };
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
  return [{ about: "shares", sentence, rows }];
}
