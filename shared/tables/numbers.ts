/** Numbers as the product prints them: U+2212 for minus, a comma for thousands, digits by kind of quantity. */

/** Decimals by kind of quantity. */
export const DECIMALS = {
  coefficient: 4,
  entry: 4,
  share: 4,
  elasticity: 3,
  deviation: 3,
  probability: 3,
  money: 2,
  fit: 2,
  statistic: 1,
  percent: 1,
} as const;
export type QuantityKind = keyof typeof DECIMALS;

const MINUS = "\u2212";
export const THIN_SPACE = "\u2009";
const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

function withThousands(digits: string): string {
  const [whole, fraction] = digits.split(".");
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ",");
  return fraction === undefined ? grouped : `${grouped}.${fraction}`;
}

/**
 * A number to so many decimals. A zero that is exact prints as 0; one that rounds to it keeps its decimals and
 * has no sign, since its sign is not among the digits shown.
 */
export function printFixed(value: number, decimals: number): string {
  if (value === 0) return "0";
  const size = Math.abs(value);
  // toFixed turns to E-notation from 1e21 on; there the mantissa and a power of ten say as much.
  if (size >= 1e15) return printPower(value, 4);
  const digits = size.toFixed(decimals);
  const sign = value < 0 && Number(digits) !== 0 ? MINUS : "";
  return sign + withThousands(digits);
}

/** A number by the kind of quantity it is. */
export function printQuantity(value: number, kind: QuantityKind): string {
  return printFixed(value, DECIMALS[kind]);
}

/** A count: 4,812. */
export function printCount(count: number): string {
  return printFixed(count, 0);
}

/** A sum of weights that misses none or all by this much is none or all. */
const ROUNDING = 1e-12;

/**
 * A fraction as per cent, with a thin space: 99.0 %. What is not none does not print as none, nor what is not all as
 * all: below 0.1 %, above 99.9 %.
 */
export function printPercent(fraction: number, decimals: number = DECIMALS.percent): string {
  const rounded = Number((fraction * 100).toFixed(decimals));
  const step = 10 ** -decimals;
  const printed = (percent: number) => `${printFixed(percent, decimals)}${THIN_SPACE}%`;
  if (rounded === 0 && fraction > ROUNDING) return `below ${printed(step)}`;
  if (rounded === 100 && fraction < 1 - ROUNDING) return `above ${printed(100 - step)}`;
  return printed(fraction * 100);
}

function superscript(exponent: number): string {
  const digits = [...String(Math.abs(exponent))].map((digit) => SUPERSCRIPTS[Number(digit)]).join("");
  return exponent < 0 ? `⁻${digits}` : digits;
}

/** Mantissa and power of ten: 3 × 10⁻¹⁶, never E-notation. */
function printPower(value: number, significant: number): string {
  const [mantissa, exponent] = Math.abs(value)
    .toExponential(significant - 1)
    .split("e");
  return `${value < 0 ? MINUS : ""}${mantissa} × 10${superscript(Number(exponent))}`;
}

/** How large a difference is that ought to be none: one digit and a power of ten below 0.0001, two digits above. */
export function printSize(value: number): string {
  if (value === 0) return "0";
  const size = Math.abs(value);
  if (size < 1e-4) return printPower(value, 1);
  if (size >= 1000) return printFixed(value, 0);
  return printFixed(value, Math.max(0, 1 - Math.floor(Math.log10(size))));
}

/** A probability to three decimals; below 0.0005 it says so rather than print a zero. */
export function printProbability(probability: number): string {
  return probability < 0.0005 ? "below 0.001" : printQuantity(probability, "probability");
}

/** A printed number as programs read it: ASCII minus, no thousands commas. */
export function plainDigits(printed: string): string {
  return printed.replaceAll(MINUS, "-").replaceAll(",", "");
}

/**
 * Decimals (and a power of ten for the head) that show a whole table of like quantities with four
 * digits in its largest entry: quantities have whatever units were uploaded.
 */
export function digitsForAll(values: readonly number[]): { decimals: number; exponent: number } {
  const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  if (largest === 0) return { decimals: DECIMALS.entry, exponent: 0 };
  const magnitude = Math.floor(Math.log10(largest));
  const exponent = magnitude < -2 ? 3 * Math.floor((magnitude + 1) / 3) : 0;
  const scaled = magnitude - exponent;
  return { decimals: Math.min(DECIMALS.entry, Math.max(0, DECIMALS.entry - Math.max(0, scaled))), exponent };
}

/** "10⁻³", for a head that names the power of ten its entries are in. */
export function printPowerOfTen(exponent: number): string {
  return `10${superscript(exponent)}`;
}
