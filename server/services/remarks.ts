import { randomUUID } from "node:crypto";
import type { NewRemark } from "../../shared/schemas/remarks.ts";
import type { Database } from "../db/client.ts";
import {
  changeRemark,
  changeReply,
  countReplies,
  deleteRemark,
  deleteReply,
  findRemark,
  findReply,
  insertRemark,
  insertReply,
  measureRemarks,
  type RemarkRow,
  type ReplyRow,
  remarkedCells,
  renameRemarkedCell,
} from "../db/queries/remarks.ts";
import { conflict, notFound } from "../errors.ts";
import type { Actor } from "../policies/can.ts";
import type { Access } from "./access.ts";
import type { SourcesOf } from "./ports.ts";
import { createRemarkViews, type RemarkView, type ReplyView } from "./remark-views.ts";

/** Remarks and replies of a study together, their characters, and the replies to one remark. */
export const REMARK_LIMITS = { ofStudy: 2_000, characters: 2_000_000, replies: 100 } as const;

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly sourcesOf: SourcesOf;
  /** Whoever has the study open is told. */
  readonly remarksChanged: (studyId: string) => void;
}

export type RemarkService = ReturnType<typeof createRemarkService>;

export function createRemarkService({ db, access, sourcesOf, remarksChanged }: Collaborators) {
  const views = createRemarkViews({ db, access, sourcesOf });

  function remarkOf(studyId: string, remarkId: string): RemarkRow {
    const remark = findRemark(db, studyId, remarkId);
    if (remark === undefined) throw notFound("There is no such remark in this study, or it was withdrawn.");
    return remark;
  }

  function replyOf(studyId: string, remarkId: string, replyId: string): ReplyRow {
    const reply = findReply(db, remarkOf(studyId, remarkId).id, replyId);
    if (reply === undefined) throw notFound("There is no such reply to this remark, or it was withdrawn.");
    return reply;
  }

  function keepWithinLimits(studyId: string, text: string): void {
    const { count, characters } = measureRemarks(db, studyId);
    const { ofStudy, characters: most } = REMARK_LIMITS;
    if (count >= ofStudy) {
      throw conflict(`This study has ${count} remarks and replies; at most ${ofStudy} are kept.`);
    }
    if (characters + text.length > most) {
      throw conflict(
        `Remarks of this study have ${characters + text.length} characters then; at most ${most} are kept.`,
      );
    }
  }

  return {
    async list(actor: Actor, studyId: string): Promise<RemarkView[]> {
      access.allow(actor, "remark.read", studyId);
      return views.all(actor, studyId);
    },

    async add(actor: Actor, studyId: string, { cellId, text, anchor }: NewRemark): Promise<RemarkView> {
      access.allow(actor, "remark.write", studyId);
      const cell = (await sourcesOf(studyId)).find(({ id }) => id === cellId);
      if (cell === undefined)
        throw notFound("The cell is not in this study any more, so nothing can be remarked on it.");
      keepWithinLimits(studyId, text);
      const id = randomUUID();
      insertRemark(db, {
        id,
        studyId,
        cellId,
        cellName: cell.name,
        anchor: anchor ?? null,
        authorId: actor.id,
        text,
        writtenAt: new Date(),
      });
      remarksChanged(studyId);
      return views.one(actor, studyId, id);
    },

    async edit(actor: Actor, studyId: string, remarkId: string, text: string): Promise<RemarkView> {
      access.allow(actor, "remark.read", studyId);
      const remark = remarkOf(studyId, remarkId);
      access.allow(actor, "remark.edit", studyId, remark.authorId);
      if (remark.withdrawnAt !== null) throw conflict("This remark was withdrawn; it has no words to change.");
      keepWithinLimits(studyId, text);
      if (text !== remark.text) {
        changeRemark(db, remark.id, { text, editedAt: new Date() });
        remarksChanged(studyId);
      }
      return views.one(actor, studyId, remarkId);
    },

    /** Settles a remark, or opens it again. Saying what is so already changes nothing. */
    async settle(actor: Actor, studyId: string, remarkId: string, settled: boolean): Promise<RemarkView> {
      access.allow(actor, "remark.read", studyId);
      const remark = remarkOf(studyId, remarkId);
      access.allow(actor, "remark.settle", studyId, remark.authorId);
      if (settled !== (remark.settledAt !== null)) {
        const at = new Date();
        const done = settled
          ? { settledBy: actor.id, settledAt: at, reopenedBy: null, reopenedAt: null }
          : { settledBy: null, settledAt: null, reopenedBy: actor.id, reopenedAt: at };
        changeRemark(db, remark.id, done);
        remarksChanged(studyId);
      }
      return views.one(actor, studyId, remarkId);
    },

    /** Its words are gone for good. While it has replies it stays as withdrawn, so that they keep their place. */
    withdraw(actor: Actor, studyId: string, remarkId: string): void {
      access.allow(actor, "remark.read", studyId);
      const remark = remarkOf(studyId, remarkId);
      access.allow(actor, "remark.withdraw", studyId, remark.authorId);
      if (countReplies(db, remark.id) === 0) deleteRemark(db, remark.id);
      else changeRemark(db, remark.id, { text: "", withdrawnAt: remark.withdrawnAt ?? new Date() });
      remarksChanged(studyId);
    },

    async reply(actor: Actor, studyId: string, remarkId: string, text: string): Promise<ReplyView> {
      access.allow(actor, "remark.write", studyId);
      const remark = remarkOf(studyId, remarkId);
      if (remark.settledAt !== null) throw conflict("This remark is settled; open it again to reply to it.");
      const replies = countReplies(db, remark.id);
      if (replies >= REMARK_LIMITS.replies) {
        throw conflict(`This remark has ${replies} replies, which is the most; a new remark has room.`);
      }
      keepWithinLimits(studyId, text);
      const reply = { id: randomUUID(), remarkId, authorId: actor.id, text, writtenAt: new Date() };
      insertReply(db, reply);
      remarksChanged(studyId);
      return views.reply(actor, studyId, { ...reply, editedAt: null });
    },

    async editReply(
      actor: Actor,
      studyId: string,
      remarkId: string,
      replyId: string,
      text: string,
    ): Promise<ReplyView> {
      access.allow(actor, "remark.read", studyId);
      const reply = replyOf(studyId, remarkId, replyId);
      access.allow(actor, "remark.edit", studyId, reply.authorId);
      keepWithinLimits(studyId, text);
      if (text === reply.text) return views.reply(actor, studyId, reply);
      const change = { text, editedAt: new Date() };
      changeReply(db, reply.id, change);
      remarksChanged(studyId);
      return views.reply(actor, studyId, { ...reply, ...change });
    },

    /** With the last reply to a withdrawn remark the remark goes too. */
    withdrawReply(actor: Actor, studyId: string, remarkId: string, replyId: string): void {
      access.allow(actor, "remark.read", studyId);
      const reply = replyOf(studyId, remarkId, replyId);
      access.allow(actor, "remark.withdraw", studyId, reply.authorId);
      db.transaction((tx) => {
        deleteReply(tx, reply.id);
        const isLast = countReplies(tx, remarkId) === 0;
        if (isLast && findRemark(tx, studyId, remarkId)?.withdrawnAt) deleteRemark(tx, remarkId);
      });
      remarksChanged(studyId);
    },

    /** The study's document was edited: remarks go by the name their cell has now. */
    async cellsChanged(studyId: string): Promise<void> {
      const remarked = remarkedCells(db, studyId);
      if (remarked.length === 0) return;
      const names = new Map((await sourcesOf(studyId)).map(({ id, name }) => [id, name]));
      for (const { cellId, cellName } of remarked) {
        const name = names.get(cellId);
        if (name !== undefined && name !== cellName) renameRemarkedCell(db, studyId, cellId, name);
      }
    },
  };
}
