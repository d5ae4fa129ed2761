import type { Problem } from "../shared/schemas/problem.ts";

/**
 * A "no" that a client is told: what HTTP calls it, a code for programs, a sentence for people.
 * Anything that is not one of these answers 500 and says nothing of itself.
 */
export class ServiceError extends Error {
  override name = "ServiceError";
  readonly status: number;
  readonly code: string;
  readonly problems: readonly Problem[];

  constructor(status: number, code: string, sentence: string, problems: readonly Problem[] = []) {
    super(sentence);
    this.status = status;
    this.code = code;
    this.problems = problems;
  }
}

export const notSignedIn = () => new ServiceError(401, "not signed in", "Sign in to see this.");

export const invalid = (sentence: string, problems: readonly Problem[] = []) =>
  new ServiceError(400, "invalid", sentence, problems);

export const forbidden = (sentence: string) => new ServiceError(403, "not allowed", sentence);

export const foreignOrigin = (sentence: string) => new ServiceError(403, "foreign origin", sentence);

export const notFound = (sentence: string) => new ServiceError(404, "not found", sentence);

export const conflict = (sentence: string) => new ServiceError(409, "conflict", sentence);

export const tooLarge = (sentence: string) => new ServiceError(413, "too large", sentence);

export const refused = (sentence: string, problems: readonly Problem[] = []) =>
  new ServiceError(422, "refused", sentence, problems);

export const tooMany = (sentence: string) => new ServiceError(429, "too many requests", sentence);
