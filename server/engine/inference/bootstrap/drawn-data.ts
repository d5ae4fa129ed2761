import { pickRows } from "../../columns/pick-rows.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";

/** The data as if these rows had been sampled, each as often as it stands there; weights scaled to sum to them. */
export function dataOfRows(data: PreparedData, rows: Int32Array): PreparedData {
  const { labelled: _, clusters: __, ...kept } = data;
  const pick = (column: Float64Array) => pickRows(column, rows);
  const weights = data.weights && pick(data.weights);
  const scale = weights && rows.length / weights.reduce((sum, weight) => sum + weight, 0);
  return {
    ...kept,
    rows: rows.length,
    rowNumbers: Int32Array.from(rows, (row) => data.rowNumbers[row]),
    shares: data.shares.map(pick),
    logPrices: data.logPrices.map(pick),
    logTotal: pick(data.logTotal),
    ...(weights && { weights: weights.map((weight) => weight * (scale ?? 1)) }),
    ...(data.time && { time: pick(data.time) }),
    numeric: new Map([...data.numeric].map(([name, column]) => [name, pick(column)])),
  };
}
