import { z } from "zod";
import { columnName, count, fingerprint, finite, goodName, vector } from "./primitives.ts";

/** A good by two of price, quantity and expenditure; the third follows. */
export const goodMapping = z
  .strictObject({
    price: columnName.optional(),
    quantity: columnName.optional(),
    expenditure: columnName.optional(),
  })
  .superRefine((good, context) => {
    const given = [good.price, good.quantity, good.expenditure].filter((column) => column !== undefined).length;
    if (given !== 2) {
      context.addIssue({
        code: "custom",
        message: `a good needs two of price, quantity and expenditure, and has ${given}`,
      });
    }
  });

/** An expression in column names: arithmetic, comparisons, elementary functions (checked by the engine). */
export const expression = z.union([z.string().min(1).max(500), z.number(), z.boolean()]).transform(String);

export const dataSpecification = z.strictObject({
  kind: z.literal("data"),
  /** The name of an upload of the study; on the command line, a path beside the study file. */
  upload: z.string().min(1).max(300),
  /** Which version of it; the latest, unless said. On the command line a file is what it is. */
  version: z.number().int().min(1).max(1_000_000).optional(),
  goods: z.record(goodName, goodMapping),
  /** Total expenditure, when not the sum of the goods. */
  total: columnName.optional(),
  weight: columnName.optional(),
  cluster: columnName.optional(),
  time: columnName.optional(),
  derive: z.record(columnName, expression).optional(),
  keep: expression.optional(),
  normalise: z.enum(["mean", "none"]).default("mean"),
});
export type DataSpecification = z.infer<typeof dataSpecification>;

/** Why a row is left out, in the order the reasons are tried; a row counts under the first that applies. */
export const LEFT_OUT_REASONS = [
  "keep",
  "missing value",
  "weight not positive",
  "price not positive",
  "negative purchase",
  "total not positive",
  "shares do not sum to one",
] as const;

export const rowAccounting = z.strictObject({
  uploaded: count,
  leftOut: z.array(
    z.strictObject({
      reason: z.enum(LEFT_OUT_REASONS),
      /** In words, with the column or the expression: "Left out by keep: members <= 12". */
      label: z.string(),
      count,
      /** Rows of the upload, the first after the header being 1; at most 200 of them. */
      rows: z.array(count),
      /** Where in the file, 100 equal slices: how many of the slice's rows this reason takes. */
      strip: z.array(count),
    }),
  ),
  used: count,
});
export type RowAccounting = z.infer<typeof rowAccounting>;

export const goodDescription = z.strictObject({
  name: goodName,
  meanShare: finite,
  shareDeviation: finite,
  /** Share of rows (weighted) with nothing bought. */
  boughtNone: finite,
  /** In the units uploaded, weighted. */
  meanPrice: finite,
  logPriceDeviation: finite,
  meanQuantity: finite,
});

/** Something worth knowing before estimating; never an error. */
export const qualityFlag = z.strictObject({
  about: z.enum(["zeros", "outliers", "unit values", "price variation", "collinearity", "shares"]),
  sentence: z.string(),
  rows: z.array(count).max(200),
  /** Lists of rows that can be looked at, each under a key, in words, with how many. */
  parts: z.array(z.strictObject({ key: z.string(), words: z.string(), count })).optional(),
});

export const dataFinding = z.strictObject({
  kind: z.literal("data"),
  /** SHA-256 over the columns used, after derivation and filtering. */
  dataFingerprint: fingerprint,
  upload: z.strictObject({ name: z.string(), rows: count, columns: count, sha256: fingerprint }),
  goods: z.array(goodDescription),
  accounting: rowAccounting,
  normalise: z.enum(["mean", "none"]),
  /** The divisors of prices (n) and total under `normalise: mean`; ones under `none`. In units uploaded. */
  priceScale: vector,
  totalScale: finite,
  /** Weighted mean of total expenditure, in units uploaded. */
  meanTotal: finite,
  weighted: z.boolean(),
  clusters: count.optional(),
  timeColumn: columnName.optional(),
  /** Numeric columns (derived ones included) a system may use as demographics. */
  numericColumns: z.array(columnName),
  flags: z.array(qualityFlag),
});
export type DataFinding = z.infer<typeof dataFinding>;
