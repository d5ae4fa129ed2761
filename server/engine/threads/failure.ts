import type { Problem } from "../../../shared/schemas/problem.ts";
import { Refusal } from "../refusal.ts";
import { Cancelled } from "../run.ts";

/** How an item failed, as data: errors lose their class between threads. */
export type Failure =
  | { readonly kind: "refused"; readonly problems: readonly Problem[] }
  | { readonly kind: "cancelled"; readonly message: string }
  | { readonly kind: "fault"; readonly message: string; readonly stack?: string };

export function failureOf(error: unknown): Failure {
  if (error instanceof Refusal) return { kind: "refused", problems: error.problems };
  if (error instanceof Cancelled) return { kind: "cancelled", message: error.message };
  if (error instanceof Error) return { kind: "fault", message: error.message, stack: error.stack };
  return { kind: "fault", message: String(error) };
}

export function errorOf(failure: Failure): Error {
  if (failure.kind === "refused") return new Refusal(failure.problems);
  if (failure.kind === "cancelled") return new Cancelled(failure.message);
  const error = new Error(failure.message);
  if (failure.stack !== undefined) error.stack = failure.stack;
  return error;
}
