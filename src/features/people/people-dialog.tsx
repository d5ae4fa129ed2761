import type { Person, Role } from "../../../shared/schemas/resources.ts";
import { Word } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useChangeRole, useRemovePerson } from "./api/change-people.ts";
import { usePeople } from "./api/list-people.ts";
import { HandOver } from "./hand-over.tsx";
import { InvitationList } from "./invitation-list.tsx";
import { InviteForm } from "./invite-form.tsx";
import { ROLE_WORDS } from "./roles.ts";

interface PeopleDialogProps {
  readonly studyId: string;
  readonly you: string;
  readonly isOwner: boolean;
  readonly onClose: () => void;
  /** You have left the study. */
  readonly onLeft: () => void;
}

/** Who is in the study, as what. An owner invites, changes, removes and hands over; anyone may leave. */
export default function PeopleDialog({ studyId, you, isOwner, onClose, onLeft }: PeopleDialogProps) {
  return (
    <Dialog
      onClose={onClose}
      title="People"
      lede="Owners and coauthors write. Readers see everything and change nothing. Referees need no account: seal a copy for them."
    >
      <PeopleList studyId={studyId} you={you} isOwner={isOwner} onLeft={onLeft} />
      {isOwner && (
        <>
          <InvitationList studyId={studyId} />
          <InviteForm studyId={studyId} />
          <HandOverOf studyId={studyId} />
        </>
      )}
    </Dialog>
  );
}

function HandOverOf({ studyId }: { studyId: string }) {
  const { data: people } = usePeople(studyId);
  return people ? <HandOver studyId={studyId} people={people} /> : null;
}

function PeopleList({ studyId, you, isOwner, onLeft }: Omit<PeopleDialogProps, "onClose">) {
  const { data: people, error, refetch } = usePeople(studyId);
  const change = useChangeRole(studyId);
  const remove = useRemovePerson(studyId);
  const fault = change.error ?? remove.error;
  const takeOut = (person: Person) => remove.mutate(person.id, { onSuccess: () => person.id === you && onLeft() });
  return (
    <>
      {error && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
      {!people && !error && (
        <p role="status" className="pb-2 text-ink2">
          Fetching the people
        </p>
      )}
      <ul>
        {people?.map((person) => (
          <li
            key={person.id}
            className="grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-6 border-rule border-t py-2.5 last:border-b sm:grid-cols-[minmax(0,1fr)_9rem_4.5rem]"
          >
            <div className="min-w-0">
              <p className="font-semibold">
                {person.name} {person.id === you && <span className="font-normal text-ink2">you</span>}
              </p>
              <p className="type-small truncate text-ink2">{person.email}</p>
            </div>
            {isOwner ? (
              <RoleChoice person={person} onChange={(role) => change.mutate({ userId: person.id, role })} />
            ) : (
              <span className="text-ink2">{ROLE_WORDS[person.role]}</span>
            )}
            {(isOwner || person.id === you) && (
              <Word disabled={remove.isPending} onClick={() => takeOut(person)} className="justify-self-end">
                {person.id === you ? "Leave" : "Remove"}{" "}
                <span className="sr-only">{person.id === you ? "the study" : person.name}</span>
              </Word>
            )}
          </li>
        ))}
      </ul>
      {fault && <Fault>{sentenceOf(fault)}</Fault>}
    </>
  );
}

function RoleChoice({ person, onChange }: { person: Person; onChange: (role: Role) => void }) {
  return (
    <select
      aria-label={`Role of ${person.name}`}
      className="field-line"
      value={person.role}
      onChange={(event) => onChange(event.target.value as Role)}
    >
      {Object.entries(ROLE_WORDS).map(([role, words]) => (
        <option key={role} value={role}>
          {words}
        </option>
      ))}
    </select>
  );
}
