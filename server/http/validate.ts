import { z } from "zod";
import { identifier } from "../../shared/schemas/primitives.ts";
import type { Problem } from "../../shared/schemas/problem.ts";
import type { KeyPath } from "../../shared/study/cell-source.ts";
import { valueAt } from "../../shared/study/issues.ts";
import { invalid } from "../errors.ts";

/** The value as the schema returns it, or a 400 that names every key that will not do. */
export function validate<T>(schema: z.ZodType<T>, value: unknown): T {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const problems = parsed.error.issues.map((issue): Problem => {
    const key = issue.path.map(String);
    const sentence = sizeInWords(issue, value) ?? issue.message;
    return { sentence: key.length === 0 ? sentence : `${key.join(".")}: ${sentence}`, key };
  });
  throw invalid(problems.map((problem) => problem.sentence).join("; "), problems);
}

const UNITS: Readonly<Record<string, string>> = { string: " characters", array: " entries" };

/** What is too large or too small, with both numbers; nothing where the schema has words of its own for it. */
function sizeInWords(issue: z.core.$ZodIssue, whole: unknown): string | undefined {
  if (issue.code !== "too_big" && issue.code !== "too_small") return undefined;
  if (!issue.message.startsWith("Too ")) return undefined;
  const value = valueAt(whole, issue.path as KeyPath);
  const unit = UNITS[issue.origin] ?? "";
  // A number from an address comes as a text: its length is not its size.
  const size = unit && (typeof value === "string" || Array.isArray(value)) ? value.length : String(value);
  const [inclusive, exclusive, end] =
    issue.code === "too_big" ? ["at most", "below", issue.maximum] : ["at least", "above", issue.minimum];
  const limit = `${issue.inclusive === false ? exclusive : inclusive} ${end}`;
  return unit ? `has ${size}${unit}, and takes ${limit}` : `is ${size}, and must be ${limit}`;
}

const places = z.object({
  studyId: identifier.optional(),
  userId: identifier.optional(),
  uploadId: identifier.optional(),
  cellId: identifier.optional(),
  copyId: identifier.optional(),
  sessionId: identifier.optional(),
  invitationId: identifier.optional(),
  mailId: identifier.optional(),
  checkpointId: identifier.optional(),
  remarkId: identifier.optional(),
  replyId: identifier.optional(),
});

/** An identifier of the path, checked. */
export function place(params: unknown, name: keyof z.infer<typeof places>): string {
  const value = validate(places, params)[name];
  if (value === undefined) throw invalid(`${name} is missing from the address`);
  return value;
}

/** The secret part of a link's address; whatever it is, it is looked up by its hash. */
export function secretOf(params: { readonly token?: unknown }): string {
  return String(params.token ?? "");
}
