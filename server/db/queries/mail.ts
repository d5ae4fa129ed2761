import { and, asc, count, desc, eq, inArray, lt, lte, ne } from "drizzle-orm";
import type { Database } from "../client.ts";
import { mails } from "../schema/mail.ts";

export type MailRow = typeof mails.$inferSelect;

export function insertMail(db: Database, row: typeof mails.$inferInsert): void {
  db.insert(mails).values(row).run();
}

export function findMail(db: Database, id: string): MailRow | undefined {
  return db.select().from(mails).where(eq(mails.id, id)).get();
}

export function changeMail(db: Database, id: string, change: Partial<Omit<MailRow, "id">>): void {
  db.update(mails).set(change).where(eq(mails.id, id)).run();
}

/** The message that has waited longest of those whose time has come. */
export function nextMail(db: Database, now: Date): MailRow | undefined {
  return db
    .select()
    .from(mails)
    .where(and(eq(mails.state, "waiting"), lte(mails.nextAt, now)))
    .orderBy(asc(mails.nextAt), asc(mails.writtenAt))
    .limit(1)
    .get();
}

/** When the next message is to be tried. */
export function nextMailAt(db: Database): Date | undefined {
  const next = db
    .select({ at: mails.nextAt })
    .from(mails)
    .where(eq(mails.state, "waiting"))
    .orderBy(asc(mails.nextAt))
    .limit(1)
    .get();
  return next?.at ?? undefined;
}

/** Newest first. */
export function newestMails(db: Database, most: number): MailRow[] {
  return db.select().from(mails).orderBy(desc(mails.writtenAt), desc(mails.id)).limit(most).all();
}

/** Settled messages from before a time, and the oldest of those that are more than `most`. */
export function deleteOldMails(db: Database, before: Date, most: number): void {
  db.delete(mails)
    .where(and(ne(mails.state, "waiting"), lt(mails.writtenAt, before)))
    .run();
  const settled = db.select({ mails: count() }).from(mails).where(ne(mails.state, "waiting")).get()?.mails ?? 0;
  if (settled <= most) return;
  const oldest = db
    .select({ id: mails.id })
    .from(mails)
    .where(ne(mails.state, "waiting"))
    .orderBy(asc(mails.writtenAt))
    .limit(settled - most);
  db.delete(mails).where(inArray(mails.id, oldest)).run();
}
