const SERIES = ["s1", "s2", "s3", "s4", "s5", "s6"] as const;
const DASHES = ["solid", "dash", "dot"] as const;

/** The token of the i-th series of a figure; beyond six they come again. */
export const seriesOf = (i: number): (typeof SERIES)[number] => SERIES[i % SERIES.length];

/** Beyond six series the colours come again dashed, then dotted. */
export const dashOf = (i: number): (typeof DASHES)[number] => DASHES[Math.floor(i / SERIES.length) % DASHES.length];

/** Beginnings of numbers that an axis is marked at, where fewer of them are too few. */
const DIGITS = [
  [1, 2, 5],
  [1, 2, 3, 4, 5, 7],
  [1, 1.5, 2, 2.5, 3, 3.5, 4, 4.5, 5, 6, 7, 8, 9],
];

/** Numbers that begin with 1, 2 or 5, as many as lie between two totals; with further digits, where these are fewer than `least`. */
export function ticksBetween(low: number, high: number, least = 0): number[] {
  const all = DIGITS.map((digits) => multiplesBetween(low, high, digits));
  return all.find((ticks) => ticks.length >= least) ?? all[all.length - 1];
}

function multiplesBetween(low: number, high: number, digits: readonly number[]): number[] {
  const decades = Array.from(
    { length: Math.ceil(Math.log10(high)) - Math.floor(Math.log10(low)) + 1 },
    (_, i) => Math.floor(Math.log10(low)) + i,
  );
  const ticks = decades.flatMap((decade) => digits.map((digit) => Number(`${digit}e${decade}`)));
  return ticks.filter((tick) => tick >= low && tick <= high);
}

/** The values in their order, each moved up as little as keeps it `apart` from the one below. */
export function standApart(values: readonly number[], apart: number): number[] {
  const order = values.map((_, i) => i).sort((one, two) => values[one] - values[two]);
  const placed = [...values];
  order.forEach((i, rank) => {
    if (rank > 0) placed[i] = Math.max(placed[i], placed[order[rank - 1]] + apart);
  });
  return placed;
}
