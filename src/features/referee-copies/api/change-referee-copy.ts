import { useMutation } from "@tanstack/react-query";
import { refereeCopySummary, sealedRefereeCopy } from "../../../../shared/schemas/referee-copies.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";
import { endOf } from "../link-end.ts";
import { useCopiesChanged } from "./copies-changed.ts";

/** Moves the day on which the link of a copy runs out: so many days from now, or none. */
export function useMoveEnd(studyId: string, copyId: string) {
  return useMutation({
    mutationFn: (days: string) =>
      ask({
        method: "PATCH",
        path: api.refereeCopy(studyId, copyId),
        body: { expiresAt: endOf(days) ?? null },
        answer: refereeCopySummary,
      }),
    onSuccess: useCopiesChanged(studyId),
  });
}

/** A new link, told this once and sent where asked; the old one opens nothing from then on. */
export function useNewLink(studyId: string, copyId: string) {
  return useMutation({
    mutationFn: (email: string) =>
      ask({
        method: "POST",
        path: api.refereeLink(studyId, copyId),
        body: { email: email || undefined },
        answer: sealedRefereeCopy,
      }),
    onSuccess: useCopiesChanged(studyId),
  });
}
