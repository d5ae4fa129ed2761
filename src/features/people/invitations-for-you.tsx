import type { OpenInvitation } from "../../../shared/schemas/invitations.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { dateInWords } from "../../lib/dates.ts";
import { useAnswerOwn, useOwnInvitations } from "./api/invitations.ts";
import { asRole } from "./roles.ts";

/** Invitations that wait for whoever is signed in, above their studies. */
export function InvitationsForYou() {
  const { data: invitations } = useOwnInvitations();
  const answer = useAnswerOwn();
  if (!invitations?.length) return null;
  return (
    <section aria-label="Invitations for you" className="pb-9">
      <ul className="border-line border-b">
        {invitations.map((invitation) => (
          <InvitationForYou
            key={invitation.id}
            invitation={invitation}
            busy={answer.isPending}
            onAnswer={(accept) => answer.mutate({ id: invitation.id, accept })}
          />
        ))}
      </ul>
      {answer.isError && <Fault>{sentenceOf(answer.error)}</Fault>}
    </section>
  );
}

interface InvitationForYouProps {
  readonly invitation: OpenInvitation;
  readonly busy: boolean;
  readonly onAnswer: (accept: boolean) => void;
}

function InvitationForYou({ invitation, busy, onAnswer }: InvitationForYouProps) {
  const { inviter, study, role, expiresAt } = invitation;
  return (
    <li className="flex flex-wrap items-baseline justify-between gap-x-8 gap-y-3 border-line border-t py-4">
      <p className="type-finding max-w-[34rem]">
        {inviter} invites you to {study}, {asRole(role)}.{" "}
        <span className="type-small text-ink2">Until {dateInWords(expiresAt)}.</span>
      </p>
      <p className="flex items-center gap-5">
        <Button disabled={busy} onClick={() => onAnswer(true)}>
          Accept <span className="sr-only">the invitation to {study}</span>
        </Button>
        <Word disabled={busy} onClick={() => onAnswer(false)}>
          Refuse <span className="sr-only">the invitation to {study}</span>
        </Word>
      </p>
    </li>
  );
}
