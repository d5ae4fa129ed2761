import type { Database } from "../db/client.ts";
import { type AccountRow, listAccounts } from "../db/queries/accounts.ts";
import { forbidden } from "../errors.ts";
import { type AdministrationAction, canAdminister } from "../policies/can.ts";
import type { JournalService } from "./journal.ts";
import type { MailService } from "./mail.ts";

export interface AccountView {
  readonly account: AccountRow;
  readonly studies: number;
}

/** As much of an account as tells whether it administers. */
export interface Administrator {
  readonly email: string;
  readonly emailVerified: boolean;
}

interface Collaborators {
  readonly db: Database;
  readonly mail: MailService;
  readonly journal: JournalService;
  /** Addresses, in small letters. */
  readonly administrators: () => readonly string[];
}

const MOST_ACCOUNTS = 1000;

export type AdministrationService = ReturnType<typeof createAdministrationService>;

/** For whoever administers the installation: its messages, its accounts, its journal. No study is opened by it. */
export function createAdministrationService({ db, mail, journal, administrators }: Collaborators) {
  /** Named by the configuration, under an address that is known to be theirs. */
  const isAdministrator = ({ email, emailVerified }: Administrator) =>
    emailVerified && administrators().includes(email.toLowerCase());

  function allow(who: Administrator, action: AdministrationAction): void {
    if (canAdminister({ isAdministrator: isAdministrator(who) }, action)) return;
    throw forbidden("This takes an administrator of the installation.");
  }

  return {
    isAdministrator,

    mails(who: Administrator) {
      allow(who, "mail.read");
      return { kind: mail.kind, mails: mail.list() };
    },

    tryAgain(who: Administrator, mailId: string) {
      allow(who, "mail.try again");
      return mail.tryAgain(mailId);
    },

    accounts(who: Administrator): AccountView[] {
      allow(who, "account.read");
      return listAccounts(db, MOST_ACCOUNTS);
    },

    journal(who: Administrator, before: number | undefined) {
      allow(who, "installation journal.read");
      return journal.ofInstallation(before);
    },
  };
}
