import type { AddressInfo } from "node:net";
import { SMTPServer } from "smtp-server";
import { afterEach, beforeEach, describe, expect, test } from "vitest";
import { type OpenDatabase, openDatabase } from "../../../server/db/client.ts";
import type { Mailer } from "../../../server/mail/mailer.ts";
import { localPostBox } from "../../../server/mail/post-box.ts";
import { mailServer } from "../../../server/mail/smtp.ts";
import { createMailService } from "../../../server/services/mail.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const SECRET = "s".repeat(40);
const MINUTE = 60_000;
const LETTER = {
  to: "petra.vance@vihe.example",
  subject: "A link\r\nBcc: x@y.example",
  text: "Here: http://localhost/a-secret-token\n",
};

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
const closing: (() => Promise<unknown>)[] = [];

beforeEach(() => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/test.sqlite`);
});
afterEach(async () => {
  for (const close of closing.splice(0).reverse()) await close();
  open.close();
  folder.remove();
});

function service(mailer: Mailer, secret = SECRET) {
  const reported: unknown[] = [];
  const mail = createMailService({ db: open.db, mailer, secret, report: (error) => reported.push(error) });
  closing.push(() => mail.close());
  return Object.assign(mail, { reported });
}

const rows = () => JSON.stringify(open.sqlite.prepare("select * from mails").all());
const stateOf = (mail: ReturnType<typeof service>) => mail.list()[0].state;

/** A mail server of the test's own; `answer` may refuse a recipient with an answer of its own. */
async function startServer(answer: () => Error | null = () => null) {
  const taken: string[] = [];
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["STARTTLS"],
    onRcptTo: (_address, _session, done) => done(answer()),
    onData(stream, _session, done) {
      let words = "";
      stream.on("data", (piece: Buffer) => {
        words += piece.toString();
      });
      stream.on("end", () => {
        taken.push(words);
        done();
      });
    },
  });
  await new Promise<void>((ready) => server.listen(0, "127.0.0.1", ready));
  closing.push(() => new Promise<void>((done) => server.close(() => done())));
  const { port } = server.server.address() as AddressInfo;
  return { taken, mailer: mailServer({ url: `smtp://127.0.0.1:${port}`, from: "Tangency <tangency@vihe.example>" }) };
}

const refusing = (code: number) => () => Object.assign(new Error("no such box here"), { responseCode: code });

describe("by a mail server", () => {
  test("a message arrives, under one subject, and its words are kept no longer", async () => {
    const { taken, mailer } = await startServer();
    const mail = service(mailer);
    mail.send(LETTER);
    expect(rows()).not.toContain("a-secret-token");
    await expect.poll(() => stateOf(mail)).toBe("sent");
    expect(taken).toHaveLength(1);
    expect(taken[0]).toContain("Here: http://localhost/a-secret-token");
    expect(taken[0]).toMatch(/^Subject: A link Bcc: x@y\.example\r$/m);
    expect(taken[0]).not.toMatch(/^Bcc:/m);
    expect(open.sqlite.prepare("select words from mails").get()).toEqual({ words: null });
    expect(mail.list()[0].text).toBeUndefined();
  });

  test("one that is refused for now waits, is tried again when asked, and then arrives", async () => {
    let answer: Error | null = refusing(451)();
    const { taken, mailer } = await startServer(() => answer);
    const mail = service(mailer);
    const before = Date.now();
    mail.send(LETTER);
    await expect.poll(() => mail.list()[0].attempts).toBe(1);
    const [waiting] = mail.list();
    expect(waiting).toMatchObject({ state: "waiting", fault: expect.stringContaining("no such box here") });
    const pause = (waiting.nextAt?.getTime() ?? 0) - before;
    expect(pause).toBeGreaterThanOrEqual(MINUTE);
    expect(pause).toBeLessThan(2 * MINUTE);
    expect(rows()).not.toContain("a-secret-token");
    answer = null;
    mail.tryAgain(waiting.id);
    await expect.poll(() => stateOf(mail)).toBe("sent");
    expect(taken).toHaveLength(1);
  });

  test("one that is refused for good is given up at once, without its words", async () => {
    const { mailer } = await startServer(refusing(550));
    const mail = service(mailer);
    mail.send(LETTER);
    await expect.poll(() => stateOf(mail)).toBe("given up");
    expect(open.sqlite.prepare("select words, attempts from mails").get()).toEqual({ words: null, attempts: 1 });
    expect(() => mail.tryAgain(mail.list()[0].id)).toThrow("Only a message that waits");
  });

  test("one that is never taken is given up after the seventh attempt", async () => {
    const mail = service(mailServer({ url: "smtp://127.0.0.1:1", from: "tangency@vihe.example" }));
    mail.send(LETTER);
    for (let attempt = 1; attempt <= 6; attempt++) {
      await expect.poll(() => mail.list()[0].attempts).toBe(attempt);
      expect(stateOf(mail)).toBe("waiting");
      mail.tryAgain(mail.list()[0].id);
    }
    await expect.poll(() => stateOf(mail)).toBe("given up");
    expect(mail.reported).toEqual([]);
  });

  test("what waited when the program stopped leaves when it starts", async () => {
    const { taken, mailer } = await startServer();
    const first = service(mailer);
    await first.close();
    first.send(LETTER);
    const next = service(mailer);
    next.start();
    await expect.poll(() => stateOf(next)).toBe("sent");
    expect(taken).toHaveLength(1);
  });
});

describe("in the local post box", () => {
  test("a message is kept, to be read with the installation's secret only", async () => {
    const mail = service(localPostBox);
    mail.send(LETTER);
    await expect.poll(() => stateOf(mail)).toBe("kept");
    expect(mail.list()[0].text).toBe(LETTER.text);
    expect(rows()).not.toContain("a-secret-token");
    expect(service(localPostBox, "t".repeat(40)).list()[0].text).toBeUndefined();
  });

  test("a message is removed after thirty days, and one that is too long is not taken", async () => {
    const mail = service(localPostBox);
    mail.send(LETTER);
    await expect.poll(() => stateOf(mail)).toBe("kept");
    mail.removeOld(new Date(Date.now() + 29 * 24 * 60 * MINUTE));
    expect(mail.list()).toHaveLength(1);
    mail.removeOld(new Date(Date.now() + 31 * 24 * 60 * MINUTE));
    expect(mail.list()).toEqual([]);
    expect(() => mail.send({ ...LETTER, text: "x".repeat(20_001) })).toThrow(
      "has 20001 characters, and may have 20000",
    );
  });
});
