import { and, asc, count, desc, eq, inArray } from "drizzle-orm";
import type { Database } from "../client.ts";
import { account, session, user, verification } from "../schema/auth.ts";
import { studyMembers } from "../schema/studies.ts";

export type AccountRow = typeof user.$inferSelect;

export function findAccountByEmail(db: Database, email: string): AccountRow | undefined {
  return db.select().from(user).where(eq(user.email, email.toLowerCase())).get();
}

export function findAccount(db: Database, userId: string): AccountRow | undefined {
  return db.select().from(user).where(eq(user.id, userId)).get();
}

export function changeAccount(
  db: Database,
  userId: string,
  change: Partial<Pick<AccountRow, "name" | "email" | "emailVerified">>,
): void {
  db.update(user)
    .set({ ...change, updatedAt: new Date() })
    .where(eq(user.id, userId))
    .run();
}

/** Every account with how many studies it is in, the newest first. */
export function listAccounts(db: Database, most: number): { account: AccountRow; studies: number }[] {
  return db
    .select({ account: user, studies: count(studyMembers.studyId) })
    .from(user)
    .leftJoin(studyMembers, eq(studyMembers.userId, user.id))
    .groupBy(user.id)
    .orderBy(desc(user.createdAt), asc(user.name))
    .limit(most)
    .all();
}

export function countAccounts(db: Database): number {
  return db.select({ accounts: count() }).from(user).get()?.accounts ?? 0;
}

/** Whether anyone can sign in under the address. */
export function hasPassphrase(db: Database, email: string): boolean {
  const found = db
    .select({ id: account.id })
    .from(account)
    .innerJoin(user, eq(user.id, account.userId))
    .where(and(eq(user.email, email), eq(account.providerId, "credential")))
    .get();
  return found !== undefined;
}

/** Links by which the account's passphrase could still be set anew: their value is its id. */
export function dropResetLinks(db: Database, userId: string): void {
  db.delete(verification).where(eq(verification.value, userId)).run();
}

/** Takes the passphrases and open sessions of these addresses away; the accounts and their studies stay. */
export function closeAccounts(db: Database, emails: readonly string[]): void {
  const ids = db.select({ id: user.id }).from(user).where(inArray(user.email, emails));
  db.transaction((tx) => {
    tx.delete(session).where(inArray(session.userId, ids)).run();
    tx.delete(account)
      .where(and(eq(account.providerId, "credential"), inArray(account.userId, ids)))
      .run();
  });
}
