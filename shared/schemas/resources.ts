import { z } from "zod";
import { count, identifier, instant } from "./primitives.ts";
import { problem } from "./problem.ts";

export const ROLES = ["owner", "coauthor", "reader"] as const;
export const role = z.enum(ROLES);
export type Role = z.infer<typeof role>;

export const account = z.strictObject({
  id: identifier,
  name: z.string(),
  email: z.email(),
  /** Administers the installation. */
  isAdministrator: z.boolean().optional(),
});
export type Account = z.infer<typeof account>;

/** GET /api/installation: what the door says before anyone has signed in. */
export const installation = z.strictObject({
  name: z.string(),
  version: z.string(),
  /** Where messages go: out by a mail server, or into the local post box. */
  mail: z.enum(["mail server", "post box"]).optional(),
  demo: z.array(z.strictObject({ email: z.string(), passphrase: z.string(), role: z.string() })),
});
export type Installation = z.infer<typeof installation>;

export const person = z.strictObject({ id: identifier, name: z.string(), email: z.email(), role });
export type Person = z.infer<typeof person>;

const studyTitle = z.string().trim().min(1).max(200);
const studyLede = z.string().trim().max(600);
export const newStudy = z.strictObject({ title: studyTitle, lede: studyLede.default("") });
/** Without the default: what a change does not name stays as it is. */
export const changedStudy = z.strictObject({ title: studyTitle.optional(), lede: studyLede.optional() });
export const studySummary = z.strictObject({
  id: identifier,
  title: z.string(),
  lede: z.string(),
  role,
  people: z.array(person),
  changedAt: instant,
  cells: z.array(z.strictObject({ name: z.string(), state: z.string(), reads: z.array(z.string()) })),
  sealedAt: instant.optional(),
  /** Put away by whoever looks. */
  isPutAway: z.boolean().optional(),
});
export type StudySummary = z.infer<typeof studySummary>;

export const changedPerson = z.strictObject({ role });
export const handedOver = z.strictObject({ userId: identifier });

/**
 * That `times` the product of the columns `of` is the column `is` within 2 %, in `agree` of the `compared` rows that have
 * a value in each.
 */
export const columnAgreement = z.strictObject({
  of: z.array(z.string()).min(1).max(2),
  times: z.number().positive(),
  is: z.string(),
  agree: count,
  compared: count,
});
export type ColumnAgreement = z.infer<typeof columnAgreement>;

export const uploadColumn = z.strictObject({
  name: z.string(),
  type: z.enum(["number", "text"]),
  missing: count,
  distinct: count,
  /** Words such as NA that were taken for a missing value, the other cells being numbers. */
  missingWords: z.array(z.string()).optional(),
  /** Numbers only. */
  minimum: z.number().optional(),
  maximum: z.number().optional(),
  mean: z.number().optional(),
  zeros: count.optional(),
  /** Twelve equal bins of the numbers, counts of rows; the small drawing beside the name. */
  histogram: z.array(count).max(12).optional(),
  /** The first values in the file, as they read. */
  firstValues: z.array(z.string()).max(3).optional(),
  /** What the column says again that others say. */
  agreements: z.array(columnAgreement).optional(),
  /** A text column that is nearly numbers: the first value that is not. */
  firstText: z.strictObject({ row: count, value: z.string() }).optional(),
});
export type UploadColumn = z.infer<typeof uploadColumn>;

export const upload = z.strictObject({
  id: identifier,
  name: z.string(),
  /** Counted within the name, from 1; a data cell reads the latest unless it names another. */
  version: count.min(1),
  /** What the file of this version was called, when otherwise. */
  fileName: z.string().optional(),
  bytes: count,
  rows: count,
  /** Of the bytes; of a workbook, of those and the name of the sheet. */
  sha256: z.string(),
  format: z.enum(["csv", "parquet", "xlsx"]),
  /** Of a workbook: the sheet that was read, and the names of all. */
  sheet: z.string().optional(),
  sheets: z.array(z.string()).optional(),
  /** Of a CSV. */
  separator: z.enum([",", ";", "\t"]).optional(),
  decimalComma: z.boolean().optional(),
  uploadedAt: instant,
  uploadedBy: z.string(),
  columns: z.array(uploadColumn),
});
export type Upload = z.infer<typeof upload>;

/** Every refusal of the API: a code for programs, a sentence for people, the place when there is one. */
export const apiError = z.strictObject({
  error: z.strictObject({ code: z.string(), sentence: z.string(), problems: z.array(problem).default([]) }),
});
export type ApiError = z.infer<typeof apiError>;
