import type { Standing } from "./standing.ts";

/** A cell that was asked for together with others, and about how long it takes. */
export interface Asked {
  readonly cellId: string;
  readonly aboutMs: number;
}

export interface GoingThrough {
  /** Those estimated or given up, of all that were asked for. */
  readonly done: number;
  readonly of: number;
  /** The one being estimated now; none between two. */
  readonly now?: string;
  /** 0 to 1, by the time each takes. */
  readonly fraction: number;
  /** Those that are estimated or wait their turn, in the order of the study. */
  readonly left: readonly string[];
}

/** An estimation that takes longer than it was thought to does not seem finished for that. */
const NEARLY = 0.95;

/** How far the cells asked for together have come, as one. */
export function goingThrough(asked: readonly Asked[], standings: readonly Standing[]): GoingThrough {
  const standingOf = new Map(standings.map((standing) => [standing.cell.id, standing]));
  const total = asked.reduce((sum, { aboutMs }) => sum + aboutMs, 0) || 1;
  let behind = 0;
  const left: string[] = [];
  let now: string | undefined;
  for (const { cellId, aboutMs } of asked) {
    const standing = standingOf.get(cellId);
    if (standing?.state !== "estimating") {
      behind += aboutMs;
      continue;
    }
    left.push(cellId);
    const { progress } = standing;
    const isWaiting = progress?.step.startsWith("waiting") ?? true;
    if (progress && !isWaiting) {
      now ??= standing.cell.name;
      behind += aboutMs * Math.min(NEARLY, progress.fraction ?? progress.elapsedMs / Math.max(aboutMs, 1));
    }
  }
  return {
    done: asked.length - left.length,
    of: asked.length,
    ...(now !== undefined && { now }),
    fraction: Math.min(1, behind / total),
    left,
  };
}
