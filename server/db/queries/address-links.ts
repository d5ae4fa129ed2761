import { and, eq, gt, isNull, lte, or } from "drizzle-orm";
import type { Database } from "../client.ts";
import { addressLinks } from "../schema/invitations.ts";

export type AddressLinkRow = typeof addressLinks.$inferSelect;

/** The link takes the place of any earlier one for the same end. */
export function insertAddressLink(db: Database, row: AddressLinkRow): void {
  db.transaction((tx) => {
    const same =
      row.userId === null
        ? and(eq(addressLinks.email, row.email), isNull(addressLinks.userId))
        : eq(addressLinks.userId, row.userId);
    tx.delete(addressLinks).where(same).run();
    tx.insert(addressLinks).values(row).run();
  });
}

/** Only one that has not run out. */
export function findAddressLink(db: Database, tokenHash: string, now: Date): AddressLinkRow | undefined {
  return db
    .select()
    .from(addressLinks)
    .where(and(eq(addressLinks.tokenHash, tokenHash), gt(addressLinks.expiresAt, now)))
    .get();
}

/** True for the one caller that used it. */
export function spendAddressLink(db: Database, tokenHash: string): boolean {
  return db.delete(addressLinks).where(eq(addressLinks.tokenHash, tokenHash)).run().changes === 1;
}

/** Those that have run out, and with an address those for it. */
export function deleteAddressLinks(db: Database, now: Date, email?: string): void {
  const outrun = lte(addressLinks.expiresAt, now);
  db.delete(addressLinks)
    .where(email === undefined ? outrun : or(outrun, eq(addressLinks.email, email)))
    .run();
}
