import type { HistoryQuery } from "../../shared/schemas/history.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { Database } from "../db/client.ts";
import { type LastEdit, lastEdits, namesOf, type SittingRow, sittingsOf } from "../db/queries/sittings.ts";
import type { Actor } from "../policies/can.ts";
import type { Access } from "./access.ts";
import type { SourcesOf } from "./ports.ts";

/** What was done to a cell in one sitting, with the cell as it was left. */
export interface SittingView extends SittingRow {
  readonly after: CellSource | undefined;
}

export interface HistoryView {
  readonly sittings: readonly SittingView[];
  /** Where the page after this one begins; none when this is the last. */
  readonly next: number | undefined;
  readonly names: ReadonlyMap<string, string>;
}

export interface LatestEditView extends LastEdit {
  readonly cell: CellSource;
  readonly byName: string | undefined;
}

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly sourcesOf: SourcesOf;
}

const MOST_ON_A_PAGE = 40;
/** Sources of a page together, in characters; one sitting is always shown. */
const LONGEST_PAGE = 1_000_000;

export type HistoryService = ReturnType<typeof createHistoryService>;

export function createHistoryService({ db, access, sourcesOf }: Collaborators) {
  return {
    /** Who edited each cell of the study last, in their order; a cell from before the history was kept is left out. */
    async latest(actor: Actor, studyId: string): Promise<LatestEditView[]> {
      access.allow(actor, "history.read", studyId);
      const edits = lastEdits(db, studyId);
      const names = namesOf(db, [...new Set([...edits.values()].flatMap(({ by }) => by ?? []))]);
      return (await sourcesOf(studyId)).flatMap((cell) => {
        const edit = edits.get(cell.id);
        return edit === undefined ? [] : [{ ...edit, cell, byName: edit.by && names.get(edit.by) }];
      });
    },

    /** A page of who edited which cell, the newest first. Nothing is computed here: what differs is told where it is read. */
    async read(actor: Actor, studyId: string, { cell, person, before }: HistoryQuery): Promise<HistoryView> {
      access.allow(actor, "history.read", studyId);
      const now = new Map((await sourcesOf(studyId)).map((one) => [one.id, one]));
      const rows = sittingsOf(db, studyId, { cellId: cell, userId: person, before, most: MOST_ON_A_PAGE + 1 });
      const sittings: SittingView[] = [];
      let length = 0;
      for (const { next, ...row } of rows.slice(0, MOST_ON_A_PAGE)) {
        const view = { ...row, after: next === undefined ? now.get(row.cellId) : next.before };
        length += (view.before?.source.length ?? 0) + (view.after?.source.length ?? 0);
        if (sittings.length > 0 && length > LONGEST_PAGE) break;
        sittings.push(view);
      }
      const people = new Set(sittings.flatMap((sitting) => sitting.people));
      return {
        sittings,
        next: sittings.length < rows.length ? sittings.at(-1)?.id : undefined,
        names: namesOf(db, [...people]),
      };
    },
  };
}
