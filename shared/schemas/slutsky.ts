import { z } from "zod";
import { caveats } from "./caveats.ts";
import { theoryChecks, undefinedRows } from "./checks.ts";
import { cellName, count, fingerprint, finite, goodName, matrix, vector } from "./primitives.ts";
import { fittedSystem, namedPoint, restrictionTest } from "./system.ts";

const quantileText = z
  .string()
  .regex(/^quantile (0(\.\d+)?|1(\.0+)?)$/, "a quantile is written quantile 0.9, between 0 and 1");

/** Where the matrix is evaluated. */
export const pointSpecification = z.union([
  z.enum(["base point", "mean"]),
  /** A row of the upload, the first after the header being 1. */
  z.strictObject({ row: z.number().int().positive() }),
  /** Mean prices and demographics, expenditure at a weighted quantile. */
  z.strictObject({ x: quantileText }),
  /** One's own, in the units uploaded. */
  z.strictObject({ prices: z.record(goodName, finite.positive()), x: finite.positive() }),
]);

export const slutskySpecification = z.strictObject({
  kind: z.literal("slutsky"),
  system: cellName,
  at: pointSpecification.default("base point"),
  form: z.enum(["share", "quantity"]).default("share"),
});
export type SlutskySpecification = z.infer<typeof slutskySpecification>;

export const eigenvalue = z.strictObject({
  value: finite,
  standardError: finite,
  /** 95 % percentile interval of the eigenvalue of this rank, where the system was bootstrapped. */
  interval: z.tuple([finite, finite]).optional(),
  /** Unit eigenvector, n. */
  vector,
  /** Largest entries in words: "sweet drinks against grains". */
  direction: z.string(),
});

const matrixInterval = z.strictObject({ low: matrix, high: matrix });

/** 95 % percentile intervals of the bootstrap's draws, n × n. */
export const matrixIntervals = z.strictObject({
  /** Draws at which the system is defined at the point. */
  draws: count,
  share: matrixInterval,
  quantity: matrixInterval,
  compensated: matrixInterval,
});

/**
 * What the matrix, its errors, eigenvalues and checks are at one point: pure function of fitted system and point, but
 * for the intervals of a bootstrap, which need its draws.
 */
export const matrixAtPoint = z.strictObject({
  /** Predicted shares, n. */
  shares: vector,
  /** μ_i and μ_ij: the formula's own numbers. */
  totalSlopes: vector,
  priceSlopes: matrix,
  /** k_ij, share form, and standard errors by the exact-derivative delta method. */
  share: matrix,
  shareErrors: matrix,
  /** S_ij = (x / p_i p_j) k_ij in units uploaded, and standard errors. */
  quantity: matrix,
  quantityErrors: matrix,
  /** ε*_ij and standard errors. */
  compensated: matrix,
  compensatedErrors: matrix,
  /** The n − 1 eigenvalues of ½(K + K') with the null direction set aside, largest first; absent without homogeneity. */
  eigenvalues: z.array(eigenvalue),
  /** Where the system was bootstrapped. */
  intervals: matrixIntervals.optional(),
  checks: theoryChecks,
});
export type MatrixAtPoint = z.infer<typeof matrixAtPoint>;

/** A row of the upload where a law breaks or the system is not defined. Never part of a referee copy. */
export const brokenRow = z.strictObject({
  row: count,
  total: finite,
  largestEigenvalue: finite.optional(),
  goods: z.array(goodName),
  /** Absent where there are no shares. */
  lowestShare: finite.optional(),
  highestShare: finite.optional(),
  /** Why the system is not defined there, as a clause; then no law is judged. */
  notDefined: z.string().optional(),
  breaks: z.array(z.enum(["negativity", "monotonicity"])),
});

export const negativityOverSample = z.strictObject({
  rows: count,
  /** Rows without an eigenvalue, since the system is not defined there; they are in none of the bins. */
  undefined: undefinedRows.optional(),
  /** Equal bins of the largest eigenvalue, weighted shares of all rows. */
  histogram: z.strictObject({ edges: vector, shares: vector }),
  /** By tenth of total expenditure: weighted share of rows that hold; those where the system is not defined do not. */
  byTenth: vector,
  /** Rows that break in the richest tenth. */
  breaksInRichestTenth: count,
  breaks: count,
  /** Goods that carry the breaks, most frequent first. */
  goods: z.array(goodName),
});

export const slutskyFinding = z.strictObject({
  kind: z.literal("slutsky"),
  dataFingerprint: fingerprint,
  fitted: fittedSystem,
  form: z.enum(["share", "quantity"]),
  pointName: z.string(),
  /** In units of estimation. */
  point: namedPoint,
  /** Divisors that lead back to units uploaded. */
  priceScale: vector,
  totalScale: finite,
  at: matrixAtPoint,
  tests: z.array(restrictionTest),
  caveats,
  /** The group whose expenditure the system's total is: the matrix is conditional on it. */
  conditionalOn: goodName.optional(),
  sample: negativityOverSample.optional(),
  brokenRows: z.array(brokenRow).max(500),
});
export type SlutskyFinding = z.infer<typeof slutskyFinding>;
