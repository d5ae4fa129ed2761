import type { JournalAction, JournalEntry, JournalPage } from "../../shared/schemas/journal.ts";
import type { JournalRow } from "../services/journal.ts";

export function presentJournal(page: { entries: readonly JournalRow[]; next: number | undefined }): JournalPage {
  return { entries: page.entries.map(presentEntry), ...(page.next !== undefined && { next: page.next }) };
}

function presentEntry({ id, at, actorId, actorName, action, subject }: JournalRow): JournalEntry {
  return {
    id,
    at: at.toISOString(),
    ...(actorId !== null && { by: actorName ?? "someone no longer here" }),
    action: action as JournalAction,
    ...(subject !== null && { subject }),
  };
}
