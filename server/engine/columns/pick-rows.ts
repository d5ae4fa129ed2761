import { newColumn } from "./shared-memory.ts";

/** The values of some rows, in that order. Adding zero gives zero one sign, so that equal columns have equal bytes. */
export function pickRows(values: Float64Array, rowIndices: Int32Array): Float64Array {
  const picked = newColumn(rowIndices.length);
  for (let at = 0; at < picked.length; at++) picked[at] = values[rowIndices[at]] + 0;
  return picked;
}
