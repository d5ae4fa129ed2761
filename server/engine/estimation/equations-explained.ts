import type { EquationsExplained } from "../../../shared/schemas/equations.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { SampleRequest } from "./sample.ts";

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
  };
}
