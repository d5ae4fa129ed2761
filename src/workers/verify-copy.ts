import { compareMatrices, type MatrixComparison } from "../../shared/economics/compare.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import type { RefereeCopy, SealedContent } from "../../shared/schemas/referee-copy.ts";
import { canonicalJson } from "../../shared/study/canonical-json.ts";
import { sha256Hex } from "../../shared/study/sha256.ts";

/** What a referee's own machine makes of a sealed copy. */
export interface Verification {
  /** SHA-256 of the content as received. */
  readonly fingerprint: string;
  readonly fingerprintAgrees: boolean;
  /** Everything computed again from the sealed coefficients, against what is sealed. */
  readonly comparison: MatrixComparison;
  /** The coefficients and errors as tabled, against those everything was computed from. */
  readonly coefficients: number;
  /** The largest of all differences. */
  readonly largest: number;
  readonly tookMs: number;
}

/** The coefficient table against θ and the square roots of its covariance's diagonal. */
function tabledDifference({ system, slutsky }: SealedContent): number {
  const { theta, covariance } = slutsky.fitted;
  if (system.coefficients.length !== theta.length) {
    throw new RangeError(
      `${system.coefficients.length} coefficients are tabled, the system was computed from ${theta.length}`,
    );
  }
  return system.coefficients.reduce((largest, { estimate, standardError }, index) => {
    const error = Math.sqrt(Math.max(0, covariance[index][index]));
    return Math.max(largest, Math.abs(estimate - theta[index]), Math.abs(standardError - error));
  }, 0);
}

/** Recomputes matrix, standard errors, eigenvalues and checks of a copy and its fingerprint; refuses impossible sizes. */
export function verifyCopy({ fingerprint, content }: RefereeCopy, now: () => number): Verification {
  const started = now();
  const { fitted, point, priceScale, totalScale, pointName, at } = content.slutsky;
  const recomputed = matrixAt(fitted, point, { priceScale, totalScale, pointName });
  const comparison = compareMatrices(at, recomputed);
  const coefficients = tabledDifference(content);
  const found = sha256Hex(canonicalJson(content));
  return {
    fingerprint: found,
    fingerprintAgrees: found === fingerprint,
    comparison,
    coefficients,
    largest: Math.max(comparison.largest, coefficients),
    tookMs: now() - started,
  };
}
