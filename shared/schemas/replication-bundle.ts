import { z } from "zod";
import { CELL_KINDS } from "./cell.ts";
import { cellName, count, fingerprint } from "./primitives.ts";

/** What is asked for: the rows themselves, or only the fingerprint of the files and second moments. */
export const newReplicationBundle = z.strictObject({ data: z.enum(["included", "withheld"]) });
export type NewReplicationBundle = z.infer<typeof newReplicationBundle>;

const fileName = z
  .string()
  .max(400)
  .regex(/^[^/\\]+(\/[^/\\]+)*$/, "a path within the bundle, with forward slashes")
  .refine((name) => !name.split("/").includes(".."), "a path within the bundle");

export const bundledCell = z.strictObject({
  name: cellName,
  kind: z.enum(CELL_KINDS),
  /** Of everything the finding rests on; of a text none is stored. */
  fingerprint: fingerprint.optional(),
  finding: fileName.optional(),
  tables: z.array(fileName),
  /** Of a system, where the data are withheld: the file of its moments, or why there is none. */
  moments: z.union([z.strictObject({ file: fileName }), z.strictObject({ absent: z.string() })]).optional(),
});
export type BundledCell = z.infer<typeof bundledCell>;

export const bundledData = z.strictObject({
  /** The data cells that read it. */
  cells: z.array(cellName).min(1),
  file: fileName,
  /** Of the file's bytes; a bundle made from a referee copy knows the fingerprint of the prepared data alone. */
  sha256: fingerprint.optional(),
  bytes: count.optional(),
  rows: count.optional(),
  columns: count.optional(),
  /** Of a workbook. */
  sheet: z.string().optional(),
  included: z.boolean(),
});
export type BundledData = z.infer<typeof bundledData>;

/** bundle.json: what lies in a replication bundle, and what does not and why. */
export const bundleManifest = z.strictObject({
  format: z.literal("tangency replication bundle 1"),
  /** Name and version of the program that made the findings. */
  program: z.string(),
  study: z.string(),
  madeAt: z.iso.datetime(),
  specification: fileName,
  cells: z.array(bundledCell).max(10_000),
  leftOut: z.array(z.strictObject({ name: cellName, because: z.string() })),
  data: z.array(bundledData),
});
export type BundleManifest = z.infer<typeof bundleManifest>;
