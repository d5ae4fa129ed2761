import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type NewRemark, remark, remarkReply } from "../../../../shared/schemas/remarks.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";
import { remarksOptions } from "./list-remarks.ts";

/** Done once the list has been asked for anew, so that what was written is on the page when its field goes. */
function useChange<T>(studyId: string, mutationFn: (what: T) => Promise<unknown>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn,
    // Without a connection it is refused at once: nothing waits unseen to be sent later.
    networkMode: "always",
    onSuccess: () => client.invalidateQueries({ queryKey: remarksOptions(studyId).queryKey }),
  });
}

export const useAddRemark = (studyId: string) =>
  useChange(studyId, (body: NewRemark) => ask({ method: "POST", path: api.remarks(studyId), body, answer: remark }));

export const useReply = (studyId: string, remarkId: string) =>
  useChange(studyId, (text: string) =>
    ask({ method: "POST", path: api.replies(studyId, remarkId), body: { text }, answer: remarkReply }),
  );

export const useSettle = (studyId: string, remarkId: string) =>
  useChange(studyId, (settled: boolean) =>
    ask({ method: "PATCH", path: api.remarkSettled(studyId, remarkId), body: { settled }, answer: remark }),
  );

/** Other words for a remark, or for a reply to it. */
export const useReword = (studyId: string, remarkId: string, replyId?: string) =>
  useChange(studyId, (text: string) =>
    replyId === undefined
      ? ask({ method: "PATCH", path: api.remark(studyId, remarkId), body: { text }, answer: remark })
      : ask({ method: "PATCH", path: api.reply(studyId, remarkId, replyId), body: { text }, answer: remarkReply }),
  );

export const useWithdraw = (studyId: string, remarkId: string, replyId?: string) =>
  useChange(studyId, () =>
    ask({
      method: "DELETE",
      path: replyId === undefined ? api.remark(studyId, remarkId) : api.reply(studyId, remarkId, replyId),
    }),
  );
