/**
 * What an expression may do, by name. Truth is 1, falsehood 0, missing NaN. A result that is no finite number
 * (a division by zero, the logarithm of zero, an overflow) is missing, at whatever depth it arises.
 */
export interface Operation {
  readonly least: number;
  readonly most: number;
  readonly apply: (values: readonly number[]) => number;
}

const finite = (value: number) => (Number.isFinite(value) ? value : Number.NaN);

const unary = (of: (a: number) => number): Operation => ({ least: 1, most: 1, apply: ([a]) => finite(of(a)) });
const binary = (of: (a: number, b: number) => number): Operation => ({
  least: 2,
  most: 2,
  apply: ([a, b]) => finite(of(a, b)),
});
/** A comparison with something missing is itself missing. */
const comparison = (of: (a: number, b: number) => boolean) =>
  binary((a, b) => (Number.isNaN(a) || Number.isNaN(b) ? Number.NaN : Number(of(a, b))));

/** To so many decimals, halves away from zero. */
function roundTo(value: number, decimals = 0): number {
  const scale = 10 ** decimals;
  return (Math.sign(value) * Math.round(Math.abs(value) * scale)) / scale;
}

/** The remainder with the sign of the divisor: months 1 to 36 fold to a year by mod(month - 1, 12). */
const modulo = (a: number, b: number) => a - b * Math.floor(a / b);

/** Functions a person writes by name. */
export const FUNCTIONS: Readonly<Record<string, Operation>> = {
  log: unary(Math.log),
  ln: unary(Math.log),
  log10: unary(Math.log10),
  log2: unary(Math.log2),
  log1p: unary(Math.log1p),
  exp: unary(Math.exp),
  expm1: unary(Math.expm1),
  sqrt: unary(Math.sqrt),
  cbrt: unary(Math.cbrt),
  abs: unary(Math.abs),
  sign: unary(Math.sign),
  floor: unary(Math.floor),
  ceil: unary(Math.ceil),
  sin: unary(Math.sin),
  cos: unary(Math.cos),
  mod: binary(modulo),
  round: { least: 1, most: 2, apply: ([value, decimals]) => finite(roundTo(value, decimals)) },
  min: { least: 1, most: 50, apply: (values) => Math.min(...values) },
  max: { least: 1, most: 50, apply: (values) => Math.max(...values) },
  missing: { least: 1, most: 1, apply: ([value]) => Number(Number.isNaN(value)) },
};

/** Signs and words between operands; their names are those they are written with. */
export const OPERATORS: Readonly<Record<string, Operation>> = {
  "+": { least: 1, most: 2, apply: ([a, b = 0]) => finite(a + b) },
  "-": { least: 1, most: 2, apply: (values) => finite(values.length === 1 ? -values[0] : values[0] - values[1]) },
  "*": binary((a, b) => a * b),
  "/": binary((a, b) => a / b),
  "^": binary((a, b) => a ** b),
  "<": comparison((a, b) => a < b),
  "<=": comparison((a, b) => a <= b),
  ">": comparison((a, b) => a > b),
  ">=": comparison((a, b) => a >= b),
  "==": comparison((a, b) => a === b),
  "!=": comparison((a, b) => a !== b),
  // Three-valued (Kleene): what is missing matters only where it could change the answer.
  and: binary((a, b) => (a === 0 || b === 0 ? 0 : Number.isNaN(a + b) ? Number.NaN : 1)),
  or: binary((a, b) => (isTrue(a) || isTrue(b) ? 1 : Number.isNaN(a + b) ? Number.NaN : 0)),
  not: unary((a) => (Number.isNaN(a) ? a : Number(a === 0))),
};

function isTrue(value: number): boolean {
  return value !== 0 && !Number.isNaN(value);
}

/** test ? yes : no; a missing test gives a missing value. */
export function choose(test: number, yes: () => number, no: () => number): number {
  if (Number.isNaN(test)) return Number.NaN;
  return test === 0 ? no() : yes();
}
