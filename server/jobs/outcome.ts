import { Refusal } from "../engine/refusal.ts";
import { Cancelled } from "../engine/run.ts";
import type { Outcome } from "./job.ts";

/** Runs and tells how it ended; anything but a refusal or a cancellation is a fault and is thrown on. */
export async function outcomeOf<T>(run: () => T | Promise<T>): Promise<Outcome<T>> {
  try {
    return { ended: "done", result: await run() };
  } catch (error) {
    if (error instanceof Cancelled) return { ended: "cancelled" };
    if (error instanceof Refusal) return { ended: "refused", problems: error.problems };
    throw error;
  }
}

/** The other way round, on the thread that asked. */
export function resultOf<T>(outcome: Outcome<T>): T {
  if (outcome.ended === "done") return outcome.result;
  throw outcome.ended === "refused" ? new Refusal(outcome.problems) : new Cancelled("cancelled");
}
