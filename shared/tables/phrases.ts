import { printCount, printFixed, THIN_SPACE } from "./numbers.ts";

/** "a", "a and b", "a, b and c". */
export function listed(words: readonly string[]): string {
  if (words.length < 2) return words.join("");
  return `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;
}

/** "1 row", "4,812 rows". */
export function countedRows(count: number): string {
  return `${printCount(count)} ${count === 1 ? "row" : "rows"}`;
}

/** "the one row", "all 4,812 rows". */
export function everyRow(count: number): string {
  return count === 1 ? "the one row" : `all ${countedRows(count)}`;
}

/** "The system is not defined in 3 of 338 rows."; nothing where it is defined in all. */
export function undefinedSentence(without: { readonly rows: number } | undefined, of: number): string[] {
  if (without === undefined) return [];
  return [`The system is not defined in ${printCount(without.rows)} of ${countedRows(of)}.`];
}

/** "95 % interval −0.0140 to −0.0021". */
export function intervalInWords([low, high]: readonly [number, number], decimals: number): string {
  return `95${THIN_SPACE}% interval ${printFixed(low, decimals)} to ${printFixed(high, decimals)}`;
}

export function capital(text: string): string {
  return text.slice(0, 1).toUpperCase() + text.slice(1);
}
