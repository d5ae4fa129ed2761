import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";

const known = new WeakMap<PreparedData, Int32Array>();

/**
 * Rows of the data in the order of time; every one is a period of its own (`requirePeriods` has seen to it).
 */
export function timeOrder(data: PreparedData): Int32Array {
  const found = known.get(data);
  if (found !== undefined) return found;
  const { time } = data;
  if (time === undefined) throw new RangeError("the data have no time column to put rows in order");
  const order = Int32Array.from(time.keys()).sort((one, two) => time[one] - time[two]);
  known.set(data, order);
  return order;
}

/**
 * Refuses data whose rows are not one period each: no time column, or two rows at the same time. `what` needs the
 * order, and `key` is where it was asked for.
 */
export function requirePeriods(data: PreparedData, what: string, key: readonly string[]): void {
  if (data.time === undefined) {
    const sentence = `${what} needs the rows in the order of time, and the data cell names no time column: give it time.`;
    throw new Refusal([{ sentence, key: [...key] }]);
  }
  const { time, rowNumbers } = data;
  const order = timeOrder(data);
  const tied = Array.from(order.keys()).filter((place) => place > 0 && time[order[place]] === time[order[place - 1]]);
  if (tied.length === 0) return;
  const [one, two] = [order[tied[0] - 1], order[tied[0]]].map((row) => rowNumbers[row]).sort((a, b) => a - b);
  const sentence = `${what} needs one row a period: ${data.rows} rows used share ${data.rows - tied.length} different times, first rows ${one} and ${two}.`;
  throw new Refusal([{ sentence, key: [...key], row: two }]);
}
