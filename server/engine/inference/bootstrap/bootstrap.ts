import { percentileInterval } from "../../../../shared/economics/percentile.ts";
import type { BootstrapFinding } from "../../../../shared/schemas/standard-errors.ts";
import { Refusal } from "../../refusal.ts";
import type { RunControl } from "../../run.ts";
import { mapInOrder } from "../../threads/map-in-order.ts";
import { type Replicate, type ReplicateWork, replicateTask } from "./replicate.ts";
import type { Sampling } from "./sampling.ts";

/** More than this share of replicates without an estimate is no distribution of the estimates. */
const MOST_FAILED = 0.05;

/** Every replicate, on as many threads as there are: the same draws bit for bit on any number. Errors: `Cancelled`. */
export function estimateReplicates(work: ReplicateWork, replicates: number, control: RunControl): Replicate[] {
  const numbers = Array.from({ length: replicates }, (_, b) => b + 1);
  return mapInOrder(control, replicateTask, work, numbers, (done) => tell(done, replicates, control));
}

function tell(done: number, replicates: number, control: RunControl): void {
  control.progress({ step: "estimating replicates", iteration: done, fraction: done / replicates });
}

/**
 * Covariance of the draws (divisor B − 1) and percentile intervals of every coefficient, level 0.95.
 *
 * Errors: a refusal where more than 5 % of the replicates have no estimate, with how many and the first reason.
 */
export function summarise(
  replicates: readonly Replicate[],
  { of, seed, block }: Sampling,
): { covariance: number[][]; bootstrap: BootstrapFinding } {
  const draws = replicates.flatMap((replicate) => ("theta" in replicate ? [replicate.theta] : []));
  const failed = replicates.length - draws.length;
  const at = replicates.findIndex((replicate) => "refused" in replicate);
  const first = replicates[at];
  const firstFailure =
    first !== undefined && "refused" in first ? { replicate: at + 1, reason: first.refused } : undefined;
  if (firstFailure !== undefined && failed > MOST_FAILED * replicates.length) {
    const sentence = `${failed} of ${replicates.length} bootstrap replicates have no estimate, and at most 5 % may be without; the first is replicate ${firstFailure.replicate}: ${firstFailure.reason}`;
    throw new Refusal([{ sentence, key: ["standard errors"] }]);
  }
  return {
    covariance: covarianceOfDraws(draws),
    bootstrap: {
      of,
      replicates: replicates.length,
      failed,
      ...(firstFailure && { firstFailure }),
      seed,
      ...(block !== undefined && { block }),
      intervals: draws[0].map((_, a) => percentileInterval(draws.map((theta) => theta[a]))),
      draws,
    },
  };
}

/** Σ_b (θ*_b − θ̄*)(θ*_b − θ̄*)'/(B − 1). */
export function covarianceOfDraws(draws: readonly (readonly number[])[]): number[][] {
  const size = draws[0].length;
  const means = Array.from({ length: size }, (_, a) => draws.reduce((sum, theta) => sum + theta[a], 0) / draws.length);
  const centred = means.map((mean, a) => Float64Array.from(draws, (theta) => theta[a] - mean));
  const covariance = centred.map(() => new Array<number>(size).fill(0));
  for (let a = 0; a < size; a++) {
    for (let b = 0; b <= a; b++) {
      let sum = 0;
      for (let draw = 0; draw < draws.length; draw++) sum += centred[a][draw] * centred[b][draw];
      covariance[a][b] = sum / (draws.length - 1);
      covariance[b][a] = covariance[a][b];
    }
  }
  return covariance;
}
