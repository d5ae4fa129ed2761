import type { Progress } from "../../../shared/schemas/status.ts";
import { printFixed, printSize } from "../../../shared/tables/numbers.ts";
import { elapsedClock } from "../../lib/dates.ts";
import { writeNumber, writePercent } from "../../lib/formats.ts";

/** What is counted: iterations of the fit, or so many of a whole that is known, "estimating replicates, 77 of 500". */
function counted({ step, iteration, fraction }: Progress): string {
  if (iteration === undefined) return step;
  if (step === "iterating" || !fraction) return `iteration ${writeNumber(iteration)}`;
  return `${step}, ${writeNumber(iteration)} of ${writeNumber(Math.round(iteration / fraction))}`;
}

/** How far an estimation is: "iteration 7, log-likelihood 42,061.3, gradient 0.020; 0:14 of about 0:20". */
export function progressInWords(progress: Progress): string {
  const { iteration, logLikelihood, gradient, fraction, elapsedMs, aboutMs } = progress;
  const parts = [
    counted(progress),
    logLikelihood !== undefined && `log-likelihood ${printFixed(logLikelihood, 1)}`,
    gradient !== undefined && `gradient ${printSize(gradient)}`,
    iteration === undefined && fraction !== undefined && `${writePercent(fraction)}`,
  ].filter(Boolean);
  const of = aboutMs === undefined ? "" : ` of about ${elapsedClock(Math.max(aboutMs, 1000))}`;
  return `${parts.join(", ")}; ${elapsedClock(elapsedMs)}${of}`;
}

/** What can be cancelled: anything that has taken two seconds. */
export const CANCEL_AFTER_MS = 2_000;
