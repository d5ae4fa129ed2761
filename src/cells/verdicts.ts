import type { Verdict } from "../../shared/tables/verdicts.ts";
import type { StripVerdict } from "../components/verdict-strip.tsx";

/** Verdicts as the strip draws them. */
export function stripOf(verdicts: readonly Verdict[]): StripVerdict[] {
  return verdicts.map(({ law, figure, word, note }) => ({ law, shape: figure, word, below: note }));
}
