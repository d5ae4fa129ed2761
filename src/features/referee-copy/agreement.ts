import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { printCount, printSize } from "../../../shared/tables/numbers.ts";
import type { Verification } from "../../workers/verify-copy.ts";

/**
 * Up to here two machines agree: rounding differs in the last bits of elementary functions, and errors of
 * computation grow with the condition of what is inverted, which here is nothing.
 */
const ROUNDING = 1e-12;

export interface PartCompared {
  readonly part: string;
  readonly what: string;
  /** "3 × 10⁻¹⁶", "agree". */
  readonly difference: string;
  readonly agrees: boolean;
}

export const agrees = (verification: Verification): boolean =>
  verification.largest <= ROUNDING &&
  verification.comparison.verdictsAgree &&
  verification.also.every(({ verdictsAgree }) => verdictsAgree) &&
  verification.fingerprintAgrees;

/** Part by part: what was computed again, and how far it is from what is sealed. */
export function partsCompared(
  { comparison, coefficients, also }: Verification,
  content: SealedContent,
): PartCompared[] {
  const { fitted, at } = content.slutsky;
  const entries = `${printCount(fitted.goods.length ** 2)} entries`;
  const part = (name: string, what: string, difference: number): PartCompared => ({
    part: name,
    what,
    difference: printSize(difference),
    agrees: difference <= ROUNDING,
  });
  const spectrum =
    at.eigenvalues.length === 0 ? "not stated without homogeneity" : `${at.eigenvalues.length}, and the null direction`;
  return [
    part("Coefficients as tabled", `${printCount(fitted.theta.length)} of them, with errors`, coefficients),
    part("Matrix", entries, comparison.matrix),
    part("Quantity form", `${entries}, relative to the largest`, comparison.quantity),
    part("Standard errors", entries, comparison.standardErrors),
    part("Eigenvalues", spectrum, comparison.eigenvalues),
    part("Adding-up, homogeneity, symmetry", "their sizes", comparison.checks),
    {
      part: "Verdicts",
      what: "five laws at the point",
      difference: comparison.verdictsAgree ? "agree" : "some otherwise",
      agrees: comparison.verdictsAgree,
    },
    ...also.map(({ name, kind, largest, verdictsAgree }) => {
      const what = kind === "slutsky" ? "matrix, errors, eigenvalues, checks" : "coefficients as tabled";
      return { ...part(name, what, largest), agrees: largest <= ROUNDING && verdictsAgree };
    }),
  ];
}
