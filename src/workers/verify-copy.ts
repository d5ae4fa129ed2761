import { compareMatrices, type MatrixComparison } from "../../shared/economics/compare.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import type { RefereeCopy, SealedAlso, SealedSlutsky } from "../../shared/schemas/referee-copy.ts";
import type { FittedSystem, SystemFinding } from "../../shared/schemas/system.ts";
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
  /** The same of every matrix and system sealed with it, in its order; other findings are not computed again. */
  readonly also: readonly AlsoVerified[];
  /** The largest of all differences. */
  readonly largest: number;
  readonly tookMs: number;
}

export interface AlsoVerified {
  readonly name: string;
  readonly kind: "slutsky" | "system";
  readonly largest: number;
  readonly verdictsAgree: boolean;
}

/** The coefficient table against θ and the square roots of its covariance's diagonal. */
function tabledDifference(system: SystemFinding, { theta, covariance }: FittedSystem): number {
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

function matrixDifference({ fitted, point, priceScale, totalScale, pointName, at }: SealedSlutsky): MatrixComparison {
  return compareMatrices(at, matrixAt(fitted, point, { priceScale, totalScale, pointName }));
}

function alsoVerified(one: SealedAlso): AlsoVerified[] {
  const { name } = one;
  if (one.kind === "slutsky") {
    const { largest, verdictsAgree } = matrixDifference(one.finding);
    return [{ name, kind: "slutsky", largest, verdictsAgree }];
  }
  if (one.kind !== "system") return [];
  const largest = tabledDifference(one.finding, one.finding.fitted);
  return [{ name, kind: "system", largest, verdictsAgree: true }];
}

/** Recomputes matrix, standard errors, eigenvalues and checks of a copy and its fingerprint; refuses impossible sizes. */
export function verifyCopy({ fingerprint, content }: RefereeCopy, now: () => number): Verification {
  const started = now();
  const comparison = matrixDifference(content.slutsky);
  const coefficients = tabledDifference(content.system, content.slutsky.fitted);
  const also = (content.also ?? []).flatMap(alsoVerified);
  const found = sha256Hex(canonicalJson(content));
  return {
    fingerprint: found,
    fingerprintAgrees: found === fingerprint,
    comparison,
    coefficients,
    also,
    largest: Math.max(comparison.largest, coefficients, ...also.map(({ largest }) => largest)),
    tookMs: now() - started,
  };
}
