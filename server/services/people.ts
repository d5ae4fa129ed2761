import type { Role } from "../../shared/schemas/resources.ts";
import type { Database } from "../db/client.ts";
import { findAccountByEmail } from "../db/queries/accounts.ts";
import { changeRole, deletePerson, insertPerson, type PersonRow, peopleOf } from "../db/queries/people.ts";
import { conflict, notFound } from "../errors.ts";
import type { Actor } from "../policies/can.ts";
import type { Access } from "./access.ts";
import type { ClosePerson } from "./ports.ts";

export type { PersonRow };

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly closePerson: ClosePerson;
}

export type PeopleService = ReturnType<typeof createPeopleService>;

export function createPeopleService({ db, access, closePerson }: Collaborators) {
  function memberOf(studyId: string, userId: string): PersonRow {
    const person = peopleOf(db, studyId).find(({ id }) => id === userId);
    if (person === undefined) throw notFound("This person is not one of the study's people.");
    return person;
  }

  function keepAnOwner(studyId: string, leaving: PersonRow): void {
    const owners = peopleOf(db, studyId).filter(({ role }) => role === "owner");
    if (leaving.role === "owner" && owners.length === 1) {
      throw conflict(`${leaving.name} is the study's only owner: make someone else an owner first.`);
    }
  }

  return {
    list(actor: Actor, studyId: string): PersonRow[] {
      access.allow(actor, "people.read", studyId);
      return peopleOf(db, studyId);
    },

    add(actor: Actor, studyId: string, wanted: { email: string; role: Role }): PersonRow {
      access.allow(actor, "people.add", studyId);
      const account = findAccountByEmail(db, wanted.email);
      if (account === undefined) {
        throw notFound(`There is no account with the address ${wanted.email}: it is made on the sign-in page first.`);
      }
      const already = access.roleOf(account.id, studyId);
      if (already !== undefined) throw conflict(`${account.name} is the study's ${already} already.`);
      insertPerson(db, studyId, account.id, wanted.role, new Date());
      return memberOf(studyId, account.id);
    },

    /** Open sockets are closed, so that they come back with the new role. */
    change(actor: Actor, studyId: string, userId: string, role: Role): PersonRow {
      access.allow(actor, "people.change", studyId);
      const person = memberOf(studyId, userId);
      if (person.role === role) return person;
      keepAnOwner(studyId, person);
      changeRole(db, studyId, userId, role);
      closePerson(userId, studyId);
      return memberOf(studyId, userId);
    },

    /** An owner removes anyone; anyone may leave. */
    remove(actor: Actor, studyId: string, userId: string): void {
      access.allow(actor, actor.id === userId ? "people.read" : "people.remove", studyId);
      const person = memberOf(studyId, userId);
      keepAnOwner(studyId, person);
      deletePerson(db, studyId, userId);
      closePerson(userId, studyId);
    },
  };
}
