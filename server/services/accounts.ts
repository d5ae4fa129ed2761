import type { Database } from "../db/client.ts";
import { type AccountRow, changeAccount, findAccount, findAccountByEmail } from "../db/queries/accounts.ts";
import {
  deleteAddressLinks,
  findAddressLink,
  insertAddressLink,
  spendAddressLink,
} from "../db/queries/address-links.ts";
import { conflict, notFound } from "../errors.ts";
import * as texts from "../mail/texts.ts";
import type { Actor } from "../policies/can.ts";
import { type Authentication, ensureAccount } from "./authentication.ts";
import type { RecordInJournal } from "./journal.ts";
import { linkTokenHash, newLinkToken } from "./link-token.ts";
import type { MailService } from "./mail.ts";

interface Collaborators {
  readonly db: Database;
  readonly auth: Authentication;
  readonly mail: Pick<MailService, "send">;
  readonly record: RecordInJournal;
  /** Where the pages are, without a slash at its end. */
  readonly url: string;
}

const LINK_LASTS_MS = 24 * 3_600_000;

export type AccountService = ReturnType<typeof createAccountService>;

/**
 * Accounts are made by whoever reads the mail of their address: there is none before its link is followed, and
 * nothing here tells someone else which addresses have one.
 */
export function createAccountService({ db, auth, mail, record, url }: Collaborators) {
  function linkTo(email: string, userId: string | null): string {
    const { token, tokenHash } = newLinkToken();
    insertAddressLink(db, { tokenHash, email, userId, expiresAt: new Date(Date.now() + LINK_LASTS_MS) });
    return `${url}${userId === null ? "/create-account/" : "/confirm-address/"}${token}`;
  }

  function linkOf(token: string) {
    const link = findAddressLink(db, linkTokenHash(token), new Date());
    if (link === undefined) throw notFound("This link has been used or has run out. Ask for another.");
    return link;
  }

  /** Of an address that is known to be the reader's own. */
  async function make(wanted: { name: string; email: string; passphrase: string }): Promise<string> {
    if (findAccountByEmail(db, wanted.email) !== undefined) {
      throw conflict(`${wanted.email} has an account already: sign in with it.`);
    }
    const id = await ensureAccount(auth, db, wanted);
    deleteAddressLinks(db, new Date(), wanted.email);
    record({ actor: { id }, action: "account made" });
    return id;
  }

  return {
    make,

    /** One message either way, and the same answer: a link for a new account, or word that there is one. */
    ask(email: string): void {
      const address = email.toLowerCase();
      const words =
        findAccountByEmail(db, address) === undefined
          ? texts.newAccount({ link: linkTo(address, null) })
          : texts.accountAlready({ signIn: `${url}/sign-in`, forgotten: `${url}/forgotten-passphrase` });
      mail.send({ to: address, ...words });
    },

    /** For an installation that nobody has signed in to yet: the link itself, for whoever runs the program. */
    firstLink: (email: string): string | undefined =>
      findAccountByEmail(db, email) === undefined ? linkTo(email.toLowerCase(), null) : undefined,

    /** Whose link it is; it stays unused. */
    addressOf: (token: string): string => linkOf(token).email,

    /** Makes the account a link was sent for. */
    async finish(token: string, wanted: { name: string; passphrase: string }): Promise<{ id: string; email: string }> {
      const { email, userId, tokenHash } = linkOf(token);
      if (userId !== null) throw notFound("This link confirms an address; it makes no account.");
      if (findAccountByEmail(db, email) !== undefined) throw conflict(`${email} has an account already: sign in.`);
      if (!spendAddressLink(db, tokenHash)) throw notFound("This link has been used. Ask for another.");
      return { id: await make({ ...wanted, email }), email };
    },

    /** Sends a link to the address the account is to have; the same answer whether another account has it. */
    askToMove(actor: Actor, email: string): void {
      const account = accountOf(actor.id);
      const address = email.toLowerCase();
      const holder = findAccountByEmail(db, address);
      const words =
        holder !== undefined && holder.id !== actor.id
          ? texts.addressTaken()
          : texts.confirmAddress({ name: account.name, link: linkTo(address, actor.id) });
      mail.send({ to: address, ...words });
    },

    /** Whoever follows the link reads the address's mail; the old address is told. */
    move(token: string): { email: string } {
      const { email, userId, tokenHash } = linkOf(token);
      if (userId === null) throw notFound("This link makes an account; it confirms no address.");
      const account = accountOf(userId);
      const holder = findAccountByEmail(db, email);
      if (holder !== undefined && holder.id !== userId) throw conflict(`${email} is another account's address by now.`);
      if (!spendAddressLink(db, tokenHash)) throw notFound("This link has been used. Ask for another.");
      changeAccount(db, userId, { email, emailVerified: true });
      if (account.email === email) return { email };
      record({ actor: { id: userId }, action: "address changed" });
      mail.send({ to: account.email, ...texts.addressChanged({ name: account.name, email }) });
      return { email };
    },

    rename(actor: Actor, name: string): AccountRow {
      changeAccount(db, actor.id, { name });
      return accountOf(actor.id);
    },

    /** An invitation was answered from the address: it is its reader's. */
    confirmed: (userId: string): void => changeAccount(db, userId, { emailVerified: true }),

    hasAccount: (email: string): boolean => findAccountByEmail(db, email) !== undefined,

    removeOldLinks: (now = new Date()): void => deleteAddressLinks(db, now),
  };

  function accountOf(userId: string): AccountRow {
    const account = findAccount(db, userId);
    if (account === undefined) throw notFound("This account is no longer there.");
    return account;
  }
}
