import type { Problem } from "../../shared/schemas/problem.ts";

/**
 * The engine's "no": something in the specification, the upload or the numbers that a person must
 * mend. Carries every problem found, each naming the thing, the place and both numbers.
 */
export class Refusal extends Error {
  override name = "Refusal";
  readonly problems: readonly Problem[];

  constructor(problems: readonly Problem[] | string) {
    const list = typeof problems === "string" ? [{ sentence: problems }] : problems;
    super(list.map((problem) => problem.sentence).join(" "));
    this.problems = list;
  }
}

/** Why something was refused, where what asked for it goes on without. */
export interface Refused {
  readonly refused: string;
}

/** What `find` returns or, where it is refused, what `otherwise` makes of that: the reason. Other errors go on. */
export function unlessRefused<T>(find: () => T): T | Refused;
export function unlessRefused<T, U>(find: () => T, otherwise: (refusal: Refusal) => U): T | U;
export function unlessRefused<T, U>(find: () => T, otherwise?: (refusal: Refusal) => U): T | U | Refused {
  try {
    return find();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return otherwise ? otherwise(error) : { refused: error.message };
  }
}
