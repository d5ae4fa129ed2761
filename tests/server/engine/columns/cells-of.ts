import { bytesInMemory } from "../../../../server/engine/columns/file-bytes.ts";
import type { TableColumn } from "../../../../server/engine/columns/prepared-data.ts";
import { type ReadTable, readTable } from "../../../../server/engine/columns/read-table.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";

export function cellsOf(column: TableColumn): (number | string | null)[] {
  if (column.type === "number") return Array.from(column.values, (value) => (Number.isNaN(value) ? null : value));
  return Array.from(column.codes, (code) => (code < 0 ? null : column.levels[code]));
}

export const readBytes = (bytes: Uint8Array, name: string, sheet?: string): Promise<ReadTable> =>
  readTable(bytesInMemory(bytes), name, { sheet });

/** Cells by column name. */
export async function cellsByName(bytes: Uint8Array, name: string, sheet?: string) {
  const { table } = await readBytes(bytes, name, sheet);
  return Object.fromEntries(table.columns.map((column) => [column.name, cellsOf(column)]));
}

export async function refusalOf(bytes: Uint8Array, name: string): Promise<Refusal> {
  const outcome = await readBytes(bytes, name).catch((error: unknown) => error);
  if (!(outcome instanceof Refusal))
    throw new Error(`not refused: ${outcome instanceof Error ? outcome.stack : "read"}`);
  return outcome;
}
