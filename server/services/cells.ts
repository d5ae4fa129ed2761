import { finding as findingSchema } from "../../shared/schemas/cell.ts";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import type { Database } from "../db/client.ts";
import { findFinding } from "../db/queries/findings.ts";
import type { JobPool } from "../jobs/pool.ts";
import { Conductor } from "./cells/conductor.ts";
import { Durations } from "./cells/durations.ts";
import type { Cells, SourcesOf, StoredFinding } from "./ports.ts";

interface Collaborators {
  readonly db: Database;
  readonly pool: Pick<JobPool, "runCell">;
  readonly sourcesOf: SourcesOf;
  /** Tells everyone in the study. */
  readonly publish: (studyId: string, status: StudyStatus) => void;
  /** Hears of what went wrong where nobody waits for an answer. */
  readonly report?: (error: unknown) => void;
  /** How long edits must rest before their cells are looked at again. */
  readonly restMs?: number;
}

/**
 * Keeps the findings of every study up to what its cells ask: light cells follow by themselves, long
 * estimations wait to be asked for, and a question that has been answered is never computed again.
 */
export function createCellService({
  db,
  pool,
  sourcesOf,
  publish,
  report = () => {},
  restMs = 100,
}: Collaborators): Cells & { close(): void } {
  const durations = new Durations();
  const conductors = new Map<string, Conductor>();
  const rests = new Map<string, NodeJS.Timeout>();

  function conductorOf(studyId: string): Conductor {
    const known = conductors.get(studyId);
    if (known) return known;
    const conductor = new Conductor({
      studyId,
      db,
      pool,
      durations,
      sources: () => sourcesOf(studyId),
      publish: (status) => publish(studyId, status),
      report,
    });
    conductors.set(studyId, conductor);
    return conductor;
  }

  return {
    changed(studyId) {
      if (rests.has(studyId)) return;
      const rest = setTimeout(() => {
        rests.delete(studyId);
        conductorOf(studyId).refresh().catch(report);
      }, restMs);
      rests.set(studyId, rest);
    },

    async status(studyId) {
      const conductor = conductorOf(studyId);
      // Edits that still rest are part of what is asked about.
      if (!conductor.isReady || rests.has(studyId)) await conductor.refresh();
      return conductor.status();
    },

    estimate: (studyId, cellId, userId) => conductorOf(studyId).estimate(cellId, userId),
    cancel: (studyId, cellId) => conductorOf(studyId).cancel(cellId),
    bringUpToDate: (studyId, userId) => conductorOf(studyId).bringUpToDate(userId),

    removed(studyId) {
      clearTimeout(rests.get(studyId));
      rests.delete(studyId);
      conductors.get(studyId)?.close();
      conductors.delete(studyId);
    },

    async dataOf(studyId, cellId) {
      const conductor = conductorOf(studyId);
      if (!conductor.isReady || rests.has(studyId)) await conductor.refresh();
      return conductor.dataOf(cellId);
    },

    finding(studyId, fingerprint): StoredFinding | undefined {
      const row = findFinding(db, studyId, fingerprint);
      if (!row) return undefined;
      return { finding: findingSchema.parse(JSON.parse(row.finding)), foundAt: row.foundAt, tookMs: row.tookMs };
    },

    /** Stops what runs; it will be told as interrupted. */
    close() {
      for (const rest of rests.values()) clearTimeout(rest);
      rests.clear();
      for (const conductor of conductors.values()) conductor.close();
      conductors.clear();
    },
  };
}
