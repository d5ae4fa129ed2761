import type { PreparedData } from "../columns/prepared-data.ts";
import type { RunControl } from "../run.ts";
import { type Moments, reduceRows } from "./moments.ts";
import { type MomentsRequest, sourceOf } from "./request.ts";

/** Reads the rows of the data once for everything that specifications with this request will ask. */
export function accumulateMoments(data: PreparedData, request: MomentsRequest, control: RunControl): Moments {
  return reduceRows(sourceOf(data, request), request.key, control);
}
