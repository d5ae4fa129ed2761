import type { EquationsExplained } from "../../../shared/schemas/equations.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { SampleRequest } from "./sample.ts";
import { timeOrder } from "./time-order.ts";

/** What a finding says of its equations, where they do not explain the shares of every row used. */
export function equationsExplainedBy(
  sample: SampleRequest | undefined,
  data: PreparedData,
  rows: number,
): EquationsExplained | undefined {
  if (sample === undefined) return undefined;
  const explains =
    sample.responses === "shares" && sample.differences ? ("changes of shares" as const) : sample.responses;
  return {
    explains,
    leftOut: data.rows - rows,
    because: [
      ...(sample.lagged ? (["lagged shares"] as const) : []),
      ...(sample.differences ? (["differences"] as const) : []),
    ],
    gaps: sample.lagged || sample.differences ? gapsBefore(data, rows) : 0,
  };
}

/** Of the last `rows` periods, those after a gap: a step of time longer than the shortest. */
function gapsBefore(data: PreparedData, rows: number): number {
  const time = data.time!;
  const order = timeOrder(data);
  const steps = Array.from(order.subarray(1), (row, place) => time[row] - time[order[place]]);
  const shortest = Math.min(...steps);
  return steps.slice(-rows).filter((step) => step > shortest * (1 + 1e-9)).length;
}
