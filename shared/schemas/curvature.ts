import { z } from "zod";
import { count, finite } from "./primitives.ts";

/** K(point) = −LL' with L lower triangular of the rank (Diewert & Wales 1987; Moschini 1998; Ryan & Wales 1998). */
export const curvatureSpecification = z.strictObject({
  at: z.union([z.enum(["base point", "mean"]), z.strictObject({ row: z.number().int().positive() })]),
  /** Of K at the point; n − 1, the most there can be, unless said otherwise. */
  rank: z.number().int().positive().optional(),
});

/** What became of curvature imposed at a point. */
export const curvatureFinding = z.strictObject({
  pointName: z.string(),
  /** The rank asked for, and that of the estimate: less where a further column would not raise the fit. */
  asked: count,
  rank: count,
  /** False where the estimates satisfy it without being made to. */
  binds: z.boolean(),
  /** Log-likelihood with homogeneity and symmetry alone. */
  logLikelihoodWithout: finite,
  /** By how much it is above that of the estimates. */
  loss: finite,
});

interface Asked {
  readonly form: string;
  readonly impose: readonly string[];
  readonly curvature?: unknown;
  readonly zeros?: unknown;
  readonly differences?: boolean;
}

const BY_FORM: Readonly<Record<string, string>> = {
  les: "les is negative by its form wherever 0 < b < 1 and something is left beyond what is committed",
  rotterdam: "curvature is imposed on la-aids, aids and quaids; rotterdam has none to impose yet",
  easi: "curvature is imposed on la-aids, aids and quaids; easi has none to impose yet",
};

/** What curvature does not go together with. */
export function curvatureIssues({ form, impose, curvature, zeros, differences }: Asked) {
  if (curvature === undefined) return [];
  const path = ["curvature"];
  if (BY_FORM[form] !== undefined) return [{ path, message: BY_FORM[form] }];
  if (!impose.includes("homogeneity") || !impose.includes("symmetry")) {
    return [{ path, message: "curvature is imposed on a symmetric matrix: add homogeneity and symmetry to impose" }];
  }
  if (zeros !== undefined) return [{ path, message: "curvature and zeros by two steps do not go together" }];
  return differences ? [{ path, message: "curvature is imposed on levels: differences leave the shares open" }] : [];
}
