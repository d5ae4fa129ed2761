import { queryOptions, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import { invitation, joined, linkedInvitation, openInvitation } from "../../../../shared/schemas/invitations.ts";
import type { Role } from "../../../../shared/schemas/resources.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

const list = z.array(invitation);

const invitationsOptions = (studyId: string) =>
  queryOptions({
    queryKey: ["invitations", studyId],
    queryFn: ({ signal }) => ask({ path: api.invitations(studyId), answer: list, signal }),
  });

/** Who has been invited into a study and has not answered; its owners ask. */
export const useInvitations = (studyId: string) => useQuery(invitationsOptions(studyId));

export function useInvite(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { email: string; role: Role }) =>
      ask({ method: "POST", path: api.invitations(studyId), body, answer: invitation }),
    onSuccess: () => client.invalidateQueries({ queryKey: ["invitations", studyId] }),
  });
}

export function useSendAgain(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (invitationId: string) =>
      ask({ method: "POST", path: api.invitation(studyId, invitationId), body: {}, answer: invitation }),
    onSettled: () => client.invalidateQueries({ queryKey: ["invitations", studyId] }),
  });
}

export function useWithdraw(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (invitationId: string) => ask({ method: "DELETE", path: api.invitation(studyId, invitationId) }),
    onSettled: () => client.invalidateQueries({ queryKey: ["invitations", studyId] }),
  });
}

/** The invitation behind a link. */
export const useLinkedInvitation = (token: string) =>
  useQuery({
    queryKey: ["invitation", token],
    queryFn: ({ signal }) => ask({ path: api.linkedInvitation(token), answer: linkedInvitation, signal }),
  });

export const useAcceptLinked = (token: string) =>
  useMutation({
    mutationFn: () => ask({ method: "POST", path: api.linkedInvitation(token), body: {}, answer: joined }),
  });

/** Makes the account the invitation is for, and joins. */
export function useAcceptAsNew(token: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string; password: string }) =>
      ask({ method: "POST", path: api.linkedInvitationAccount(token), body, answer: joined }),
    onSuccess: () => client.clear(),
  });
}

export const useRefuseLinked = (token: string) =>
  useMutation({ mutationFn: () => ask({ method: "DELETE", path: api.linkedInvitation(token) }) });

const own = z.array(openInvitation);

/** Invitations that wait for whoever is signed in. */
export const useOwnInvitations = () =>
  useQuery({
    queryKey: ["own invitations"],
    queryFn: ({ signal }) => ask({ path: api.ownInvitations, answer: own, signal }),
  });

export function useAnswerOwn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: async ({ id, accept }: { id: string; accept: boolean }) => {
      const path = api.ownInvitation(id);
      if (accept) await ask({ method: "POST", path, body: {} });
      else await ask({ method: "DELETE", path });
    },
    onSettled: () =>
      Promise.all([
        client.invalidateQueries({ queryKey: ["own invitations"] }),
        client.invalidateQueries({ queryKey: ["studies"] }),
      ]),
  });
}
