import { z } from "zod";
import { count, identifier } from "./primitives.ts";
import { role } from "./resources.ts";

/** First integer of every message on the socket; 0 and 1 are y-websocket's own. See server/sync/PROTOCOL.md. */
export const MESSAGE = { sync: 0, presence: 1, stored: 4, status: 5, people: 6, remarks: 7 } as const;

/** Second integer of a sync message. */
export const SYNC = { ask: 0, answer: 1, update: 2 } as const;

/** Why a socket was closed. 4400 to 4499 are decisions; after the others a client tries again. */
export const CLOSE = {
  malformed: 4400,
  notSignedIn: 4401,
  noRight: 4403,
  noStudy: 4404,
  tooLarge: 4413,
  tooMany: 4429,
  notStored: 4503,
  tooSlow: 4508,
  missingEarlier: 4509,
  roleChanged: 4510,
  stopping: 1012,
  overHardCap: 1009,
} as const;
export type CloseCode = (typeof CLOSE)[keyof typeof CLOSE];

/** Someone who has the study open. `colour` is the same for everyone in the study while the person is there. */
export const presentPerson = z.strictObject({ id: identifier, name: z.string(), role, colour: count });
export type PresentPerson = z.infer<typeof presentPerson>;

/** Message 6. */
export const peoplePresent = z.strictObject({ you: presentPerson, people: z.array(presentPerson) });
export type PeoplePresent = z.infer<typeof peoplePresent>;

const itemId = z.strictObject({ client: count, clock: count });
/** A place in a text that moves with it: Yjs' relative position as JSON. */
export const relativePosition = z.strictObject({
  type: itemId.nullish(),
  tname: z.string().max(64).nullish(),
  item: itemId.nullish(),
  assoc: z.number().int().optional(),
});

/** What a client may say of itself; anything else in a presence state is left out. */
export const presenceState = z.object({
  cell: identifier.nullish(),
  typing: z.boolean().optional(),
  cursor: z.strictObject({ anchor: relativePosition, head: relativePosition }).nullish(),
});

/** What the others receive: the same, with the person stamped by the server. */
export const stampedPresence = presenceState.extend({ user: presentPerson });
export type StampedPresence = z.infer<typeof stampedPresence>;
