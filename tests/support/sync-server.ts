import { createServer, type IncomingMessage } from "node:http";
import type { AddressInfo } from "node:net";
import type { OpenDatabase } from "../../server/db/client.ts";
import { user } from "../../server/db/schema/auth.ts";
import { studies, studyMembers } from "../../server/db/schema/studies.ts";
import { createSyncServer, type DocumentUpdates, storedUpdates } from "../../server/sync/index.ts";
import type { Limits } from "../../server/sync/limits.ts";
import type { Role } from "../../shared/schemas/resources.ts";

export const STUDY = "study-of-drinks";
export const PEOPLE = {
  ilse: { id: "ilse", name: "Ilse Marchetti", role: "owner" },
  tomas: { id: "tomas", name: "Tomás Adeyemi", role: "coauthor" },
  vera: { id: "vera", name: "Vera Okonkwo", role: "reader" },
} as const satisfies Record<string, { id: string; name: string; role: Role }>;
export type PersonId = keyof typeof PEOPLE;

/** One study with an owner, a coauthor and a reader. */
export function fillDatabase({ db }: OpenDatabase): void {
  const at = new Date();
  db.insert(studies).values({ id: STUDY, title: "A levy on sweet drinks", createdAt: at, changedAt: at }).run();
  for (const { id, name, role } of Object.values(PEOPLE)) {
    db.insert(user)
      .values({ id, name, email: `${id}@vihe.example`, createdAt: at, updatedAt: at })
      .run();
    db.insert(studyMembers).values({ studyId: STUDY, userId: id, role, addedAt: at }).run();
  }
}

interface Options {
  readonly port?: number;
  readonly updates?: DocumentUpdates;
  readonly limits?: Partial<Limits>;
  readonly expiresAt?: Date;
}

/** The real sync server on a port of its own; whoever the cookie names is signed in. */
export async function startSyncServer(open: OpenDatabase, { port = 0, updates, limits, expiresAt }: Options = {}) {
  const roles = new Map<string, Role>(Object.values(PEOPLE).map(({ id, role }) => [id, role]));
  const changed: string[] = [];
  const reports: unknown[] = [];
  const sessions: string[] = [];
  const sync = createSyncServer({
    authenticate: (request) => signedIn(request, sessions, expiresAt),
    roleOf: (userId, studyId) => (studyId === STUDY ? roles.get(userId) : undefined),
    updates: updates ?? storedUpdates(open.db),
    changed: (studyId, userId) => changed.push(`${studyId} ${userId}`),
    report: (error) => reports.push(error),
    limits,
  });
  const http = createServer();
  http.on("upgrade", (request, socket, head) => {
    if (!sync.handleUpgrade(request, socket, head)) socket.destroy();
  });
  await new Promise<void>((ready) => http.listen(port, "127.0.0.1", ready));
  const host = `127.0.0.1:${(http.address() as AddressInfo).port}`;
  return {
    sync,
    roles,
    changed,
    reports,
    origin: `http://${host}`,
    address: `ws://${host}/sync`,
    async close() {
      await sync.close();
      await new Promise((closed) => http.close(closed));
    },
  };
}

export type RunningSync = Awaited<ReturnType<typeof startSyncServer>>;

/** Each time by a session of its own: "tomas 1", "tomas 2". */
async function signedIn(request: IncomingMessage, sessions: string[], expiresAt?: Date) {
  const id = /(?:^|; )person=(\w+)/.exec(request.headers.cookie ?? "")?.[1];
  const person = PEOPLE[id as PersonId];
  if (person === undefined) return null;
  sessions.push(person.id);
  const sessionId = `${person.id} ${sessions.filter((one) => one === person.id).length}`;
  return { id: person.id, name: person.name, sessionId, expiresAt };
}
