import type { Installation } from "../../shared/schemas/resources.ts";
import type { Database } from "../db/client.ts";
import { closeAccounts, countAccounts, hasPassphrase } from "../db/queries/accounts.ts";
import { type Authentication, ensureAccount } from "../services/authentication.ts";
import { DEMO_PASSPHRASE, DEMO_PEOPLE } from "./people.ts";

/**
 * Whether this installation is a demo: as the environment says, else when it is new or was one when it last ran.
 * Accounts once closed stay closed until the environment opens them by name.
 */
export function isDemo(db: Database, wanted: boolean | undefined): boolean {
  return wanted ?? (countAccounts(db) === 0 || hasPassphrase(db, DEMO_PEOPLE[0].email));
}

/** Who owns the demo study administers the demo, and reads its post box. */
export const DEMO_ADMINISTRATOR: string = DEMO_PEOPLE[0].email;

/** Their ids, in the order of `DEMO_PEOPLE`. */
export async function openDemoAccounts(auth: Authentication, db: Database): Promise<string[]> {
  const ids: string[] = [];
  for (const { name, email } of DEMO_PEOPLE) {
    ids.push(await ensureAccount(auth, db, { name, email, passphrase: DEMO_PASSPHRASE }));
  }
  return ids;
}

/** Everyone knows the passphrase of these accounts: outside demo mode none of them opens. */
export function closeDemoAccounts(db: Database): void {
  closeAccounts(
    db,
    DEMO_PEOPLE.map(({ email }) => email),
  );
}

export function demoSignIns(): Installation["demo"] {
  return DEMO_PEOPLE.map(({ email, role }) => ({ email, passphrase: DEMO_PASSPHRASE, role }));
}
