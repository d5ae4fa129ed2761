import type { Invitation } from "../../../shared/schemas/invitations.ts";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { agoInWords, dateInWords } from "../../lib/dates.ts";
import { useInvitations, useSendAgain, useWithdraw } from "./api/invitations.ts";
import { ROLE_WORDS } from "./roles.ts";

/** Who has been asked and has not answered. */
export function InvitationList({ studyId }: { studyId: string }) {
  const { data: invitations, error } = useInvitations(studyId);
  const again = useSendAgain(studyId);
  const withdraw = useWithdraw(studyId);
  const fault = error ?? again.error ?? withdraw.error;
  if (!fault && !invitations?.length) return null;
  const busy = again.isPending || withdraw.isPending;
  return (
    <section aria-labelledby="invited" className="pt-6">
      <h3 id="invited" className="type-section pb-2">
        Invited
      </h3>
      <ul>
        {invitations?.map((invitation) => (
          <li
            key={invitation.id}
            className="grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-6 border-rule border-t py-2.5 last:border-b"
          >
            <div className="min-w-0">
              <p className="truncate">{invitation.email}</p>
              <p className="type-small text-ink2">{standing(invitation)}</p>
            </div>
            <p className="flex gap-5">
              <Word disabled={busy} onClick={() => again.mutate(invitation.id)}>
                Send again <span className="sr-only">to {invitation.email}</span>
              </Word>
              <Word disabled={busy} onClick={() => withdraw.mutate(invitation.id)}>
                Withdraw <span className="sr-only">the invitation of {invitation.email}</span>
              </Word>
            </p>
          </li>
        ))}
      </ul>
      {fault && <Fault>{sentenceOf(fault)}</Fault>}
    </section>
  );
}

function standing({ role, invitedAt, expiresAt, hasRunOut }: Invitation): string {
  const end = hasRunOut ? "The link has run out." : `The link opens until ${dateInWords(expiresAt)}.`;
  return `As ${ROLE_WORDS[role]}, ${agoInWords(invitedAt)}. ${end}`;
}
