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
