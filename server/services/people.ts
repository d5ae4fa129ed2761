import type { Role } from "../../shared/schemas/resources.ts";
import type { Database } from "../db/client.ts";
import { changeRole, deletePerson, type PersonRow, peopleOf } from "../db/queries/people.ts";
import { findStudy } from "../db/queries/studies.ts";
import { conflict, notFound } from "../errors.ts";
import * as texts from "../mail/texts.ts";
import type { Actor } from "../policies/can.ts";
import type { Access } from "./access.ts";
import type { RecordInJournal } from "./journal.ts";
import type { MailService } from "./mail.ts";
import type { ClosePerson } from "./ports.ts";

export type { PersonRow };

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly closePerson: ClosePerson;
  readonly mail: Pick<MailService, "send">;
  readonly record: RecordInJournal;
  readonly url: string;
}

export type PeopleService = ReturnType<typeof createPeopleService>;

/** Who is in a study. Every change acts at once, on open sockets too. */
export function createPeopleService({ db, access, closePerson, mail, record, url }: Collaborators) {
  function memberOf(studyId: string, userId: string): PersonRow {
    const person = peopleOf(db, studyId).find(({ id }) => id === userId);
    if (person === undefined) throw notFound("This person is not one of the study's people.");
    return person;
  }

  function keepAnOwner(studyId: string, leaving: PersonRow): void {
    const owners = peopleOf(db, studyId).filter(({ role }) => role === "owner");
    if (leaving.role === "owner" && owners.length === 1) {
      throw conflict(`${leaving.name} is the study's only owner: hand it over, or make someone else an owner first.`);
    }
  }

  return {
    list(actor: Actor, studyId: string): PersonRow[] {
      access.allow(actor, "people.read", studyId);
      return peopleOf(db, studyId);
    },

    /** Open sockets are closed, so that they come back with the new role. */
    change(actor: Actor, studyId: string, userId: string, role: Role): PersonRow {
      access.allow(actor, "people.change", studyId);
      const person = memberOf(studyId, userId);
      if (person.role === role) return person;
      keepAnOwner(studyId, person);
      changeRole(db, studyId, userId, role);
      record({ studyId, actor, action: "role changed", subject: `${person.name}, ${person.role} to ${role}` });
      closePerson(userId, studyId);
      return memberOf(studyId, userId);
    },

    /** An owner removes anyone; anyone may leave. */
    remove(actor: Actor, studyId: string, userId: string): void {
      const leaves = actor.id === userId;
      access.allow(actor, leaves ? "people.read" : "people.remove", studyId);
      const person = memberOf(studyId, userId);
      keepAnOwner(studyId, person);
      deletePerson(db, studyId, userId);
      if (leaves) record({ studyId, actor, action: "person left" });
      else record({ studyId, actor, action: "person removed", subject: person.name });
      closePerson(userId, studyId);
    },

    /**
     * The coauthor owns the study from now on, and the owner is a coauthor. At once and not by an offer that waits:
     * an owner may make anyone an owner as it is, the new owner can undo it, and whoever hands over is often leaving.
     */
    handOver(actor: Actor, studyId: string, userId: string): PersonRow[] {
      access.allow(actor, "people.hand over", studyId);
      const heir = memberOf(studyId, userId);
      const study = findStudy(db, studyId);
      const giver = memberOf(studyId, actor.id);
      if (heir.role !== "coauthor") {
        throw conflict(`${heir.name} is the study's ${heir.role}, and a study is handed over to a coauthor.`);
      }
      db.transaction((tx) => {
        changeRole(tx, studyId, heir.id, "owner");
        changeRole(tx, studyId, actor.id, "coauthor");
      });
      record({ studyId, actor, action: "ownership handed over", subject: heir.name });
      const about = { from: giver.name, study: study?.title ?? "", link: `${url}/studies/${studyId}` };
      mail.send({ to: heir.email, ...texts.ownershipHandedOver(about) });
      closePerson(heir.id, studyId);
      closePerson(actor.id, studyId);
      return peopleOf(db, studyId);
    },
  };
}
