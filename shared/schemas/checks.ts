import { z } from "zod";
import { count, finite } from "./primitives.ts";

/** Rows used in which a fitted system is not defined: how many, their share of the weight, and why, as a clause. */
export const undefinedRows = z.strictObject({ rows: count, weightedShare: finite, reason: z.string() });

/** The five laws at a point and, where counted, over all rows used (methods 3.1). */
export const theoryChecks = z.strictObject({
  /** "base point", "mean", "row 12", "quantile 0.9 of expenditure", "a point of one's own". */
  pointName: z.string(),
  tolerance: finite,
  /** max|ι'K| */
  addingUp: z.strictObject({ size: finite, holds: z.boolean() }),
  /** max|Kι| */
  homogeneity: z.strictObject({ size: finite, holds: z.boolean(), status: z.enum(["imposed", "by form", "free"]) }),
  /** max|k_ij − k_ji| */
  symmetry: z.strictObject({ size: finite, holds: z.boolean(), status: z.enum(["imposed", "by form", "free"]) }),
  /** Largest of the n − 1 eigenvalues away from the null direction; stated only under homogeneity. */
  negativity: z.strictObject({
    stated: z.boolean(),
    largest: finite.optional(),
    standardError: finite.optional(),
    /** 95 % percentile interval of the largest, where the system was bootstrapped. */
    interval: z.tuple([finite, finite]).optional(),
    holds: z.boolean().optional(),
  }),
  monotonicity: z.strictObject({ holds: z.boolean(), lowest: finite, highest: finite }),
  /** Breaks are counted where the system is defined; shares of rows that hold are of all rows' weight. */
  sample: z
    .strictObject({
      rows: count,
      /** T, where equations of changes or of lagged shares leave fewer rows than are judged. */
      equations: count.optional(),
      /** Absent where the system is defined in every row. */
      undefined: undefinedRows.optional(),
      negativity: z.strictObject({ breaks: count, weightedShareThatHolds: finite }).optional(),
      monotonicity: z.strictObject({ breaks: count, weightedShareThatHolds: finite }),
      /** Rows where the system is not defined are none of them regular. */
      regular: z.strictObject({ breaks: count, weightedShareThatHolds: finite }).optional(),
    })
    .optional(),
});
export type TheoryChecks = z.infer<typeof theoryChecks>;
