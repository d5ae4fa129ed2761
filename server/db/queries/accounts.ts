import { and, count, eq, inArray } from "drizzle-orm";
import type { Database } from "../client.ts";
import { account, session, user } from "../schema/auth.ts";

export type AccountRow = typeof user.$inferSelect;

export function findAccountByEmail(db: Database, email: string): AccountRow | undefined {
  return db.select().from(user).where(eq(user.email, email.toLowerCase())).get();
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
