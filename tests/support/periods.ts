import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { Random } from "../../shared/numerics/random.ts";

/** The rows as periods in an order of their own: times 1, 2, … drawn without replacement. */
export function inPeriods(data: PreparedData, random: Random): PreparedData {
  const time = Float64Array.from({ length: data.rows }, (_, t) => t + 1);
  for (let row = time.length - 1; row > 0; row--) {
    const other = random.integer(row + 1);
    [time[row], time[other]] = [time[other], time[row]];
  }
  return { ...data, time };
}

/** The rows in another order, every column with them. */
export function reordered(data: PreparedData, order: readonly number[]): PreparedData {
  const pick = (column: Float64Array) => Float64Array.from(order, (row) => column[row]);
  return {
    ...data,
    rows: order.length,
    rowNumbers: Int32Array.from(order, (row) => data.rowNumbers[row]),
    shares: data.shares.map(pick),
    logPrices: data.logPrices.map(pick),
    logTotal: pick(data.logTotal),
    numeric: new Map([...data.numeric].map(([name, column]) => [name, pick(column)])),
    ...(data.weights && { weights: pick(data.weights) }),
    ...(data.time && { time: pick(data.time) }),
  };
}

/** Rows of the data in the order of time. */
export function rowsByTime({ time }: PreparedData): number[] {
  return Array.from(time!.keys()).sort((one, two) => time![one] - time![two]);
}
