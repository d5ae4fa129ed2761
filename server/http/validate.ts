import { z } from "zod";
import { identifier } from "../../shared/schemas/primitives.ts";
import type { Problem } from "../../shared/schemas/problem.ts";
import { invalid } from "../errors.ts";

/** The value as the schema returns it, or a 400 that names every key that will not do. */
export function validate<T>(schema: z.ZodType<T>, value: unknown): T {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const problems = parsed.error.issues.map((issue): Problem => {
    const key = issue.path.map(String);
    return { sentence: key.length === 0 ? issue.message : `${key.join(".")}: ${issue.message}`, key };
  });
  throw invalid(problems.map((problem) => problem.sentence).join("; "), problems);
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
