import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { createApp } from "../../server/app.ts";
import type { Limits } from "../../server/config.ts";
import { type Database, openDatabase } from "../../server/db/client.ts";
import { QUIET } from "../../server/engine/run.ts";
import { createLogger } from "../../server/http/log.ts";
import { WorkerMemory } from "../../server/jobs/run-cell.ts";
import { writeBundle } from "../../server/jobs/write-bundle.ts";
import { localPostBox } from "../../server/mail/post-box.ts";
import { createAccess } from "../../server/services/access.ts";
import { createAccountEvents } from "../../server/services/account-events.ts";
import { type Authentication, createAuthentication, ensureAccount } from "../../server/services/authentication.ts";
import { createServices } from "../../server/services/index.ts";
import { createJournalService } from "../../server/services/journal.ts";
import { createMailService } from "../../server/services/mail.ts";
import { FakeCells, FakeParser, FakeSockets } from "./fakes.ts";
import { temporaryFolder } from "./temporary.ts";

export const PASSPHRASE = "a curve and a line";

interface Options {
  /** Addresses. */
  readonly administrators?: readonly string[];
  readonly limits?: Partial<Limits>;
  readonly secure?: boolean;
  readonly log?: NodeJS.WritableStream;
}

/** Someone with a browser: keeps the cookie it is given, and names the origin of the page it is on. */
export interface Visitor {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  ask(method: string, path: string, body?: unknown, headers?: Record<string, string>): Promise<Answer>;
}

export interface Answer {
  readonly status: number;
  // biome-ignore lint/suspicious/noExplicitAny: the tests look into answers of every shape
  readonly body: any;
  readonly headers: Headers;
  /** The body as it came. */
  readonly bytes: Uint8Array;
}

/** The real application over a database of its own, listening; cells, worker and sockets are fakes. */
export async function startApplication({ administrators = [], limits, secure = false, log }: Options = {}) {
  const folder = temporaryFolder();
  const open = openDatabase(`${folder.path}/test.sqlite`);
  const server = createServer();
  await new Promise<void>((ready) => server.listen(0, "127.0.0.1", ready));
  const origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  const mail = createMailService({
    db: open.db,
    mailer: localPostBox,
    secret: "x".repeat(40),
    report: (error) => {
      throw error;
    },
  });
  const journal = createJournalService({ db: open.db, access: createAccess(open.db) });
  const accountEvents = createAccountEvents({ db: open.db, mail, record: journal.record, url: origin });
  const sockets = new FakeSockets();
  const auth = createAuthentication({
    db: open.db,
    url: origin,
    trustedOrigins: [origin],
    secure,
    secret: "x".repeat(40),
    events: accountEvents,
    sessionEnded: sockets.closeSession,
  });
  const cells = new FakeCells();
  const parser = new FakeParser(open);
  const services = createServices({
    db: open.db,
    auth,
    accountEvents,
    mail,
    journal,
    url: origin,
    administrators: () => administrators,
    cells,
    sourcesOf: cells.sourcesOf,
    closePerson: sockets.closePerson,
    remarksChanged: sockets.remarksChanged,
    parseUpload: parser.parse,
    lookAtRows: parser.look,
    // The real one, on the thread that asks.
    writeBundle: (job) => writeBundle(job, open.db, new WorkerMemory(), QUIET),
    program: "Tangency test",
  });
  const app = createApp({
    config: {
      trustedOrigins: [origin],
      secure,
      proxies: 0,
      development: false,
      limits: {
        signInsPerMinute: 1000,
        uploadsPerHour: 1000,
        refereeReadsPerMinute: 1000,
        mailsPerHour: 1000,
        ...limits,
      },
    },
    auth,
    services,
    installation: { name: "Tangency", version: "test", demo: [] },
    logger: createLogger(log === undefined ? "silent" : "info", log),
    pages: (_request, _response, next) => next(),
  });
  server.on("request", app);
  return {
    origin,
    open,
    auth,
    services,
    cells,
    sockets,
    parser,
    stranger: visitor(origin),
    mail,
    journal,
    /** Someone with an account, signed in. */
    person: (name: string) => newPerson({ origin, auth, db: open.db }, name),
    /** With a cookie of their own, or with none. */
    visitor: (about?: Pick<Visitor, "id" | "name" | "email">, cookie?: string) => visitor(origin, about, cookie),
    async close() {
      await mail.close();
      server.closeAllConnections();
      await new Promise((closed) => server.close(closed));
      open.close();
      folder.remove();
    },
  };
}

/** The words of the newest message to an address, once the local post box has it; and the secret of its first link. */
export async function letterTo({ mail }: Pick<Application, "mail">, email: string) {
  for (let tries = 0; tries < 200; tries++) {
    const letter = mail.list().find(({ recipient }) => recipient === email);
    if (letter?.text !== undefined) {
      return { subject: letter.subject, text: letter.text, token: /\/([\w-]{20,})$/m.exec(letter.text)?.[1] ?? "" };
    }
    await new Promise((later) => setTimeout(later, 5));
  }
  throw new Error(`No message to ${email}.`);
}

export type Application = Awaited<ReturnType<typeof startApplication>>;

function visitor(origin: string, about = { id: "", name: "", email: "" }, cookie?: string): Visitor {
  return {
    ...about,
    ask: (method, path, body, headers = {}) => {
      const form = body instanceof FormData || body instanceof Blob;
      return ask(`${origin}${path}`, {
        method,
        headers: {
          origin,
          ...(cookie !== undefined && { cookie }),
          ...(body !== undefined && !form && { "content-type": "application/json" }),
          ...headers,
        },
        ...(body !== undefined && { body: form ? body : JSON.stringify(body) }),
      });
    },
  };
}

async function ask(address: string, init: RequestInit): Promise<Answer> {
  const response = await fetch(address, init);
  const bytes = new Uint8Array(await response.arrayBuffer());
  const text = new TextDecoder().decode(bytes);
  const json = response.headers.get("content-type")?.includes("json") === true;
  return { status: response.status, body: json ? JSON.parse(text) : text, bytes, headers: response.headers };
}

async function newPerson(on: { origin: string; auth: Authentication; db: Database }, name: string): Promise<Visitor> {
  const email = `${name.toLowerCase().replace(/\W+/g, ".")}@vihe.example`;
  const id = await ensureAccount(on.auth, on.db, { name, email, passphrase: PASSPHRASE });
  const answer = await visitor(on.origin).ask("POST", "/api/auth/sign-in/email", { email, password: PASSPHRASE });
  if (answer.status !== 200) throw new Error(`no account for ${name}: ${JSON.stringify(answer.body)}`);
  return visitor(on.origin, { id, name, email }, cookieOf(answer));
}

export function cookieOf(answer: Answer): string {
  return answer.headers
    .getSetCookie()
    .map((cookie) => cookie.split(";")[0])
    .join("; ");
}
