import { z } from "zod";
import { count, finite } from "./primitives.ts";

/** At most so many rows are sent at once. */
export const MOST_ROWS_AT_ONCE = 200;

/** Which rows of a list are asked for. Numbers come as texts of an address. */
export const rowsAsked = z.object({
  from: z.coerce.number().int().min(0).max(1e9).default(0),
  count: z.coerce.number().int().min(1).max(MOST_ROWS_AT_ONCE).default(50),
});
export type RowsAsked = z.infer<typeof rowsAsked>;

/** Rows of an upload, a page of them: each with its number in the file, the first after the header being 1. */
export const rowsPage = z.strictObject({
  /** Of the whole list. */
  total: count,
  from: count,
  columns: z.array(
    z.strictObject({
      name: z.string(),
      type: z.enum(["number", "text"]),
      /** What it is of a good, or how it was formed: "price of grains", "times the median". */
      says: z.string().optional(),
    }),
  ),
  rows: z.array(z.strictObject({ row: count, cells: z.array(z.union([finite, z.string(), z.null()])) })),
  /** A condition that would leave rows of the list out: offered, never taken by itself. */
  keep: z
    .strictObject({
      expression: z.string(),
      /** Rows of the list it would leave out; of the other rows used it leaves out none. */
      leavesOut: count,
    })
    .optional(),
});
export type RowsPage = z.infer<typeof rowsPage>;
