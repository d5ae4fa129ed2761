import { z } from "zod";
import { count } from "./primitives.ts";

/**
 * Something wrong with a source, an upload or an estimation, told so that a person can mend it:
 * a sentence that names the thing, the place and both numbers, and the nearest thing that would do.
 */
export const problem = z.strictObject({
  sentence: z.string(),
  /** Path of the key in the cell's source, e.g. ["goods", "brand1", "price"]. */
  key: z.array(z.string()).optional(),
  /** 1-based place in the source text, with character offsets from its start. */
  place: z.strictObject({ line: count, column: count, from: count, to: count }).optional(),
  /** Row of the upload (the first after the header is 1) and column. */
  row: count.optional(),
  column: z.string().optional(),
  /** The nearest valid word, to stand in for what is written at `place`. */
  nearest: z.string().optional(),
});
export type Problem = z.infer<typeof problem>;
