import type { IncomingMessage } from "node:http";
import type { Duplex } from "node:stream";
import { type WebSocket, WebSocketServer } from "ws";
import type { Doc } from "yjs";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import { CLOSE } from "../../shared/schemas/sync.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { Connection } from "./connection.ts";
import { LIMITS, type Limits } from "./limits.ts";
import { SyncRefused } from "./refused.ts";
import { Rooms } from "./rooms.ts";
import type { DocumentUpdates } from "./updates.ts";
import { type Admitted, accept, admit, type Door, linkOf, refuse, studyAsked } from "./upgrade.ts";

export { addCell, readCells } from "./document.ts";
export { type DocumentUpdates, storedUpdates } from "./updates.ts";

export interface SyncServerNeeds extends Door {
  readonly updates: DocumentUpdates;
  /** Called a moment after stored changes, at most about eight times a second for a study. */
  changed(studyId: string, userId: string | null): void;
  /** A study's document has been loaded, and nobody in it has been told the status yet. */
  opened?(studyId: string): void;
  /** Told what went wrong that nobody outside should read. */
  report?(error: unknown): void;
  readonly limits?: Partial<Limits>;
}

const REASONS = {
  removed: new SyncRefused(CLOSE.noRight, "You are no longer in this study."),
  "session ended": new SyncRefused(CLOSE.notSignedIn, "Your session has ended."),
  "role changed": new SyncRefused(CLOSE.roleChanged, "Your role in this study has changed."),
} as const;

export type SyncServer = ReturnType<typeof createSyncServer>;

/** Live editing of every study of this installation. See PROTOCOL.md. */
export function createSyncServer(needs: SyncServerNeeds) {
  const limits: Limits = { ...LIMITS, ...needs.limits };
  const report = needs.report ?? (() => {});
  const rooms = new Rooms({ updates: needs.updates, limits, report, changed: needs.changed, opened: needs.opened });
  const sockets = new WebSocketServer({ noServer: true, maxPayload: limits.hardCap, perMessageDeflate: false });
  let stopping = false;
  const heartbeat = setInterval(() => beat(rooms, sockets), limits.heartbeatMs);
  heartbeat.unref();

  /** True when the path is a study's; any other upgrade is left to other handlers, its socket untouched. */
  function handleUpgrade(request: IncomingMessage, socket: Duplex, head: Buffer): boolean {
    const studyId = studyAsked(request.url);
    if (studyId === undefined) return false;
    socket.on("error", () => socket.destroy());
    void welcome(request, socket, head, studyId).catch((error: unknown) => {
      report(error);
      socket.destroy();
    });
    return true;
  }

  async function welcome(request: IncomingMessage, socket: Duplex, head: Buffer, studyId: string): Promise<void> {
    const answer = await admit(request, studyId, needs).catch((error: unknown) => asRefusal(error, report));
    if (stopping) return void socket.destroy();
    accept(sockets, request, socket, head, (ws) => {
      if (answer instanceof SyncRefused) return refuse(ws, answer);
      try {
        seat(ws, answer);
      } catch (error) {
        refuse(ws, asRefusal(error, report));
      }
    });
  }

  function seat(ws: WebSocket, { person, role, studyId }: Admitted): void {
    const connection = rooms.open(studyId).join(linkOf(ws), person, role);
    alive.set(ws, true);
    ws.on("pong", () => alive.set(ws, true));
    ws.on("message", (data: Buffer, isBinary: boolean) => {
      if (isBinary) connection.receive(data);
      else connection.expel(new SyncRefused(CLOSE.malformed, "Messages are binary."));
    });
    const end = person.expiresAt === undefined ? undefined : expireAt(person.expiresAt, connection);
    if (person.sessionId !== undefined) sessions.set(connection, person.sessionId);
    ws.on("close", () => {
      clearTimeout(end);
      connection.gone();
    });
  }

  return {
    handleUpgrade,

    /** The cells as stored, in their order. */
    sourcesOf: (studyId: string): CellSource[] => rooms.open(studyId).sources(),

    /** Sends the status to everyone in the study, and to whoever joins later. */
    publish: (studyId: string, status: StudyStatus): void => rooms.loaded(studyId)?.publish(status),

    /** Tells everyone in the study that its remarks are others now. */
    remarksChanged: (studyId: string): void => rooms.loaded(studyId)?.tellRemarks(),

    /** A change made by the program; kept when it is on disk and sent to everyone. */
    edit: (studyId: string, change: (doc: Doc) => void): Promise<void> => rooms.open(studyId).edit(change),

    /**
     * Closes the person's sockets at once, in one study (removed from it, or in another role from now on) or in all
     * (no longer anyone here). Nothing more is taken from them.
     */
    closePerson(userId: string, studyId?: string): void {
      for (const room of rooms.all()) {
        if (studyId !== undefined && room.studyId !== studyId) continue;
        for (const connection of [...room.connections]) {
          if (connection.person.id !== userId) continue;
          if (studyId === undefined) connection.expel(REASONS["session ended"]);
          else connection.expel(REASONS[needs.roleOf(userId, studyId) ? "role changed" : "removed"]);
        }
      }
    },

    /** Closes the sockets of a session that has ended, in every study. */
    closeSession(sessionId: string): void {
      for (const room of rooms.all()) {
        for (const connection of [...room.connections]) {
          if (sessions.get(connection) === sessionId) connection.expel(REASONS["session ended"]);
        }
      }
    },

    /** Stores what has arrived, closes every socket and waits for it; the database may then be closed. */
    async close(): Promise<void> {
      stopping = true;
      clearInterval(heartbeat);
      await Promise.all(rooms.all().map((room) => room.idle()));
      const farewell = new SyncRefused(CLOSE.stopping, "The server is stopping.");
      for (const room of rooms.all()) for (const connection of [...room.connections]) connection.expel(farewell);
      await allClosed(sockets);
      await rooms.close();
    },
  };
}

const alive = new WeakMap<WebSocket, boolean>();

/** By which session each connection was let in. */
const sessions = new WeakMap<Connection, string>();

/** Finds the dead sockets, and keeps the living ones' watch from running out. */
function beat(rooms: Rooms, sockets: WebSocketServer): void {
  for (const room of rooms.all()) for (const connection of room.connections) connection.tellStored();
  for (const ws of sockets.clients) {
    if (alive.get(ws) === false) ws.terminate();
    else if (alive.has(ws)) {
      alive.set(ws, false);
      ws.ping();
    }
  }
}

const LONGEST_TIMER = 2_147_483_647;

function expireAt(end: Date, connection: Connection): ReturnType<typeof setTimeout> {
  const left = Math.min(LONGEST_TIMER, Math.max(0, end.getTime() - Date.now()));
  const timer = setTimeout(() => {
    connection.expel(new SyncRefused(CLOSE.notSignedIn, "Your session has ended."));
  }, left);
  timer.unref();
  return timer;
}

const PATIENCE_MS = 1_500;

async function allClosed(sockets: WebSocketServer): Promise<void> {
  const closed = [...sockets.clients].map((ws) => new Promise((resolve) => ws.once("close", resolve)));
  const impatience = setTimeout(() => {
    for (const ws of sockets.clients) ws.terminate();
  }, PATIENCE_MS);
  await Promise.all(closed);
  clearTimeout(impatience);
  sockets.close();
}

function asRefusal(error: unknown, report: (error: unknown) => void): SyncRefused {
  if (error instanceof SyncRefused) return error;
  report(error);
  return new SyncRefused(CLOSE.notStored, "The study could not be read just now.");
}
