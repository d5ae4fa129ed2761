import { capital } from "../../../shared/study/words.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { Refusal } from "../refusal.ts";

/**
 * What cannot be evaluated at a point (a predicted share of nothing, a system not defined) is the engine's "no", not its
 * fault; the refusal names the point where one is given.
 */
export function refusingRanges<T>(compute: () => T, pointName?: string): T {
  try {
    return compute();
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    const message = pointName === undefined ? error.message : `at ${withArticle(pointName)} ${error.message}`;
    const sentence = capital(message);
    throw new Refusal(sentence.endsWith(".") ? sentence : `${sentence}.`);
  }
}
