import { pickRows } from "../columns/pick-rows.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { timeOrder } from "./time-order.ts";

/** What the equations explain, and from which rows, where it is not the shares at every row used. */
export interface SampleRequest {
  readonly responses: Responses;
  /** Every column but the constant as its change from the period before. */
  readonly differences: boolean;
  /** The first period has no period before it whose shares an index could be weighted with. */
  readonly lagged: boolean;
}

/** w_i; p_i q_i in units of estimation; Δw_i follows from `differences`; w̄_it Δln q_it of Rotterdam. */
export type Responses = "shares" | "expenditures" | "contributions to volume";

/** Rows of the equations by rows of the data: each row and, where columns are changes, the one before it. */
export interface Arrangement {
  readonly rows: Int32Array;
  readonly before?: Int32Array;
}

/**
 * The rows a request leaves, in the order of time wherever time matters; absent where they are the data's own.
 *
 * Errors: `Refusal` under `key` without a time column, or where two rows have the same time.
 */
export function arrangementOf(data: PreparedData, sample: SampleRequest | undefined): Arrangement | undefined {
  if (sample === undefined || !(sample.differences || sample.lagged)) return undefined;
  const order = timeOrder(data);
  const first = sample.lagged ? 1 : 0;
  if (!sample.differences) return { rows: order.slice(first) };
  return { rows: order.slice(first + 1), before: order.slice(first, -1) };
}

/** A column of the data over the rows of the equations: levels, or changes from the row before. */
export function arranged(values: Float64Array, arrangement: Arrangement | undefined): Float64Array {
  if (arrangement === undefined) return values;
  const { rows, before } = arrangement;
  if (before === undefined) return pickRows(values, rows);
  return Float64Array.from(rows, (row, t) => values[row] - values[before[t]]);
}

/** Weights of the later of two rows, scaled to sum to the rows of the equations. */
export function arrangedWeights(weights: Float64Array, arrangement: Arrangement | undefined): Float64Array {
  if (arrangement === undefined) return weights;
  const picked = pickRows(weights, arrangement.rows);
  const scale = picked.length / picked.reduce((sum, weight) => sum + weight, 0);
  return picked.map((weight) => weight * scale);
}

/** The responses of every good over the rows of the equations. */
export function responsesOf(
  data: PreparedData,
  sample: SampleRequest | undefined,
  arrangement: Arrangement | undefined,
): readonly Float64Array[] {
  switch (sample?.responses) {
    case undefined:
    case "shares":
      return data.shares.map((share) => arranged(share, arrangement));
    case "expenditures":
      return data.shares.map((share) =>
        arranged(
          share.map((value, t) => value * Math.exp(data.logTotal[t])),
          arrangement,
        ),
      );
    case "contributions to volume":
      return contributionsToVolume(data);
  }
}

/** What a refusal or a table calls the response of a good. */
export function responseLabel(good: string, sample: SampleRequest | undefined): string {
  if (sample?.responses === "expenditures") return `the expenditure on ${good}`;
  if (sample?.responses === "contributions to volume") return `the contribution of ${good} to the change of volume`;
  return sample?.differences ? `the change in the share of ${good}` : `the share of ${good}`;
}

/**
 * w̄_it Δln q_it over consecutive periods, w̄_it = ½(w_it + w_i,t−1): what the Rotterdam system explains
 * (Theil 1965, Econometrica 33, 67–87).
 *
 * Errors: a good of which nothing was bought in some row has no ln q.
 */
function contributionsToVolume(data: PreparedData): Float64Array[] {
  requirePurchases(data);
  const order = timeOrder(data);
  return data.shares.map((share, i) => {
    const logQuantity = (row: number) => Math.log(share[row]) + data.logTotal[row] - data.logPrices[i][row];
    return Float64Array.from({ length: order.length - 1 }, (_, t) => {
      const [before, row] = [order[t], order[t + 1]];
      return 0.5 * (share[before] + share[row]) * (logQuantity(row) - logQuantity(before));
    });
  });
}

/** ln Q by row of the data, 0 in the first period: the running sum of Σ_i w̄_it Δln q_it in the order of time. */
export function logVolume(data: PreparedData): Float64Array {
  const contributions = contributionsToVolume(data);
  const volume = new Float64Array(data.rows);
  const order = timeOrder(data);
  let sum = 0;
  for (let t = 1; t < order.length; t++) {
    for (const contribution of contributions) sum += contribution[t - 1];
    volume[order[t]] = sum;
  }
  return volume;
}

function requirePurchases({ shares, goods, rowNumbers }: PreparedData): void {
  const problems = shares.flatMap((share, i) => {
    let none = 0;
    for (const value of share) if (!(value > 0)) none++;
    if (none === 0) return [];
    const row = rowNumbers[share.findIndex((value) => !(value > 0))];
    const rows = none === 1 ? "1 row" : `${none} of the ${share.length} rows`;
    const sentence = `The Rotterdam system needs the log of every quantity, and nothing of ${goods[i]} is bought in ${rows} used, first in row ${row}.`;
    return [{ sentence, key: ["form"], row }];
  });
  if (problems.length > 0) throw new Refusal(problems);
}
