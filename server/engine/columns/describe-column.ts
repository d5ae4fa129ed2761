import type { UploadColumn } from "../../../shared/schemas/resources.ts";
import type { TableColumn } from "./prepared-data.ts";

const BINS = 12;
const FIRST_VALUES = 3;
/** Of a text; what is longer is cut. */
const LONGEST_VALUE = 40;

/** A column as the list of columns shows it; the counts are exact. */
export function describeColumn(column: TableColumn, missingWords: UploadColumn["missingWords"]): UploadColumn {
  if (column.type === "text") {
    let missing = 0;
    for (const code of column.codes) if (code < 0) missing++;
    const { name, type, levels, firstText } = column;
    const firstValues = firstOf(column.codes, (code) => (code < 0 ? undefined : levels[code].slice(0, LONGEST_VALUE)));
    return { name, type, missing, distinct: levels.length, firstValues, ...(firstText ? { firstText } : {}) };
  }
  return {
    name: column.name,
    type: "number",
    ...describeNumbers(column.values),
    firstValues: firstOf(column.values, (value) => (Number.isNaN(value) ? undefined : String(value))),
    ...(missingWords ? { missingWords } : {}),
  };
}

function firstOf<T>(cells: Iterable<T>, read: (cell: T) => string | undefined): string[] {
  const first: string[] = [];
  for (const cell of cells) {
    const value = read(cell);
    if (value !== undefined) first.push(value);
    if (first.length === FIRST_VALUES) break;
  }
  return first;
}

function describeNumbers(values: Float64Array): Omit<UploadColumn, "name" | "type"> {
  // Typed arrays sort NaN to the end.
  const sorted = values.slice().sort();
  let present = sorted.length;
  while (present > 0 && Number.isNaN(sorted[present - 1])) present--;
  const missing = values.length - present;
  if (present === 0) return { missing, distinct: 0, zeros: 0 };
  let distinct = 1;
  let zeros = sorted[0] === 0 ? 1 : 0;
  let mean = sorted[0] / present;
  for (let at = 1; at < present; at++) {
    if (sorted[at] !== sorted[at - 1]) distinct++;
    if (sorted[at] === 0) zeros++;
    // Divided first: the sum of doubles near the largest one would overflow.
    mean += sorted[at] / present;
  }
  const minimum = sorted[0];
  const maximum = sorted[present - 1];
  mean = Math.min(Math.max(mean, minimum), maximum);
  return { missing, distinct, minimum, maximum, mean, zeros, histogram: histogram(sorted.subarray(0, present)) };
}

/** Counts in twelve equal bins from the smallest to the largest; one bin where all are equal. */
function histogram(sorted: Float64Array): number[] {
  const minimum = sorted[0];
  const maximum = sorted[sorted.length - 1];
  if (minimum === maximum) return [sorted.length];
  const counts: number[] = new Array(BINS).fill(0);
  // Halved before subtracting, so that the width of the widest range is finite.
  const width = maximum / 2 - minimum / 2;
  for (const value of sorted) {
    const bin = width > 0 ? Math.floor(((value / 2 - minimum / 2) / width) * BINS) : 0;
    counts[Math.min(bin, BINS - 1)]++;
  }
  return counts;
}
