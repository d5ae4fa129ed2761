import { randomUUID } from "node:crypto";
import type { Role } from "../../shared/schemas/resources.ts";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import type { Database } from "../db/client.ts";
import { insertPerson, type PersonRow, peopleOf } from "../db/queries/people.ts";
import { refereeCopiesOf } from "../db/queries/referee-copies.ts";
import { changeStudy, deleteStudy, findStudy, insertStudy, type StudyRow, studiesOf } from "../db/queries/studies.ts";
import type { Actor } from "../policies/can.ts";
import { type Access, noSuchStudy } from "./access.ts";
import type { Cells, ClosePerson } from "./ports.ts";

/** A study as the list of studies and its own page show it. */
export interface StudyView {
  readonly study: StudyRow;
  readonly role: Role;
  readonly people: readonly PersonRow[];
  readonly cells: StudyStatus["cells"];
  /** When the newest referee copy that is not revoked was sealed. */
  readonly sealedAt: Date | undefined;
}

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly cells: Pick<Cells, "status" | "removed">;
  readonly closePerson: ClosePerson;
}

export type StudyService = ReturnType<typeof createStudyService>;

export function createStudyService({ db, access, cells, closePerson }: Collaborators) {
  async function view(study: StudyRow, role: Role): Promise<StudyView> {
    const copies = refereeCopiesOf(db, study.id).filter((copy) => copy.revokedAt === null);
    const status = await cells.status(study.id);
    return { study, role, people: peopleOf(db, study.id), cells: status.cells, sealedAt: copies[0]?.sealedAt };
  }

  return {
    /** The actor's studies, the one changed last first. */
    list: (actor: Actor): Promise<StudyView[]> =>
      Promise.all(studiesOf(db, actor.id).map(({ study, role }) => view(study, role))),

    async read(actor: Actor, studyId: string): Promise<StudyView> {
      const role = access.allow(actor, "study.read", studyId);
      const study = findStudy(db, studyId);
      if (study === undefined) throw noSuchStudy();
      return view(study, role);
    },

    create(actor: Actor, wanted: { title: string; lede: string }): Promise<StudyView> {
      const now = new Date();
      const study: StudyRow = { id: randomUUID(), ...wanted, createdAt: now, changedAt: now, deletedAt: null };
      db.transaction((tx) => {
        insertStudy(tx, study);
        insertPerson(tx, study.id, actor.id, "owner", now);
      });
      return view(study, "owner");
    },

    change(actor: Actor, studyId: string, change: { title?: string; lede?: string }): Promise<StudyView> {
      access.allow(actor, "study.change", studyId);
      changeStudy(db, studyId, { ...change, changedAt: new Date() });
      return this.read(actor, studyId);
    },

    /** With its document, uploads, findings and referee copies; estimations stop, everyone's sockets are closed. */
    delete(actor: Actor, studyId: string): void {
      access.allow(actor, "study.delete", studyId);
      const people = peopleOf(db, studyId);
      deleteStudy(db, studyId);
      cells.removed(studyId);
      for (const person of people) closePerson(person.id, studyId);
    },

    /** Its document was edited. */
    touched(studyId: string): void {
      changeStudy(db, studyId, { changedAt: new Date() });
    },
  };
}
