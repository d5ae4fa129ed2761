import type { CellSource } from "./cell-source.ts";
import { describeChanges } from "./changes.ts";
import { inOrder } from "./order.ts";

type Cell = Pick<CellSource, "name" | "kind" | "order" | "source">;

/** What was done to a cell, in words that go on after its name or its author's. */
export interface CellDifference {
  /** "added", "removed", or undefined for a cell that was there before and after. */
  readonly whole?: "added" | "removed";
  /** The name it had before, where that is another. */
  readonly renamedFrom?: string;
  readonly moved: boolean;
  /** "form changed from la-aids to aids"; undefined while the source is the same. */
  readonly source?: string;
}

/** What differs between a cell at two times; undefined when nothing does. */
export function cellDifference(before: Cell | undefined, after: Cell | undefined): CellDifference | undefined {
  if (before === undefined || after === undefined) {
    if (before === undefined && after === undefined) return undefined;
    return { whole: before === undefined ? "added" : "removed", moved: false };
  }
  const source = sourceDifference(before, after);
  const renamed = before.name !== after.name;
  const moved = before.order !== after.order;
  if (!renamed && !moved && source === undefined) return undefined;
  return { ...(renamed && { renamedFrom: before.name }), moved, ...(source !== undefined && { source }) };
}

function sourceDifference(before: Cell, after: Cell): string | undefined {
  if (before.kind !== after.kind) return `its kind changed from ${before.kind} to ${after.kind}`;
  if (before.source === after.source) return undefined;
  if (after.kind === "text") return wordsWritten(before.source, after.source);
  return describeChanges(before.source, after.source) ?? "comments or layout changed";
}

function wordsWritten(before: string, after: string): string {
  const count = (text: string) => text.split(/\s+/).filter(Boolean).length;
  const more = count(after) - count(before);
  if (more === 0) return "reworded";
  return more > 0
    ? `longer by ${more} ${more === 1 ? "word" : "words"}`
    : `shorter by ${-more} ${more === -1 ? "word" : "words"}`;
}

/** A cell that differs between two states of a study. */
export interface StateDifference {
  readonly cellId: string;
  readonly before?: CellSource;
  readonly after?: CellSource;
  readonly difference: CellDifference;
}

/** What differs between two states of a study, in the order of the later, then what it has no more. */
export function stateDifferences(before: readonly CellSource[], after: readonly CellSource[]): StateDifference[] {
  const [old, fresh] = [new Map(before.map((cell) => [cell.id, cell])), new Map(after.map((cell) => [cell.id, cell]))];
  const ids = new Set([...inOrder(after), ...inOrder(before)].map(({ id }) => id));
  return [...ids].flatMap((cellId) => {
    const [one, other] = [old.get(cellId), fresh.get(cellId)];
    const difference = cellDifference(one, other);
    return difference === undefined
      ? []
      : [{ cellId, difference, ...(one && { before: one }), ...(other && { after: other }) }];
  });
}
