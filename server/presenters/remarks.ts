import type { Remark, RemarkReply } from "../../shared/schemas/remarks.ts";
import type { RemarkView, ReplyView } from "../services/remark-views.ts";

const SOMEONE = "someone no longer here";

const person = ({ id, name }: RemarkView["author"]) => ({ id, name: name ?? SOMEONE });

export function presentReply({ row, author, may }: ReplyView): RemarkReply {
  return {
    id: row.id,
    author: person(author),
    text: row.text,
    writtenAt: row.writtenAt.toISOString(),
    ...(row.editedAt !== null && { editedAt: row.editedAt.toISOString() }),
    may: { edit: may.edit, withdraw: may.withdraw },
  };
}

export function presentRemark({ row, settledBy, reopenedBy, ...view }: RemarkView): Remark {
  return {
    id: row.id,
    cellId: row.cellId,
    cellName: view.cellName,
    cellIsThere: view.cellIsThere,
    ...(row.anchor !== null && { anchor: row.anchor }),
    author: person(view.author),
    text: row.text,
    writtenAt: row.writtenAt.toISOString(),
    ...(row.editedAt !== null && { editedAt: row.editedAt.toISOString() }),
    ...(row.withdrawnAt !== null && { withdrawnAt: row.withdrawnAt.toISOString() }),
    ...(settledBy && row.settledAt !== null && { settled: { by: person(settledBy), at: row.settledAt.toISOString() } }),
    ...(reopenedBy &&
      row.reopenedAt !== null && { reopened: { by: person(reopenedBy), at: row.reopenedAt.toISOString() } }),
    may: { edit: view.may.edit, withdraw: view.may.withdraw, settle: view.may.settle },
    replies: view.replies.map(presentReply),
  };
}
