import { pickRows } from "../../server/engine/columns/pick-rows.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";

/** The drawn rows as data of their own, each written out as often as it was drawn. */
export function written(data: PreparedData, rows: readonly number[]): PreparedData {
  const order = Int32Array.from(rows);
  const pick = (column: Float64Array) => pickRows(column, order);
  const { time: _, ...timeless } = data;
  const weights = data.weights && pick(data.weights);
  const sum = weights?.reduce((total, weight) => total + weight, 0) ?? 1;
  return {
    ...timeless,
    rows: order.length,
    shares: data.shares.map(pick),
    logPrices: data.logPrices.map(pick),
    logTotal: pick(data.logTotal),
    ...(weights && { weights: weights.map((weight) => (weight * order.length) / sum) }),
    numeric: new Map([...data.numeric].map(([name, column]) => [name, pick(column)])),
  };
}
