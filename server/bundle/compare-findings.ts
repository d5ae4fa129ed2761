/** A number of a bundle beside the same one found anew. */
export interface ComparedNumber {
  /** Where it stands in the finding: "coefficients.3.estimate". */
  readonly at: string;
  readonly bundled: number;
  readonly found: number;
  /** Decimal digits in which they agree, relative to the larger. */
  readonly digits: number;
}

export interface ComparedFinding {
  /** How many numbers were compared, and how many are the same to the last bit. */
  readonly numbers: number;
  readonly same: number;
  /** The fewest digits of those that are not; absent where all are. */
  readonly worst?: ComparedNumber;
  /** Numbers that agree to fewer than `ENOUGH` digits, the worst first; at most ten. */
  readonly apart: readonly ComparedNumber[];
  readonly apartCount: number;
  /** What is not a number and differs, or is missing from what was found: at most ten, in words. */
  readonly unlike: readonly string[];
  readonly unlikeCount: number;
}

/** Digits below which two numbers are said to differ. */
export const ENOUGH = 8;
/** Differences of rounding: identities that hold to the last digits leave such numbers, and they have no digits to compare. */
const ROUNDING = 1e-12;
const MOST_SHOWN = 10;
/** How an iteration went is no finding, and rounding decides it; a file may be called as one likes. */
const NOT_COMPARED = new Set(["convergence", "upload.name"]);

/**
 * Every number and word of a bundled finding beside the one found anew. Digits are −log₁₀ of the difference relative to
 * the larger of the two; differences of at most 1e-12 count as agreement to rounding. What stands only in the finding
 * found anew (rows that a bundle without data leaves out) is not compared.
 */
export function compareFindings(bundled: unknown, found: unknown): ComparedFinding {
  const numbers: ComparedNumber[] = [];
  const unlike: string[] = [];
  walk(bundled, found, [], numbers, unlike);
  const differing = numbers.filter((one) => one.bundled !== one.found).sort((a, b) => a.digits - b.digits);
  const apart = differing.filter(({ digits }) => digits < ENOUGH);
  return {
    numbers: numbers.length,
    same: numbers.length - differing.length,
    ...(differing.length > 0 && { worst: differing[0] }),
    apart: apart.slice(0, MOST_SHOWN),
    apartCount: apart.length,
    unlike: unlike.slice(0, MOST_SHOWN),
    unlikeCount: unlike.length,
  };
}

/** Digits in which two numbers agree; infinite where they are the same, or apart by rounding alone. */
export function digitsOfAgreement(one: number, other: number): number {
  const difference = Math.abs(one - other);
  if (difference <= ROUNDING) return Number.POSITIVE_INFINITY;
  return Math.max(0, -Math.log10(difference / Math.max(Math.abs(one), Math.abs(other))));
}

type Path = readonly (string | number)[];

function walk(bundled: unknown, found: unknown, path: Path, numbers: ComparedNumber[], unlike: string[]): void {
  const at = path.join(".");
  if (typeof bundled === "number" && typeof found === "number") {
    numbers.push({ at, bundled, found, digits: digitsOfAgreement(bundled, found) });
  } else if (Array.isArray(bundled) && Array.isArray(found)) {
    if (bundled.length !== found.length)
      unlike.push(`${at} has ${bundled.length} members in the bundle and ${found.length} found anew`);
    else for (const [i, inner] of bundled.entries()) walk(inner, found[i], [...path, i], numbers, unlike);
  } else if (isMap(bundled) && isMap(found)) {
    for (const [key, inner] of Object.entries(bundled)) {
      const below = [...path, key];
      if (!NOT_COMPARED.has(below.join("."))) walk(inner, found[key], below, numbers, unlike);
    }
  } else if (bundled !== found) {
    unlike.push(`${at} is ${shown(bundled)} in the bundle and ${shown(found)} found anew`);
  }
}

const isMap = (value: unknown): value is Record<string, unknown> =>
  typeof value === "object" && value !== null && !Array.isArray(value);

function shown(value: unknown): string {
  if (value === undefined) return "absent";
  const text = JSON.stringify(value);
  return text.length > 60 ? `${text.slice(0, 57)}…` : text;
}
