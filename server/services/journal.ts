import { type JournalAction, OWNERS_ACTIONS } from "../../shared/schemas/journal.ts";
import type { Database } from "../db/client.ts";
import { insertJournalRow, type JournalRow, journalOf } from "../db/queries/journal.ts";
import { type Actor, can } from "../policies/can.ts";
import type { Access } from "./access.ts";

export type { JournalRow };

export interface JournalNote {
  /** Left out where it concerns the installation and no study. */
  readonly studyId?: string;
  /** Left out where the program itself did it. */
  readonly actor?: Actor;
  readonly action: JournalAction;
  /** What or whom it was done to, as a person would name it: a name, an address, a file. */
  readonly subject?: string;
}

/** Writes one line of the journal: what was done by whom, now. */
export type RecordInJournal = (note: JournalNote) => void;

const PAGE = 50;
const LONGEST_SUBJECT = 300;

export type JournalService = ReturnType<typeof createJournalService>;

/** What was done by whom: added to, never changed. */
export function createJournalService({ db, access }: { readonly db: Database; readonly access: Access }) {
  function page(studyId: string | undefined, before: number | undefined, without: readonly JournalAction[]) {
    const rows = journalOf(db, studyId, { before, most: PAGE + 1, without });
    const entries = rows.slice(0, PAGE);
    return { entries, next: rows.length > PAGE ? entries.at(-1)?.id : undefined };
  }

  const record: RecordInJournal = ({ studyId, actor, action, subject }) =>
    insertJournalRow(db, {
      at: new Date(),
      studyId: studyId ?? null,
      actorId: actor?.id ?? null,
      action,
      subject: subject?.slice(0, LONGEST_SUBJECT) ?? null,
    });

  return {
    record,

    /** Newest first; owners are told of invitations and referee copies too. */
    list(actor: Actor, studyId: string, before: number | undefined) {
      const role = access.allow(actor, "journal.read", studyId);
      const all = can(actor, "journal.read all", { roleOf: () => role });
      return page(studyId, before, all ? [] : OWNERS_ACTIONS);
    },

    /** What concerns the installation; whoever asks has been let through as its administrator. */
    ofInstallation: (before: number | undefined) => page(undefined, before, []),
  };
}
