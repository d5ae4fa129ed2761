import { randomUUID } from "node:crypto";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { inOrder } from "../../shared/study/order.ts";
import { writeStudyFile } from "../../shared/study/write-study-file.ts";
import type { Database } from "../db/client.ts";
import {
  type CheckpointRow,
  type CheckpointSummaryRow,
  changeCheckpoint,
  checkpointsOf,
  checkpointTotals,
  deleteCheckpoint,
  findCheckpoint,
  insertCheckpoint,
} from "../db/queries/checkpoints.ts";
import { findStudy } from "../db/queries/studies.ts";
import { conflict, notFound } from "../errors.ts";
import type { Actor } from "../policies/can.ts";
import { type Access, noSuchStudy } from "./access.ts";
import type { RecordInJournal } from "./journal.ts";
import type { SourcesOf } from "./ports.ts";

export type { CheckpointSummaryRow };

/** A checkpoint with what it holds. */
export interface CheckpointView {
  readonly row: CheckpointSummaryRow;
  readonly cells: readonly CellSource[];
}

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly sourcesOf: SourcesOf;
  readonly record: RecordInJournal;
  readonly limits?: Partial<CheckpointLimits>;
}

export interface CheckpointLimits {
  readonly count: number;
  /** Of all checkpoints of a study together, in characters. */
  readonly size: number;
}

const LIMITS: CheckpointLimits = { count: 200, size: 64_000_000 };

export type CheckpointService = ReturnType<typeof createCheckpointService>;

/**
 * States of a study under a name. Each holds its cells whole, with their ids, so that neither later edits nor the compaction
 * of updates touch it, and whoever returns to it finds the findings of then under the same fingerprints.
 */
export function createCheckpointService({ db, access, sourcesOf, record, limits: own }: Collaborators) {
  const limits = { ...LIMITS, ...own };

  async function keep(
    actor: Actor,
    studyId: string,
    about: Pick<CheckpointRow, "name" | "note" | "occasion">,
  ): Promise<CheckpointSummaryRow> {
    const study = findStudy(db, studyId);
    if (study === undefined) throw noSuchStudy();
    const sources = await sourcesOf(studyId);
    const cells = JSON.stringify(sources);
    checkRoom(studyId, cells.length);
    const id = randomUUID();
    insertCheckpoint(db, {
      ...about,
      id,
      studyId,
      madeBy: actor.id,
      madeAt: new Date(),
      title: study.title,
      lede: study.lede,
      cells,
      cellCount: sources.length,
      size: cells.length,
    });
    return found(studyId, id);
  }

  function checkRoom(studyId: string, more: number): void {
    const { count, size } = checkpointTotals(db, studyId);
    if (count >= limits.count) {
      throw conflict(`This study has ${count} checkpoints, which is the most: remove one that is no longer needed.`);
    }
    if (size + more > limits.size) {
      throw conflict(
        `The checkpoints of this study hold ${size} characters, and this one has ${more} more; at most ${limits.size}: remove one that is no longer needed.`,
      );
    }
  }

  function found(studyId: string, checkpointId: string) {
    const checkpoint = findCheckpoint(db, studyId, checkpointId);
    if (checkpoint === undefined) throw notFound("There is no such checkpoint of this study.");
    return checkpoint;
  }

  function whole(studyId: string, checkpointId: string): CheckpointView {
    const row = found(studyId, checkpointId);
    return { row, cells: inOrder(JSON.parse(row.cells) as CellSource[]) };
  }

  return {
    /** The newest first. */
    list(actor: Actor, studyId: string): CheckpointSummaryRow[] {
      access.allow(actor, "checkpoint.read", studyId);
      return checkpointsOf(db, studyId);
    },

    read(actor: Actor, studyId: string, checkpointId: string): CheckpointView {
      access.allow(actor, "checkpoint.read", studyId);
      return whole(studyId, checkpointId);
    },

    /** The state of then as a study file. */
    file(actor: Actor, studyId: string, checkpointId: string): { readonly name: string; readonly text: string } {
      access.allow(actor, "checkpoint.read", studyId);
      const { title, lede, name } = found(studyId, checkpointId);
      const { cells } = whole(studyId, checkpointId);
      return { name, text: writeStudyFile({ title, lede, cells }) };
    },

    async make(actor: Actor, studyId: string, wanted: { name: string; note: string }): Promise<CheckpointSummaryRow> {
      access.allow(actor, "checkpoint.make", studyId);
      const kept = await keep(actor, studyId, { ...wanted, occasion: "kept" });
      record({ studyId, actor, action: "checkpoint kept", subject: wanted.name });
      return kept;
    },

    change(
      actor: Actor,
      studyId: string,
      checkpointId: string,
      change: { name?: string; note?: string },
    ): CheckpointSummaryRow {
      access.allow(actor, "checkpoint.change", studyId);
      found(studyId, checkpointId);
      if (Object.keys(change).length > 0) changeCheckpoint(db, checkpointId, change);
      return found(studyId, checkpointId);
    },

    /** Keeps the state that is about to be left. The returning itself is an edit of the person's page, so that it can be undone there. */
    async beginReturn(
      actor: Actor,
      studyId: string,
      checkpointId: string,
    ): Promise<{ readonly to: CheckpointView; readonly before: CheckpointSummaryRow }> {
      access.allow(actor, "checkpoint.return", studyId);
      const to = whole(studyId, checkpointId);
      const name = `Before returning to ${to.row.name}`.slice(0, 120);
      const before = await keep(actor, studyId, { name, note: "", occasion: "before returning" });
      record({ studyId, actor, action: "checkpoint returned to", subject: to.row.name });
      return { to, before };
    },

    remove(actor: Actor, studyId: string, checkpointId: string): void {
      access.allow(actor, "checkpoint.remove", studyId);
      const { name } = found(studyId, checkpointId);
      deleteCheckpoint(db, checkpointId);
      record({ studyId, actor, action: "checkpoint removed", subject: name });
    },
  };
}
