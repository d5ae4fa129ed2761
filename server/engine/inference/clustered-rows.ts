import { pickRows } from "../columns/pick-rows.ts";
import type { MomentSource } from "../estimation/moment-source.ts";

/** Which rows belong together. */
export interface ClusterCodes {
  /** Of each row of the source, from 0 to `count` − 1, each used. */
  readonly codes: ArrayLike<number>;
  readonly count: number;
}

/** A source whose rows stand cluster by cluster: those of cluster g from `starts[g]` to before `starts[g + 1]`. */
export interface ClusteredRows {
  readonly source: MomentSource;
  readonly starts: Int32Array;
  /** The rows in that order, by their places before. */
  readonly order: Int32Array;
}

/** Brings rows of a cluster together, in their own order within it; rows that stand so already are not copied. */
export function clusterRows(source: MomentSource, { codes, count }: ClusterCodes): ClusteredRows {
  const starts = new Int32Array(count + 1);
  for (let t = 0; t < source.rows; t++) starts[codes[t] + 1]++;
  for (let cluster = 0; cluster < count; cluster++) starts[cluster + 1] += starts[cluster];
  const next = starts.slice();
  const order = new Int32Array(source.rows);
  let moved = false;
  for (let t = 0; t < source.rows; t++) {
    const place = next[codes[t]]++;
    order[place] = t;
    if (place !== t) moved = true;
  }
  return { source: moved ? inOrder(source, order) : source, starts, order };
}

function inOrder(source: MomentSource, order: Int32Array): MomentSource {
  return {
    ...source,
    columns: source.columns.map((column) => pickRows(column, order)),
    responses: source.responses.map((column) => pickRows(column, order)),
    ...(source.weights && { weights: pickRows(source.weights, order) }),
  };
}
