import { Refusal } from "../refusal.ts";

/** What cannot be evaluated at a point (a predicted share of nothing) is the engine's "no", not its fault. */
export function refusingRanges<T>(compute: () => T): T {
  try {
    return compute();
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    const sentence = error.message.charAt(0).toUpperCase() + error.message.slice(1);
    throw new Refusal(sentence.endsWith(".") ? sentence : `${sentence}.`);
  }
}
