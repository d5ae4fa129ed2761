import { z } from "zod";
import { columnName, count, finite, matrix } from "./primitives.ts";

/** Resampling: whole rows, whole clusters, residuals of the fit, or moving blocks of consecutive periods. */
export const BOOTSTRAP_NAMES = ["rows", "clusters", "residuals", "blocks"] as const;

export const bootstrapSpecification = z.strictObject({
  bootstrap: z.enum(BOOTSTRAP_NAMES),
  replicates: z.number().int().min(20).max(10_000).default(500),
  /** The same seed, the same intervals bit for bit, whatever the number of threads. */
  seed: z
    .number()
    .int()
    .nonnegative()
    .max(2 ** 32 - 1)
    .default(1),
  /** Length of a moving block in periods; ⌈T^{1/3}⌉ unless said otherwise. */
  block: z.number().int().min(2).optional(),
  /** Of clusters: the column that says which rows belong together; the cluster of the data unless said otherwise. */
  cluster: columnName.optional(),
});
export type BootstrapSpecification = z.infer<typeof bootstrapSpecification>;

export const standardErrorsSpecification = z.union([
  z.enum(["conventional", "heteroskedastic"]),
  /** Rows with the same value of the column were sampled together. */
  z.strictObject({ cluster: columnName }),
  bootstrapSpecification,
]);
export type StandardErrorsSpecification = z.infer<typeof standardErrorsSpecification>;

/** Keys that belong to one kind of bootstrap only. */
export function checkStandardErrors(
  errors: StandardErrorsSpecification,
  refuse: (key: "block" | "cluster", message: string) => void,
): void {
  if (typeof errors === "string" || !("bootstrap" in errors)) return;
  const { bootstrap, block, cluster } = errors;
  if (block !== undefined && bootstrap !== "blocks") {
    refuse("block", `block belongs to a bootstrap of blocks; one of ${bootstrap} has none`);
  }
  if (cluster !== undefined && bootstrap !== "clusters") {
    refuse("cluster", `cluster belongs to a bootstrap of clusters; one of ${bootstrap} has none`);
  }
}

/** What the covariance of θ rests on. */
export const STANDARD_ERROR_KINDS = ["conventional", "heteroskedastic", "clustered", "bootstrap"] as const;

/** The column rows were grouped by, and how many groups it makes of those used. */
export const clustersFinding = z.strictObject({ column: columnName, count });
export type ClustersFinding = z.infer<typeof clustersFinding>;

export const bootstrapFinding = z.strictObject({
  of: z.enum(BOOTSTRAP_NAMES),
  replicates: count,
  /** Replicates without an estimate, at most 5 %. */
  failed: count,
  firstFailure: z.strictObject({ replicate: count, reason: z.string() }).optional(),
  seed: count,
  /** Periods in a moving block. */
  block: count.optional(),
  /** 95 % percentile interval of each coefficient, k × 2. */
  intervals: z.array(z.tuple([finite, finite])),
  /** θ* of every replicate that has one, (replicates − failed) × k: stays with the program, for what is derived from θ. */
  draws: matrix.optional(),
});
export type BootstrapFinding = z.infer<typeof bootstrapFinding>;
