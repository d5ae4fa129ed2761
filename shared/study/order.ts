import type { CellSource } from "./cell-source.ts";

/**
 * Fractional order keys: a key is the digits after the point of a number in (0, 1), base 62, in the
 * order of ASCII, never ending in the lowest digit. Between any two there is always another, so a move writes one key
 * only, and two people moving different cells at once never collide; two who put cells into the same
 * gap get equal keys, which the cells' ids then part.
 */
const DIGITS = "0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz";
const LOWEST = DIGITS[0];

/** A key after `lower` and before `upper`; an absent bound is the beginning or the end. */
export function between(lower?: string, upper?: string): string {
  const low = checked(lower ?? "");
  const high = upper === undefined ? undefined : checked(upper);
  if (high !== undefined && low >= high) {
    throw new RangeError(`order key ${low} does not come before ${high}`);
  }
  let key = "";
  let bounded = high;
  for (let i = 0; ; i++) {
    const from = i < low.length ? DIGITS.indexOf(low[i]) : 0;
    const to = bounded === undefined ? DIGITS.length : i < bounded.length ? DIGITS.indexOf(bounded[i]) : 0;
    if (to - from > 1) return key + DIGITS[from + Math.floor((to - from) / 2)];
    key += DIGITS[from];
    // Once a digit below the upper bound is taken, anything that follows stays below it.
    if (to > from) bounded = undefined;
  }
}

/** `count` keys in ascending order, for cells laid down together. */
export function spread(count: number): string[] {
  const width = count < DIGITS.length - 1 ? 1 : Math.ceil(Math.log(count + 1) / Math.log(DIGITS.length));
  const room = DIGITS.length ** width;
  return Array.from({ length: count }, (_, i) => {
    let number = Math.floor(((i + 1) * room) / (count + 1));
    let key = "";
    for (let digit = 0; digit < width; digit++) {
      key = DIGITS[number % DIGITS.length] + key;
      number = Math.floor(number / DIGITS.length);
    }
    return trimmed(key);
  });
}

/** The cells as a study shows them: by order key, then by id. */
export function inOrder<T extends Pick<CellSource, "order" | "id">>(cells: readonly T[]): T[] {
  return cells.toSorted((a, b) => compare(a.order, b.order) || compare(a.id, b.id));
}

/**
 * The key that puts a cell between two neighbours as they stand. Neighbours with equal keys (moved
 * into one gap at once) leave no room between them: the key then goes after both.
 */
export function betweenCells(before?: Pick<CellSource, "order">, after?: Pick<CellSource, "order">): string {
  const [low, high] = [before?.order, after?.order];
  if (low !== undefined && high !== undefined && low >= high) return between(low);
  return between(low, high);
}

const compare = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

function trimmed(key: string): string {
  return key.replace(/0+$/, "");
}

/** A key from another hand may hold any characters: what is no digit reads as the lowest. */
function checked(key: string): string {
  return trimmed([...key].map((digit) => (DIGITS.includes(digit) ? digit : LOWEST)).join(""));
}
