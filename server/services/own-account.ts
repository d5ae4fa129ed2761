import { listWords } from "../../shared/study/words.ts";
import type { Database } from "../db/client.ts";
import { type AccountRow, findAccount } from "../db/queries/accounts.ts";
import { type Holding, holdingsOf } from "../db/queries/holdings.ts";
import { type OwnRows, rowsAbout } from "../db/queries/own-data.ts";
import { type SessionRow, sessionsOf } from "../db/queries/sessions.ts";
import { conflict, forbidden, notFound } from "../errors.ts";
import type { Actor } from "../policies/can.ts";
import type { Authentication } from "./authentication.ts";
import type { RecordInJournal } from "./journal.ts";

export type { Holding, SessionRow };

interface Collaborators {
  readonly db: Database;
  readonly auth: Authentication;
  readonly record: RecordInJournal;
  /** With everything in it, and at once. */
  readonly purgeStudy: (studyId: string) => void;
}

/** What a person sees of their own account. */
export interface OwnAccount {
  readonly account: AccountRow;
  readonly sessions: readonly SessionRow[];
  /** Studies that have to be handed over before the account can go. */
  readonly toHandOver: readonly Holding[];
  /** Studies that nobody else is in, which go with the account. */
  readonly alone: readonly Holding[];
}

/** Everything that is kept about a person. */
export interface KeptOfPerson extends Pick<OwnAccount, "account" | "sessions"> {
  readonly rows: OwnRows;
}

export type OwnAccountService = ReturnType<typeof createOwnAccountService>;

/** Sessions end through the authentication package, which tells the sockets. */
export function createOwnAccountService({ db, auth, record, purgeStudy }: Collaborators) {
  function read(actor: Actor): OwnAccount {
    const account = findAccount(db, actor.id);
    if (account === undefined) throw notFound("This account is no longer there.");
    const holdings = holdingsOf(db, actor.id);
    return {
      account,
      sessions: sessionsOf(db, actor.id, new Date()),
      toHandOver: holdings.filter(({ others, deleted }) => others > 0 && !deleted),
      alone: holdings.filter(({ others, deleted }) => others === 0 || deleted),
    };
  }

  async function endSessions(sessions: readonly SessionRow[]): Promise<void> {
    const { internalAdapter } = await auth.$context;
    await internalAdapter.deleteSessions(sessions.map(({ token }) => token));
  }

  async function isPassphrase(userId: string, passphrase: string): Promise<boolean> {
    const { internalAdapter, password } = await auth.$context;
    const credential = (await internalAdapter.findAccounts(userId)).find(
      ({ providerId }) => providerId === "credential",
    );
    return credential?.password != null && (await password.verify({ hash: credential.password, password: passphrase }));
  }

  return {
    read,

    /** For whoever it is about, and nobody else. */
    everything(actor: Actor): KeptOfPerson {
      const { account, sessions } = read(actor);
      return { account, sessions, rows: rowsAbout(db, account) };
    },

    async endSession(actor: Actor, sessionId: string): Promise<void> {
      const found = sessionsOf(db, actor.id, new Date()).find(({ id }) => id === sessionId);
      if (found === undefined) throw notFound("This session has ended already.");
      await endSessions([found]);
    },

    /** Every session but the one that asks. */
    async endOtherSessions(actor: Actor, sessionId: string): Promise<void> {
      await endSessions(sessionsOf(db, actor.id, new Date()).filter(({ id }) => id !== sessionId));
    },

    /** Refused while a study with other people in it would be left without an owner; studies of one's own go too. */
    async remove(actor: Actor, passphrase: string): Promise<void> {
      if (!(await isPassphrase(actor.id, passphrase))) throw forbidden("This is not the account's passphrase.");
      const { toHandOver, alone } = read(actor);
      if (toHandOver.length > 0) {
        const titles = listWords(toHandOver.map(({ title }) => title));
        throw conflict(
          `You alone own ${titles}, and others are in ${toHandOver.length === 1 ? "it" : "them"}: hand over first.`,
        );
      }
      for (const { studyId } of alone) purgeStudy(studyId);
      const { internalAdapter } = await auth.$context;
      await internalAdapter.deleteUser(actor.id);
      record({ action: "account deleted" });
    },
  };
}
