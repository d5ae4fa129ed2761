import type { RunControl } from "../run.ts";
import { type Criterion, LOG_TWO_PI_E, type State } from "./criterion.ts";
import type { Estimation } from "./estimation.ts";

const POLL_MS = 50;

type Spoken = Parameters<RunControl["progress"]>[0];

/** Says where an iteration stands, a few times a second; `inside` is for what it calls: passes over the rows say how far they are. */
export function iterationProgress({ moments, equations }: Estimation, criterion: Criterion, control: RunControl) {
  let lastSpoken = Number.NEGATIVE_INFINITY;
  let spoken: Spoken = { step: "iterating" };
  const inside: RunControl = {
    ...(control.threads && { threads: control.threads }),
    cancelled: () => control.cancelled(),
    progress: ({ fraction }) => control.progress({ ...spoken, ...(fraction !== undefined && { fraction }) }),
  };
  return {
    inside,
    say(iteration: number, gradient: number, largestStep: number, { value }: State): void {
      if (performance.now() - lastSpoken <= POLL_MS) return;
      lastSpoken = performance.now();
      const logLikelihood = -value - (moments.rows / 2) * equations.length * LOG_TWO_PI_E;
      spoken = {
        step: "iterating",
        iteration,
        gradient,
        largestStep,
        ...(criterion.kind === "likelihood" && { logLikelihood }),
      };
      control.progress(spoken);
    },
  };
}

/** Largest |∂/∂φ| per observation. */
export function largestGradient(gradient: Float64Array, rows: number): number {
  return gradient.reduce((most, value) => Math.max(most, Math.abs(value)), 0) / rows;
}
