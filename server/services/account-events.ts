import type { Database } from "../db/client.ts";
import { type AccountRow, dropResetLinks } from "../db/queries/accounts.ts";
import * as texts from "../mail/texts.ts";
import type { RecordInJournal } from "./journal.ts";
import type { MailService } from "./mail.ts";

interface Collaborators {
  readonly db: Database;
  readonly mail: Pick<MailService, "send">;
  readonly record: RecordInJournal;
  readonly url: string;
}

type Person = Pick<AccountRow, "id" | "name" | "email">;

export type AccountEvents = ReturnType<typeof createAccountEvents>;

/** What follows when something happens to an account: messages, a line in the journal. */
export function createAccountEvents({ db, mail, record, url }: Collaborators) {
  const forgotten = `${url}/forgotten-passphrase`;
  return {
    resetAsked({ name, email }: Person, token: string): void {
      mail.send({ to: email, ...texts.passphraseReset({ name, link: `${url}/reset-passphrase/${token}` }) });
    },

    /** By a link; every session has ended, and other links that were sent open nothing any more. */
    passphraseReset({ id, name, email }: Person): void {
      dropResetLinks(db, id);
      record({ actor: { id }, action: "passphrase reset" });
      mail.send({ to: email, ...texts.passphraseChanged({ name, forgotten }) });
    },

    /** By someone who knew the old one. */
    passphraseChanged({ id, name, email }: Person): void {
      dropResetLinks(db, id);
      mail.send({ to: email, ...texts.passphraseChanged({ name, forgotten }) });
    },

    /** So many wrong passphrases that an address has to wait; whose it is, is told only by its first letter. */
    locked(email: string): void {
      record({ action: "sign-in locked", subject: email.replace(/^(.).*@/, "$1…@") });
    },
  };
}
