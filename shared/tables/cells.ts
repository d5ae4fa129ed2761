import { printFixed, printPercent, printQuantity, type QuantityKind } from "./numbers.ts";
import type { TableCell } from "./table.ts";

export const EMPTY: TableCell = { kind: "empty" };

export function textCell(text: string): TableCell {
  return { kind: "text", text };
}

export function numberCell(value: number, kind: QuantityKind, unit?: string): TableCell {
  return { kind: "number", value, printed: printQuantity(value, kind), unit };
}

/** A fraction, kept as such and printed as per cent. */
export function percentCell(fraction: number): TableCell {
  return { kind: "number", value: fraction, printed: printPercent(fraction) };
}

/** An estimate over its standard error, both to the same decimals. */
export function estimateCell(value: number, standardError: number, decimals: number): TableCell {
  return {
    kind: "estimate",
    value,
    printed: printFixed(value, decimals),
    standardError,
    printedError: printFixed(standardError, decimals),
  };
}
