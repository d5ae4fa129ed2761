import type { IncomingMessage } from "node:http";
import type { Duplex } from "node:stream";
import { WebSocket, type WebSocketServer } from "ws";
import type { Role } from "../../shared/schemas/resources.ts";
import { CLOSE } from "../../shared/schemas/sync.ts";
import type { Link } from "./connection.ts";
import { closeReason, SyncRefused } from "./refused.ts";

export interface SignedIn {
  readonly id: string;
  readonly name: string;
  /** The session this socket rests on, to end with it. */
  readonly sessionId?: string;
  /** When the session ends; the socket ends with it. */
  readonly expiresAt?: Date;
}

export interface Door {
  authenticate(request: IncomingMessage): Promise<SignedIn | null | undefined> | SignedIn | null | undefined;
  /** Nothing when the study does not exist or the person is not in it: the two are told alike. */
  roleOf(userId: string, studyId: string): Role | null | undefined;
  /** Origins whose pages may connect besides this server's own, e.g. "https://tangency.example". */
  readonly origins?: readonly string[];
}

export interface Admitted {
  readonly person: SignedIn;
  readonly role: Role;
  readonly studyId: string;
}

const PATH = /^\/sync\/([^/?#]+)(?:\?.*)?$/;

/** The study asked for; undefined for any other path, which belongs to another handler. */
export function studyAsked(url: string | undefined): string | undefined {
  const found = PATH.exec(url ?? "");
  if (found === null) return undefined;
  try {
    return decodeURIComponent(found[1]);
  } catch {
    return "";
  }
}

/** Who is at the door, and may they in. Throws `SyncRefused`. */
export async function admit(request: IncomingMessage, studyId: string, door: Door): Promise<Admitted> {
  if (!originAllowed(request, door.origins ?? [])) {
    throw new SyncRefused(CLOSE.noRight, "This page does not come from this server.");
  }
  const noStudy = new SyncRefused(CLOSE.noStudy, "There is no such study, or it is not one of yours.");
  if (!/^[\w-]{1,64}$/.test(studyId)) throw noStudy;
  const person = await door.authenticate(request);
  if (!person || (person.expiresAt !== undefined && person.expiresAt.getTime() <= Date.now())) {
    throw new SyncRefused(CLOSE.notSignedIn, "You are not signed in.");
  }
  const role = door.roleOf(person.id, studyId);
  if (!role) throw noStudy;
  return { person, role, studyId };
}

/** A browser always names the page's origin; without it a cookie alone would let any page in. */
function originAllowed(request: IncomingMessage, others: readonly string[]): boolean {
  const { origin, host } = request.headers;
  if (origin === undefined) return false;
  if (others.includes(origin)) return true;
  try {
    return new URL(origin).host === host;
  } catch {
    return false;
  }
}

/**
 * Finishes the handshake; a refusal is told on the open socket, since a client cannot read it before. `ready` is
 * called before any message can arrive, so that none is missed.
 */
export function accept(
  server: WebSocketServer,
  request: IncomingMessage,
  socket: Duplex,
  head: Buffer,
  ready: (socket: WebSocket) => void,
): void {
  if (socket.destroyed) return;
  server.handleUpgrade(request, socket, head, (accepted) => {
    // A broken or oversize frame: ws closes by itself, and "close" follows.
    accepted.on("error", () => {});
    ready(accepted);
  });
}

export function refuse(socket: WebSocket, refusal: SyncRefused): void {
  socket.close(refusal.code, closeReason(refusal.message));
}

export function linkOf(socket: WebSocket): Link {
  return {
    send: (message) => {
      if (socket.readyState === WebSocket.OPEN) socket.send(message);
    },
    close: (code, sentence) => socket.close(code, closeReason(sentence)),
    unread: () => socket.bufferedAmount,
  };
}
