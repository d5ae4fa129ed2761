import type { CellSource } from "./cell-source.ts";

/** What one edit did to one cell: the cell before and after, absent where there was or is none. */
export interface CellEdit {
  readonly cellId: string;
  readonly before?: CellSource;
  readonly after?: CellSource;
}

export function isSameCell(a: CellSource | undefined, b: CellSource | undefined): boolean {
  if (a === undefined || b === undefined) return a === b;
  return a.name === b.name && a.kind === b.kind && a.order === b.order && a.source === b.source;
}
