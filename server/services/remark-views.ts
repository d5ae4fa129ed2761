import type { Database } from "../db/client.ts";
import { findRemark, namesOf, type RemarkRow, type ReplyRow, remarksOf, repliesOf } from "../db/queries/remarks.ts";
import { notFound } from "../errors.ts";
import { type Action, type Actor, can } from "../policies/can.ts";
import type { Access } from "./access.ts";
import type { SourcesOf } from "./ports.ts";

interface Author {
  readonly id: string;
  /** Undefined when the account is gone. */
  readonly name: string | undefined;
}

/** A reply as one reader sees it: with its author's name and what that reader may do with it. */
export interface ReplyView {
  readonly row: ReplyRow;
  readonly author: Author;
  readonly may: { readonly edit: boolean; readonly withdraw: boolean };
}

export interface RemarkView {
  readonly row: RemarkRow;
  readonly cellName: string;
  readonly cellIsThere: boolean;
  readonly author: Author;
  readonly settledBy: Author | undefined;
  readonly reopenedBy: Author | undefined;
  readonly may: { readonly edit: boolean; readonly withdraw: boolean; readonly settle: boolean };
  readonly replies: readonly ReplyView[];
}

interface Collaborators {
  readonly db: Database;
  readonly access: Pick<Access, "roleOf">;
  readonly sourcesOf: SourcesOf;
}

/** Rows of remarks put together as whoever asks may see them. */
export function createRemarkViews({ db, access, sourcesOf }: Collaborators) {
  const viewer = (actor: Actor, studyId: string) => {
    const role = access.roleOf(actor.id, studyId);
    return (action: Action, madeBy: string) => can(actor, action, { roleOf: () => role }, madeBy);
  };

  function replyView(row: ReplyRow, names: ReadonlyMap<string, string>, allowed: ReturnType<typeof viewer>): ReplyView {
    return {
      row,
      author: { id: row.authorId, name: names.get(row.authorId) },
      may: { edit: allowed("remark.edit", row.authorId), withdraw: allowed("remark.withdraw", row.authorId) },
    };
  }

  async function viewsOf(actor: Actor, studyId: string, rows: readonly RemarkRow[]): Promise<RemarkView[]> {
    const replies = byRemark(repliesOf(db, studyId));
    const cells = new Map((await sourcesOf(studyId)).map(({ id, name }) => [id, name]));
    const names = namesOf(db, [...peopleIn(rows, [...replies.values()].flat())]);
    const allowed = viewer(actor, studyId);
    const person = (id: string | null) => (id === null ? undefined : { id, name: names.get(id) });
    return rows.map((row) => ({
      row,
      cellName: cells.get(row.cellId) ?? row.cellName,
      cellIsThere: cells.has(row.cellId),
      author: { id: row.authorId, name: names.get(row.authorId) },
      settledBy: person(row.settledBy),
      reopenedBy: person(row.reopenedBy),
      may: {
        edit: row.withdrawnAt === null && allowed("remark.edit", row.authorId),
        withdraw: row.withdrawnAt === null && allowed("remark.withdraw", row.authorId),
        settle: allowed("remark.settle", row.authorId),
      },
      replies: (replies.get(row.id) ?? []).map((reply) => replyView(reply, names, allowed)),
    }));
  }

  return {
    all: (actor: Actor, studyId: string): Promise<RemarkView[]> => viewsOf(actor, studyId, remarksOf(db, studyId)),

    async one(actor: Actor, studyId: string, remarkId: string): Promise<RemarkView> {
      const row = findRemark(db, studyId, remarkId);
      const [view] = row === undefined ? [] : await viewsOf(actor, studyId, [row]);
      if (view === undefined) throw notFound("This remark was withdrawn meanwhile.");
      return view;
    },

    reply: (actor: Actor, studyId: string, row: ReplyRow): ReplyView =>
      replyView(row, namesOf(db, [row.authorId]), viewer(actor, studyId)),
  };
}

function byRemark(replies: readonly ReplyRow[]): ReadonlyMap<string, ReplyRow[]> {
  const grouped = new Map<string, ReplyRow[]>();
  for (const reply of replies) {
    const together = grouped.get(reply.remarkId);
    if (together) together.push(reply);
    else grouped.set(reply.remarkId, [reply]);
  }
  return grouped;
}

function peopleIn(rows: readonly RemarkRow[], replies: readonly ReplyRow[]): Set<string> {
  const people = rows.flatMap(({ authorId, settledBy, reopenedBy }) => [authorId, settledBy, reopenedBy]);
  return new Set([...people, ...replies.map(({ authorId }) => authorId)].filter((id) => id !== null));
}
