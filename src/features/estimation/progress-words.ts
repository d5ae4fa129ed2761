import type { Progress } from "../../../shared/schemas/status.ts";
import { printCount, printFixed, printSize } from "../../../shared/tables/numbers.ts";
import { elapsedClock } from "../../lib/dates.ts";

/** How far an estimation is: "iteration 7, log-likelihood 42,061.3, gradient 0.02; 0:14 of about 0:20". */
export function progressInWords(progress: Progress): string {
  const { step, iteration, logLikelihood, gradient, fraction, elapsedMs, aboutMs } = progress;
  const parts = [
    iteration === undefined ? step : `iteration ${printCount(iteration)}`,
    logLikelihood !== undefined && `log-likelihood ${printFixed(logLikelihood, 1)}`,
    gradient !== undefined && `gradient ${printSize(gradient)}`,
    iteration === undefined && fraction !== undefined && `${Math.floor(fraction * 100)}\u2009%`,
  ].filter(Boolean);
  const of = aboutMs === undefined ? "" : ` of about ${elapsedClock(Math.max(aboutMs, 1000))}`;
  return `${parts.join(", ")}; ${elapsedClock(elapsedMs)}${of}`;
}

/** What can be cancelled: anything that has taken two seconds. */
export const CANCEL_AFTER_MS = 2_000;
