import type { SchemaElement } from "hyparquet";
import { parseFloat16 } from "hyparquet/src/convert.js";
import { dayText, momentText } from "../calendar-text.ts";

/** What a cell of a kind of column is: a number, a text, or a number too large to be kept exactly. */
export type CellOf = (value: unknown) => number | string | bigint;

const LARGEST_EXACT = 2 ** 53;
const DECODER = new TextDecoder("utf-8", { fatal: true });

/** How the values of a column are read, by its declared kind; `text` where they are texts. */
export function cellReader(element: SchemaElement): { readonly kind: "number" | "text"; readonly cell: CellOf } {
  const { type, converted_type: old, logical_type: now, scale } = element;
  if (now?.type === "DECIMAL" || old === "DECIMAL") {
    const places = (now?.type === "DECIMAL" ? now.scale : scale) ?? scale ?? 0;
    return { kind: "number", cell: (value) => decimal(unscaled(value), places) };
  }
  if (now?.type === "DATE" || old === "DATE") return text((value) => dayText(value as number));
  if (type === "INT96") return text((value) => momentText(ofJulian(value as bigint), 1_000_000_000n));
  const perSecond = ticks(element);
  if (perSecond !== undefined) return text((value) => momentText(BigInt(value as number | bigint), perSecond));
  if (now?.type === "FLOAT16")
    return { kind: "number", cell: (value) => parseFloat16(value as Uint8Array) ?? Number.NaN };
  if (now?.type === "UUID") return text((value) => uuid(value as Uint8Array));
  if (type === "BYTE_ARRAY" || type === "FIXED_LEN_BYTE_ARRAY") {
    return text((value) => DECODER.decode(value as Uint8Array));
  }
  if (type === "BOOLEAN") return { kind: "number", cell: (value) => (value ? 1 : 0) };
  if (type === "INT64") {
    const unsigned = old === "UINT_64" || (now?.type === "INTEGER" && !now.isSigned);
    return {
      kind: "number",
      cell: (value) => whole(unsigned ? BigInt.asUintN(64, value as bigint) : (value as bigint)),
    };
  }
  if (old === "UINT_32" || (now?.type === "INTEGER" && !now.isSigned)) {
    return { kind: "number", cell: (value) => (value as number) >>> 0 };
  }
  return { kind: "number", cell: (value) => value as number };
}

const text = (cell: CellOf) => ({ kind: "text" as const, cell });

/** A whole number where doubles hold it exactly, else itself, to be refused. */
function whole(value: bigint): number | bigint {
  const number = Number(value);
  return Math.abs(number) <= LARGEST_EXACT ? number : value;
}

/** The double nearest to the decimal, as reading it from a text would give. */
function decimal(value: bigint, places: number): number {
  const number = Number(value);
  // Two exact doubles divided are rounded once.
  if (Math.abs(number) <= LARGEST_EXACT && places <= 22) return number / 10 ** places;
  return Number(`${value}e-${places}`);
}

function unscaled(value: unknown): bigint {
  if (!(value instanceof Uint8Array)) return BigInt(value as number | bigint);
  let whole = 0n;
  for (const byte of value) whole = (whole << 8n) | BigInt(byte);
  return BigInt.asIntN(8 * value.length, whole);
}

/** Ticks a second of a moment, where the column has moments. */
function ticks({ converted_type: old, logical_type: now }: SchemaElement): bigint | undefined {
  const units = { MILLIS: 1_000n, MICROS: 1_000_000n, NANOS: 1_000_000_000n };
  if (now?.type === "TIMESTAMP") return units[now.unit];
  if (old === "TIMESTAMP_MILLIS") return units.MILLIS;
  return old === "TIMESTAMP_MICROS" ? units.MICROS : undefined;
}

/** Nanoseconds since 1970 of the older kind of moment: the day by Julian count, and the nanoseconds within it. */
function ofJulian(value: bigint): bigint {
  return ((value >> 64n) - 2_440_588n) * 86_400_000_000_000n + (value & 0xffff_ffff_ffff_ffffn);
}

function uuid(bytes: Uint8Array): string {
  const digits = Buffer.from(bytes).toString("hex");
  return digits.replace(/^(.{8})(.{4})(.{4})(.{4})(.{12})$/, "$1-$2-$3-$4-$5");
}
