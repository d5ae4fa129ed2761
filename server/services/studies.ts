import { randomUUID } from "node:crypto";
import type { Role } from "../../shared/schemas/resources.ts";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import type { Database } from "../db/client.ts";
import { deleteJournalOf } from "../db/queries/journal.ts";
import { insertPerson, type PersonRow, peopleOf, putAway } from "../db/queries/people.ts";
import { refereeCopiesOf } from "../db/queries/referee-copies.ts";
import {
  type Belonging,
  changeStudy,
  deletedStudiesOf,
  deleteStudy,
  insertStudy,
  type StudyRow,
  studiesDeletedBefore,
  studiesOf,
} from "../db/queries/studies.ts";
import type { Actor } from "../policies/can.ts";
import { type Access, noSuchStudy } from "./access.ts";
import type { RecordInJournal } from "./journal.ts";
import type { Cells, ClosePerson } from "./ports.ts";

/** A study as the list of studies and its own page show it. */
export interface StudyView {
  readonly study: StudyRow;
  readonly role: Role;
  readonly people: readonly PersonRow[];
  readonly cells: StudyStatus["cells"];
  /** When the newest referee copy that is not revoked was sealed. */
  readonly sealedAt: Date | undefined;
  /** Put away by whoever looks: out of the way in their own list, and in no one else's. */
  readonly isPutAway: boolean;
}

export interface DeletedStudy {
  readonly study: StudyRow;
  readonly deletedAt: Date;
  /** When it goes for good. */
  readonly purgedAt: Date;
}

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly cells: Pick<Cells, "status" | "removed" | "changed">;
  readonly closePerson: ClosePerson;
  readonly record: RecordInJournal;
}

/** How long a deleted study can be brought back. */
export const GRACE_DAYS = 30;
const GRACE_MS = GRACE_DAYS * 24 * 3_600_000;

export type StudyService = ReturnType<typeof createStudyService>;

export function createStudyService({ db, access, cells, closePerson, record }: Collaborators) {
  async function view({ study, role, putAwayAt }: Belonging): Promise<StudyView> {
    const copies = refereeCopiesOf(db, study.id).filter((copy) => copy.revokedAt === null);
    const status = await cells.status(study.id);
    return {
      study,
      role,
      people: peopleOf(db, study.id),
      cells: status.cells,
      sealedAt: copies[0]?.sealedAt,
      isPutAway: putAwayAt !== null,
    };
  }

  /** With its document, uploads, findings, remarks, referee copies and journal. */
  function purge(studyId: string, actor?: Actor): void {
    deleteStudy(db, studyId);
    deleteJournalOf(db, studyId);
    cells.removed(studyId);
    record({ ...(actor && { actor }), action: "study deleted for good" });
  }

  return {
    /** The actor's studies, the one changed last first, those they have put away among them. */
    list: (actor: Actor): Promise<StudyView[]> => Promise.all(studiesOf(db, actor.id).map(view)),

    async read(actor: Actor, studyId: string): Promise<StudyView> {
      access.allow(actor, "study.read", studyId);
      const found = studiesOf(db, actor.id).find(({ study }) => study.id === studyId);
      if (found === undefined) throw noSuchStudy();
      return view(found);
    },

    create(actor: Actor, wanted: { title: string; lede: string }): Promise<StudyView> {
      const now = new Date();
      const study: StudyRow = { id: randomUUID(), ...wanted, createdAt: now, changedAt: now, deletedAt: null };
      db.transaction((tx) => {
        insertStudy(tx, study);
        insertPerson(tx, study.id, actor.id, "owner", now);
      });
      record({ studyId: study.id, actor, action: "study made" });
      return view({ study, role: "owner", putAwayAt: null });
    },

    change(actor: Actor, studyId: string, change: { title?: string; lede?: string }): Promise<StudyView> {
      access.allow(actor, "study.change", studyId);
      changeStudy(db, studyId, { ...change, changedAt: new Date() });
      return this.read(actor, studyId);
    },

    /** Each person's own doing: what one has done with is not done with for the others. */
    putAway(actor: Actor, studyId: string, away: boolean): void {
      access.allow(actor, "study.put away", studyId);
      putAway(db, studyId, actor.id, away ? new Date() : null);
    },

    /**
     * Gone for everyone at once, its referee copies with it; its owners can bring all of it back until the grace
     * period is over. Estimations stop, everyone's sockets are closed.
     */
    delete(actor: Actor, studyId: string): void {
      access.allow(actor, "study.delete", studyId);
      const people = peopleOf(db, studyId);
      changeStudy(db, studyId, { deletedAt: new Date() });
      record({ studyId, actor, action: "study deleted" });
      cells.removed(studyId);
      for (const person of people) closePerson(person.id, studyId);
    },

    listDeleted: (actor: Actor): DeletedStudy[] =>
      deletedStudiesOf(db, actor.id).flatMap((study) => {
        const { deletedAt } = study;
        return deletedAt === null ? [] : [{ study, deletedAt, purgedAt: new Date(deletedAt.getTime() + GRACE_MS) }];
      }),

    bringBack(actor: Actor, studyId: string): void {
      access.allowDeleted(actor, "study.bring back", studyId);
      changeStudy(db, studyId, { deletedAt: null });
      record({ studyId, actor, action: "study brought back" });
      cells.changed(studyId);
    },

    /** Households' data may have to go before the grace period is over. */
    deleteForGood(actor: Actor, studyId: string): void {
      access.allowDeleted(actor, "study.purge", studyId);
      purge(studyId, actor);
    },

    purge,

    /** Studies whose grace period is over. Returns how many there were. */
    purgeDeleted(now = new Date()): number {
      const gone = studiesDeletedBefore(db, new Date(now.getTime() - GRACE_MS));
      for (const studyId of gone) purge(studyId);
      return gone.length;
    },

    /** Its document was edited. */
    touched(studyId: string): void {
      changeStudy(db, studyId, { changedAt: new Date() });
    },
  };
}
