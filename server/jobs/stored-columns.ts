import { endianness } from "node:os";
import type { UploadColumn } from "../../shared/schemas/resources.ts";
import type { TableColumn } from "../engine/columns/prepared-data.ts";

/** A row of `upload_columns` but for the upload it belongs to. */
export interface StoredColumn {
  readonly position: number;
  readonly name: string;
  readonly type: "number" | "text";
  readonly description: string;
  readonly levels: string | null;
  readonly values: Buffer;
}

export function storeColumn(column: TableColumn, description: UploadColumn, position: number): StoredColumn {
  const isNumber = column.type === "number";
  const values = isNumber ? column.values : column.codes;
  return {
    position,
    name: column.name,
    type: column.type,
    description: JSON.stringify(description),
    levels: isNumber ? null : JSON.stringify(column.levels),
    values: littleEndian(Buffer.from(values.buffer, values.byteOffset, values.byteLength), values.BYTES_PER_ELEMENT),
  };
}

/** Errors: a column whose length is not the upload's. */
export function loadColumn(stored: StoredColumn, rows: number): TableColumn {
  const { name, type } = stored;
  const size = type === "number" ? 8 : 4;
  if (stored.values.byteLength !== size * rows) {
    const held = stored.values.byteLength / size;
    throw new Error(`the stored column ${name} has ${held} values, its upload has ${rows} rows`);
  }
  // A copy of its own: typed arrays need their bytes aligned.
  const bytes = littleEndian(Uint8Array.prototype.slice.call(stored.values), size);
  if (type === "number") return { name, type, values: new Float64Array(bytes.buffer, bytes.byteOffset, rows) };
  const { firstText } = JSON.parse(stored.description) as UploadColumn;
  return {
    name,
    type,
    codes: new Int32Array(bytes.buffer, bytes.byteOffset, rows),
    levels: JSON.parse(stored.levels ?? "[]") as string[],
    ...(firstText && { firstText }),
  };
}

/** The same bytes where memory is little-endian, as nearly everywhere; else a swapped copy. */
function littleEndian<T extends Uint8Array>(bytes: T, size: number): T {
  if (endianness() === "LE") return bytes;
  const swapped = Buffer.from(bytes);
  return (size === 8 ? swapped.swap64() : swapped.swap32()) as Uint8Array as T;
}
