import type { MessagePort } from "node:worker_threads";
import type { RunControl, Threads } from "../engine/run.ts";
import type { ProgressNow } from "./job.ts";

const MILLISECONDS_BETWEEN_REPORTS = 100;

/**
 * How the engine speaks from within a worker: about ten reports a second at most, a new step always,
 * and cancelled when the other thread has raised the flag.
 */
export function workerControl(
  port: Pick<MessagePort, "postMessage">,
  flag: SharedArrayBuffer,
  threads: Threads,
): RunControl {
  const raised = new Int32Array(flag);
  let reported = Number.NEGATIVE_INFINITY;
  let step = "";
  return {
    progress(now: ProgressNow) {
      const time = performance.now();
      if (now.step === step && time - reported < MILLISECONDS_BETWEEN_REPORTS) return;
      reported = time;
      step = now.step;
      port.postMessage(now);
    },
    cancelled: () => Atomics.load(raised, 0) !== 0,
    threads,
  };
}
