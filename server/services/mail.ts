import { randomUUID } from "node:crypto";
import type { Database } from "../db/client.ts";
import {
  changeMail,
  deleteOldMails,
  findMail,
  insertMail,
  type MailRow,
  newestMails,
  nextMail,
  nextMailAt,
} from "../db/queries/mail.ts";
import { conflict, invalid, notFound } from "../errors.ts";
import { type Mail, type Mailer, MailFault } from "../mail/mailer.ts";
import { sealedWords } from "../mail/sealed-words.ts";

interface Collaborators {
  readonly db: Database;
  readonly mailer: Mailer;
  /** The installation's; words that wait are sealed under it. */
  readonly secret: string;
  readonly report: (error: unknown) => void;
}

export type { Mail };

/** A message as an administrator sees it; its words only where the local post box keeps them. */
export interface MailView extends Omit<MailRow, "words"> {
  readonly text: string | undefined;
}

const MINUTE = 60_000;
/** After how long a message that was not taken is tried again; after the last it is given up. */
const PAUSES = [1, 5, 15, 60, 240, 720].map((minutes) => minutes * MINUTE);
const KEPT_FOR = 30 * 24 * 60 * MINUTE;
const MOST_KEPT = 2000;
const MOST_SHOWN = 200;
const LONGEST_TEXT = 20_000;
const LONGEST_SUBJECT = 250;

export type MailService = ReturnType<typeof createMailService>;

/**
 * Messages on their way. `send` writes one down and returns: no request waits for a mail server. They leave one after
 * the other, and one that is not taken is tried again, over about seventeen hours.
 */
export function createMailService({ db, mailer, secret, report }: Collaborators) {
  const sealed = sealedWords(secret);
  let timer: ReturnType<typeof setTimeout> | undefined;
  let round: Promise<void> | undefined;
  let stopped = false;

  async function deliver(row: MailRow): Promise<void> {
    const text = row.words === null ? undefined : sealed.open(row.words);
    const settled = { settledAt: new Date(), nextAt: null };
    if (text === undefined) {
      const fault = "The installation's secret has changed since it was written.";
      return changeMail(db, row.id, { ...settled, state: "given up", words: null, fault });
    }
    try {
      await mailer.deliver({ to: row.recipient, subject: row.subject, text });
    } catch (error) {
      if (!(error instanceof MailFault)) throw error;
      const attempts = row.attempts + 1;
      const pause = PAUSES[attempts - 1];
      const fault = error.message;
      if (error.forGood || pause === undefined) {
        return changeMail(db, row.id, { ...settled, state: "given up", words: null, attempts, fault });
      }
      return changeMail(db, row.id, { attempts, fault, nextAt: new Date(Date.now() + pause) });
    }
    const attempts = row.attempts + 1;
    if (mailer.kind === "post box") return changeMail(db, row.id, { ...settled, state: "kept", attempts, fault: null });
    changeMail(db, row.id, { ...settled, state: "sent", words: null, attempts, fault: null });
  }

  async function deliverAll(): Promise<void> {
    for (let next = nextMail(db, new Date()); next !== undefined && !stopped; next = nextMail(db, new Date())) {
      await deliver(next);
    }
  }

  function waitForNext(): void {
    const at = stopped ? undefined : nextMailAt(db);
    clearTimeout(timer);
    if (at === undefined) return;
    timer = setTimeout(begin, Math.min(Math.max(0, at.getTime() - Date.now()), 24 * 60 * MINUTE));
    timer.unref();
  }

  function begin(): void {
    if (round !== undefined || stopped) return;
    round = deliverAll()
      .catch(report)
      .finally(() => {
        round = undefined;
        waitForNext();
      });
  }

  return {
    kind: mailer.kind,

    /** Writes the message down; it leaves as soon as it can. Throws 400 when it is too long. */
    send({ to, subject, text }: Mail): void {
      if (text.length > LONGEST_TEXT) {
        throw invalid(`The message has ${text.length} characters, and may have ${LONGEST_TEXT}.`);
      }
      const now = new Date();
      insertMail(db, {
        id: randomUUID(),
        recipient: to,
        subject: inOneLine(subject).slice(0, LONGEST_SUBJECT),
        words: sealed.seal(text),
        state: "waiting",
        writtenAt: now,
        nextAt: now,
      });
      setImmediate(begin);
    },

    /** For an administrator, newest first. */
    list: (): MailView[] => newestMails(db, MOST_SHOWN).map(view),

    /** One that waits is tried now. */
    tryAgain(id: string): MailView {
      const row = findMail(db, id);
      if (row === undefined) throw notFound("There is no such message.");
      if (row.state !== "waiting") throw conflict("Only a message that waits can be tried again.");
      changeMail(db, id, { nextAt: new Date() });
      setImmediate(begin);
      return view({ ...row, nextAt: new Date() });
    },

    removeOld: (now = new Date()) => deleteOldMails(db, new Date(now.getTime() - KEPT_FOR), MOST_KEPT),

    /** What was waiting when the program last stopped. */
    start: begin,

    /** Waits for the message that is on its way; the rest waits in the database. */
    async close(): Promise<void> {
      stopped = true;
      clearTimeout(timer);
      await round;
    },
  };

  function view({ words, ...row }: MailRow): MailView {
    return { ...row, text: row.state === "kept" && words !== null ? sealed.open(words) : undefined };
  }
}

/** A subject is one line: nothing in it begins another head. */
function inOneLine(words: string): string {
  return words.replace(/[\p{Cc}\p{Zl}\p{Zp}\s]+/gu, " ").trim();
}
