import { and, desc, eq, inArray, like, lt, sql } from "drizzle-orm";
import type { CellEdit } from "../../../shared/study/cell-edit.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { cellSittings } from "../schema/history.ts";

type Row = typeof cellSittings.$inferSelect;

export interface SittingRow {
  readonly id: number;
  readonly cellId: string;
  /** Accounts; empty when the program wrote. */
  readonly people: readonly string[];
  readonly startedAt: Date;
  readonly endedAt: Date;
  readonly before: CellSource | undefined;
}

/** A pause longer than this ends a sitting. */
const PAUSE_MS = 5 * 60_000;
/** However long someone writes without a pause: what stood there every half hour can be looked at. */
const LONGEST_MS = 30 * 60_000;
/** Two who write in one cell within this of one another sit together: who wrote which letter can no longer be parted. */
const TOGETHER_MS = 60_000;

/** Writes down who edited which cell; edits of one sitting are one row. */
export function noteEdits(
  db: Database,
  studyId: string,
  edits: readonly CellEdit[],
  userId: string | null,
  at: Date,
): void {
  for (const edit of edits) noteEdit(db, studyId, edit, userId, at);
}

function noteEdit(db: Database, studyId: string, edit: CellEdit, userId: string | null, at: Date): void {
  // Adding and removing begin anew: what stood there before them would otherwise be told of nowhere.
  const isWhole = edit.before === undefined || edit.after === undefined;
  const [last, earlier] = isWhole ? [] : lastTwo(db, studyId, edit.cellId);
  const people = last && peopleGoingOn(last, earlier, userId, at);
  if (last && people) {
    db.update(cellSittings)
      .set({ endedAt: at, people: JSON.stringify(people) })
      .where(eq(cellSittings.id, last.id))
      .run();
    return;
  }
  db.insert(cellSittings)
    .values({
      studyId,
      cellId: edit.cellId,
      people: JSON.stringify(userId === null ? [] : [userId]),
      startedAt: at,
      endedAt: at,
      before: edit.before === undefined ? null : JSON.stringify(edit.before),
    })
    .run();
}

function lastTwo(db: Database, studyId: string, cellId: string): SittingRow[] {
  return db
    .select()
    .from(cellSittings)
    .where(and(eq(cellSittings.studyId, studyId), eq(cellSittings.cellId, cellId)))
    .orderBy(desc(cellSittings.id))
    .limit(2)
    .all()
    .map(asSitting);
}

/** Who sits in the last sitting if this edit belongs to it; undefined when the edit begins another. */
function peopleGoingOn(
  last: SittingRow,
  earlier: SittingRow | undefined,
  userId: string | null,
  at: Date,
): readonly string[] | undefined {
  const since = (then: Date) => at.getTime() - then.getTime();
  if (since(last.startedAt) > LONGEST_MS) return undefined;
  if (sits(last, userId)) return since(last.endedAt) < PAUSE_MS ? last.people : undefined;
  const isInTurn =
    userId !== null &&
    last.people.length > 0 &&
    earlier !== undefined &&
    sits(earlier, userId) &&
    since(earlier.endedAt) < TOGETHER_MS &&
    since(last.endedAt) < TOGETHER_MS;
  return isInTurn ? [...last.people, userId] : undefined;
}

const sits = ({ people }: SittingRow, userId: string | null) =>
  userId === null ? people.length === 0 : people.includes(userId);

export interface WhichSittings {
  readonly cellId?: string;
  readonly userId?: string;
  /** Only sittings begun before this one. */
  readonly before?: number;
  readonly most: number;
}

export interface SittingAndNext extends SittingRow {
  /** The sitting of the same cell that came after; without one the cell is as this one left it. */
  readonly next: { readonly before: CellSource | undefined } | undefined;
}

/** A study's sittings, the newest first. */
export function sittingsOf(db: Database, studyId: string, which: WhichSittings): SittingAndNext[] {
  const rows = db
    .select()
    .from(cellSittings)
    .where(
      and(
        eq(cellSittings.studyId, studyId),
        which.cellId === undefined ? undefined : eq(cellSittings.cellId, which.cellId),
        which.before === undefined ? undefined : lt(cellSittings.id, which.before),
        which.userId === undefined ? undefined : like(cellSittings.people, `%${JSON.stringify(which.userId)}%`),
      ),
    )
    .orderBy(desc(cellSittings.id))
    .limit(which.most)
    .all();
  return rows.map((row) => ({ ...asSitting(row), next: nextOf(db, row) }));
}

function nextOf(db: Database, row: Row): SittingAndNext["next"] {
  const next = db
    .select({ before: cellSittings.before })
    .from(cellSittings)
    .where(
      and(
        eq(cellSittings.studyId, row.studyId),
        eq(cellSittings.cellId, row.cellId),
        sql`${cellSittings.id} > ${row.id}`,
      ),
    )
    .orderBy(cellSittings.id)
    .limit(1)
    .get();
  return next && { before: cellIn(next.before) };
}

export interface LastEdit {
  /** None when the program wrote. */
  readonly by: string | undefined;
  readonly at: Date;
}

/** By cell id: who edited it last, and when. */
export function lastEdits(db: Database, studyId: string): Map<string, LastEdit> {
  const newest = db
    .select({ id: sql<number>`max(${cellSittings.id})` })
    .from(cellSittings)
    .where(eq(cellSittings.studyId, studyId))
    .groupBy(cellSittings.cellId);
  const rows = db.select().from(cellSittings).where(inArray(cellSittings.id, newest)).all();
  return new Map(rows.map((row) => [row.cellId, { by: peopleIn(row).at(-1), at: row.endedAt }]));
}

/** Names of accounts, those that are gone left out. */
export function namesOf(db: Database, userIds: readonly string[]): Map<string, string> {
  if (userIds.length === 0) return new Map();
  const rows = db
    .select({ id: user.id, name: user.name })
    .from(user)
    .where(inArray(user.id, [...userIds]))
    .all();
  return new Map(rows.map(({ id, name }) => [id, name]));
}

const peopleIn = ({ people }: Pick<Row, "people">) => JSON.parse(people) as string[];
const cellIn = (text: string | null) => (text === null ? undefined : (JSON.parse(text) as CellSource));

function asSitting(row: Row): SittingRow {
  const { id, cellId, startedAt, endedAt } = row;
  return { id, cellId, people: peopleIn(row), startedAt, endedAt, before: cellIn(row.before) };
}
