/**
 * Columns on memory that every thread sees, so that a computation divided among threads reads the one copy
 * there is. They behave as any other `Float64Array`; `map` and `slice` of them do not stay on shared memory.
 */
export function newColumn(rows: number): Float64Array {
  return new Float64Array(new SharedArrayBuffer(rows * Float64Array.BYTES_PER_ELEMENT));
}

/** f of every value, on shared memory. */
export function mapColumn(column: Float64Array, f: (value: number, row: number) => number): Float64Array {
  const mapped = newColumn(column.length);
  for (let row = 0; row < mapped.length; row++) mapped[row] = f(column[row], row);
  return mapped;
}

/** The column itself where it is on shared memory, else a copy of its values as they are now. */
export function onSharedMemory(column: Float64Array): Float64Array {
  if (column.buffer instanceof SharedArrayBuffer) return column;
  const copy = newColumn(column.length);
  copy.set(column);
  return copy;
}
