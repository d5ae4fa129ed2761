import { useState } from "react";
import { useNavigate, useParams } from "react-router-dom";
import type { LinkedInvitation } from "../../../shared/schemas/invitations.ts";
import type { Account } from "../../../shared/schemas/resources.ts";
import { Button, LinkButton, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { useMe } from "../../features/accounts/api/get-me.ts";
import { CreateAccountForm } from "../../features/accounts/create-account-form.tsx";
import {
  useAcceptAsNew,
  useAcceptLinked,
  useLinkedInvitation,
  useRefuseLinked,
} from "../../features/people/api/invitations.ts";
import { asRole } from "../../features/people/roles.ts";
import { sentenceOf } from "../../lib/api.ts";
import { dateInWords } from "../../lib/dates.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";
import { LinkFault } from "../link-fault.tsx";
import { useLeave } from "../use-leave.ts";

/** Behind the link of an invitation: who invites, into what, and how to answer. */
export default function InvitationPage() {
  const { token = "" } = useParams();
  const { data: invitation, error } = useLinkedInvitation(token);
  const { data: me, isPending } = useMe();
  const refuse = useRefuseLinked(token);
  const [isRefused, setIsRefused] = useState(false);
  usePageTitle("Invitation", invitation?.study);
  if (isRefused) {
    return (
      <Door title="Invitation">
        <p role="status" className="type-finding">
          You have refused. Nothing was made, and the link opens nothing any more.
        </p>
      </Door>
    );
  }
  return (
    <Door title="Invitation">
      {error && !invitation && <LinkFault error={error} again={{ to: pages.studies, words: "To the studies" }} />}
      {!invitation && !error && <p role="status">Opening the invitation</p>}
      {invitation && !isPending && (
        <>
          <p className="type-finding pb-6">
            {invitation.inviter} invites {invitation.email} to{" "}
            <strong className="font-medium">{invitation.study}</strong>, {asRole(invitation.role)}, until{" "}
            {dateInWords(invitation.expiresAt)}.
          </p>
          <Answer token={token} invitation={invitation} me={me} />
          <p className="pt-6">
            <Word
              disabled={refuse.isPending}
              onClick={() => refuse.mutate(undefined, { onSuccess: () => setIsRefused(true) })}
            >
              Refuse the invitation
            </Word>
          </p>
          {refuse.isError && <Fault>{sentenceOf(refuse.error)}</Fault>}
        </>
      )}
    </Door>
  );
}

interface AnswerProps {
  readonly token: string;
  readonly invitation: LinkedInvitation;
  readonly me: Account | undefined;
}

/** As whoever is signed in, as an account that signs in first, or as one that is made here. */
function Answer({ token, invitation, me }: AnswerProps) {
  if (me?.email.toLowerCase() === invitation.email) return <AcceptAs token={token} me={me} />;
  if (me) return <AnotherAccount me={me} email={invitation.email} />;
  if (!invitation.hasAccount) return <AcceptAsNew token={token} email={invitation.email} />;
  const back = encodeURIComponent(`/invitation/${token}`);
  return (
    <LinkButton filled className="min-h-10.5!" to={`${pages.signIn}?to=${back}`}>
      Sign in to accept
    </LinkButton>
  );
}

function AcceptAs({ token, me }: { token: string; me: Account }) {
  const accept = useAcceptLinked(token);
  const navigate = useNavigate();
  return (
    <>
      <Button
        filled
        className="min-h-10.5!"
        disabled={accept.isPending}
        onClick={() =>
          accept.mutate(undefined, { onSuccess: ({ studyId }) => navigate(pages.study(studyId), { replace: true }) })
        }
      >
        Accept as {me.name}
      </Button>
      {accept.isError && <Fault>{sentenceOf(accept.error)}</Fault>}
    </>
  );
}

function AnotherAccount({ me, email }: { me: Account; email: string }) {
  const leave = useLeave(me.id, null);
  return (
    <>
      <p className="pb-4">
        You are signed in as {me.email}, and the invitation is for {email}. Sign out to answer it as {email}.
      </p>
      <Button filled className="min-h-10.5!" onClick={leave}>
        Sign out
      </Button>
    </>
  );
}

function AcceptAsNew({ token, email }: { token: string; email: string }) {
  const accept = useAcceptAsNew(token);
  const navigate = useNavigate();
  return (
    <CreateAccountForm
      email={email}
      words="Create the account and accept"
      isPending={accept.isPending}
      error={accept.error}
      onCreate={(fields) =>
        accept.mutate(fields, { onSuccess: ({ studyId }) => navigate(pages.study(studyId), { replace: true }) })
      }
    />
  );
}
