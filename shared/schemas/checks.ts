import { z } from "zod";
import { count, finite } from "./primitives.ts";

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
    holds: z.boolean().optional(),
  }),
  monotonicity: z.strictObject({ holds: z.boolean(), lowest: finite, highest: finite }),
  sample: z
    .strictObject({
      rows: count,
      negativity: z.strictObject({ breaks: count, weightedShareThatHolds: finite }).optional(),
      monotonicity: z.strictObject({ breaks: count, weightedShareThatHolds: finite }),
      regular: z.strictObject({ breaks: count, weightedShareThatHolds: finite }).optional(),
    })
    .optional(),
});
export type TheoryChecks = z.infer<typeof theoryChecks>;
