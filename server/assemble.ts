import { randomUUID } from "node:crypto";
import { createServer, type Server } from "node:http";
import { join, resolve } from "node:path";
import type { Logger } from "pino";
import type { Installation } from "../shared/schemas/resources.ts";
import { createApp } from "./app.ts";
import { type Config, threadsOfOneComputation } from "./config.ts";
import { type OpenDatabase, openDatabase } from "./db/client.ts";
import { closeDemoAccounts, DEMO_ADMINISTRATOR, demoSignIns, isDemo, openDemoAccounts } from "./demo/accounts.ts";
import { demoStudy } from "./demo/cells.ts";
import { needsDemoStudy, seedDemoStudy } from "./demo/seed.ts";
import { developmentPages } from "./http/development.ts";
import { createLogger } from "./http/log.ts";
import { pages } from "./http/pages.ts";
import { sessionOf } from "./http/session.ts";
import { createPool, type JobPool } from "./jobs/pool.ts";
import { localPostBox } from "./mail/post-box.ts";
import { mailServer } from "./mail/smtp.ts";
import { ROOT, VERSION } from "./root.ts";
import { createAccess } from "./services/access.ts";
import { type AccountEvents, createAccountEvents } from "./services/account-events.ts";
import { type Authentication, createAuthentication } from "./services/authentication.ts";
import { createCellService } from "./services/cells.ts";
import { createServices, type Services } from "./services/index.ts";
import { createJournalService, type JournalService } from "./services/journal.ts";
import { createMailService, type MailService } from "./services/mail.ts";
import { lockFolder } from "./storage/lock.ts";
import { keptSecret } from "./storage/secret.ts";
import { addCell, createSyncServer, type SyncServer, storedUpdates } from "./sync/index.ts";

export interface Running {
  readonly server: Server;
  readonly installation: Installation;
  readonly services: Services;
  /** Stops taking requests, stores what has arrived, closes sockets, threads and database, in this order. */
  close(): Promise<void>;
}

interface LiveParts {
  readonly open: OpenDatabase;
  readonly auth: Authentication;
  readonly accountEvents: AccountEvents;
  readonly mail: MailService;
  readonly journal: JournalService;
  readonly url: string;
  readonly administrators: () => readonly string[];
  readonly pool: JobPool;
  readonly logger: Logger;
  readonly origins: readonly string[];
}

interface Live {
  readonly services: Services;
  readonly sync: SyncServer;
  readonly stopCells: () => void;
}

interface DemoParts extends Pick<LiveParts, "open" | "auth"> {
  readonly services: Services;
  readonly sync: SyncServer;
  readonly say: (line: string) => void;
}

/** 100 MB over a slow line. */
const LONGEST_REQUEST = 3_600_000;

/** Puts the house together over one folder of data. Listens to nothing yet. */
export async function assemble(config: Config, say: (line: string) => void): Promise<Running> {
  const dataFolder = resolve(config.dataFolder);
  const unlock = lockFolder(dataFolder);
  const open = openDatabase(join(dataFolder, "tangency.sqlite"));
  const logger = createLogger(config.logLevel);
  const { db } = open;
  const secret = config.secret ?? keptSecret(dataFolder);
  const mail = createMailService({
    db,
    mailer: config.smtp === undefined ? localPostBox : mailServer(config.smtp),
    secret,
    report: (error) => logger.error({ err: error }, "unforeseen"),
  });
  const journal = createJournalService({ db, access: createAccess(db) });
  const accountEvents = createAccountEvents({ db, mail, record: journal.record, url: config.url });
  const administrators = [...config.administrators];
  const auth = createAuthentication({
    db,
    url: config.url,
    trustedOrigins: config.trustedOrigins,
    secure: config.secure,
    secret,
    events: accountEvents,
    sessionEnded: (sessionId) => sync.closeSession(sessionId),
  });
  const pool = createPool({
    databasePath: open.path,
    threads: config.threads,
    threadsEach: threadsOfOneComputation(config),
  });
  const { services, sync, stopCells } = live({
    open,
    auth,
    accountEvents,
    mail,
    journal,
    url: config.url,
    administrators: () => administrators,
    pool,
    logger,
    origins: config.trustedOrigins,
  });
  services.uploads.removeUnfinished();
  mail.start();
  const stopKeepingHouse = keepHouse(services, (error) => logger.error({ err: error }, "unforeseen"));

  const demo = isDemo(db, config.demo);
  if (demo) await makeDemo({ open, auth, services, sync, say });
  else closeDemoAccounts(db);
  if (demo) administrators.push(DEMO_ADMINISTRATOR);
  else if (mail.kind === "post box") sayWhereMailGoes(config.administrators, services, say);

  const installation: Installation = {
    name: "Tangency",
    version: VERSION,
    mail: mail.kind,
    demo: demo ? demoSignIns() : [],
  };
  const server = createServer();
  server.requestTimeout = LONGEST_REQUEST;
  const page = config.development ? await developmentPages(ROOT, server) : pages(join(ROOT, "dist", "client"));
  server.on("request", createApp({ config, auth, services, installation, logger, pages: page }));
  server.on("upgrade", (request, socket, head) => {
    // In development Vite has sockets of its own.
    if (!sync.handleUpgrade(request, socket, head) && !config.development) socket.destroy();
  });
  return {
    server,
    installation,
    services,
    async close() {
      const quiet = new Promise((done) => server.close(done));
      server.closeIdleConnections();
      stopKeepingHouse();
      await sync.close();
      stopCells();
      await pool.close();
      await mail.close();
      server.closeAllConnections();
      await quiet;
      open.close();
      unlock();
    },
  };
}

/** The parts that call one another: cells read the document, and the document tells the cells of edits. */
function live({ open, auth, pool, logger, origins, ...people }: LiveParts): Live {
  const { db } = open;
  const access = createAccess(db);
  const report = (error: unknown) => logger.error({ err: error }, "unforeseen");
  const sync = createSyncServer({
    async authenticate(request) {
      const session = await sessionOf(auth, request.headers);
      if (session === undefined) return undefined;
      const { id, name, sessionId } = session.account;
      return { id, name, sessionId, expiresAt: session.expiresAt };
    },
    roleOf: (userId, studyId) => access.roleOf(userId, studyId),
    origins,
    updates: storedUpdates(db),
    changed(studyId) {
      services.studies.touched(studyId);
      cells.changed(studyId);
      void services.remarks.cellsChanged(studyId).catch(report);
    },
    // Whoever joins a study that nobody had open is told where its cells stand.
    opened: (studyId) =>
      void Promise.resolve(studyId)
        .then(cells.status)
        .then((status) => sync.publish(studyId, status))
        .catch(report),
    report,
  });
  const cells = createCellService({ db, pool, sourcesOf: sync.sourcesOf, publish: sync.publish, report });
  const services = createServices({
    db,
    auth,
    ...people,
    cells,
    sourcesOf: sync.sourcesOf,
    closePerson: sync.closePerson,
    remarksChanged: sync.remarksChanged,
    parseUpload: (uploadId, signal, sheet) => pool.parseUpload(uploadId, () => {}, signal, sheet),
    lookAtRows: (look, signal) => pool.look(look, signal),
    writeBundle: (job, signal) => pool.writeBundle(job, signal),
    program: `Tangency ${VERSION}`,
  });
  return { services, sync, stopCells: cells.close };
}

/** Without a mail server the first administrator could not be sent a link: whoever runs the program is told it. */
function sayWhereMailGoes(administrators: readonly string[], services: Services, say: (line: string) => void): void {
  say("No mail server is set (TANGENCY_SMTP_URL): messages stay in the local post box, which administrators read.");
  for (const email of administrators) {
    const link = services.accounts.firstLink(email);
    if (link !== undefined) say(`${email} administers and has no account yet; it is made, within a day, at ${link}`);
  }
}

const DAY = 24 * 3_600_000;

/** What is due to go goes at start and daily: deleted studies, old messages, links that have run out. */
function keepHouse(services: Services, report: (error: unknown) => void): () => void {
  const keep = () => {
    try {
      services.studies.purgeDeleted();
      services.mail.removeOld();
      services.invitations.removeOld();
      services.accounts.removeOldLinks();
    } catch (error) {
      report(error);
    }
  };
  keep();
  const daily = setInterval(keep, DAY);
  daily.unref();
  return () => clearInterval(daily);
}

async function makeDemo({ open, auth, services, sync, say }: DemoParts): Promise<void> {
  const ids = await openDemoAccounts(auth, open.db);
  if (!needsDemoStudy(open.db, (studyId) => sync.sourcesOf(studyId).length > 0)) return;
  await seedDemoStudy(demoStudy(), ids, {
    db: open.db,
    services,
    write: (studyId, cells) =>
      sync.edit(studyId, (doc) => {
        for (const cell of cells) addCell(doc, { id: randomUUID(), ...cell });
      }),
    say,
  });
}
