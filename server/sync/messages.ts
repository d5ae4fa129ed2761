import * as decoding from "lib0/decoding";
import * as encoding from "lib0/encoding";
import { MESSAGE, SYNC } from "../../shared/schemas/sync.ts";
import { malformed } from "./refused.ts";

export type Incoming =
  | { readonly kind: "ask"; readonly stateVector: Uint8Array }
  | { readonly kind: "write"; readonly update: Uint8Array }
  | { readonly kind: "presence"; readonly entries: Uint8Array }
  /** A reader's write or presence: known by its type, its content unread. */
  | { readonly kind: "dropped" };

/** Reads one message. Throws when it is none of the protocol's, or has anything before or after its fields. */
export function readMessage(bytes: Uint8Array, mayWrite: boolean): Incoming {
  const decoder = decoding.createDecoder(bytes);
  const type = field(() => decoding.readVarUint(decoder));
  if (type === MESSAGE.presence) {
    return mayWrite ? { kind: "presence", entries: lastField(decoder) } : { kind: "dropped" };
  }
  if (type !== MESSAGE.sync) throw malformed(`There is no message of type ${type}.`);
  const kind = field(() => decoding.readVarUint(decoder));
  if (kind === SYNC.ask) return { kind: "ask", stateVector: lastField(decoder) };
  if (kind !== SYNC.answer && kind !== SYNC.update) throw malformed(`There is no sync message of kind ${kind}.`);
  return mayWrite ? { kind: "write", update: lastField(decoder) } : { kind: "dropped" };
}

function field<T>(read: () => T): T {
  try {
    return read();
  } catch {
    throw malformed("The message ends before its last field.");
  }
}

function lastField(decoder: decoding.Decoder): Uint8Array {
  const bytes = field(() => decoding.readVarUint8Array(decoder));
  if (decoding.hasContent(decoder)) throw malformed("The message goes on after its last field.");
  return bytes;
}

export const askFor = (stateVector: Uint8Array) => sync(SYNC.ask, stateVector);
export const answerWith = (update: Uint8Array) => sync(SYNC.answer, update);
export const updateOf = (update: Uint8Array) => sync(SYNC.update, update);

function sync(kind: number, content: Uint8Array): Uint8Array {
  return encoding.encode((encoder) => {
    encoding.writeVarUint(encoder, MESSAGE.sync);
    encoding.writeVarUint(encoder, kind);
    encoding.writeVarUint8Array(encoder, content);
  });
}

export function presenceOf(entries: Uint8Array): Uint8Array {
  return encoding.encode((encoder) => {
    encoding.writeVarUint(encoder, MESSAGE.presence);
    encoding.writeVarUint8Array(encoder, entries);
  });
}

/** "Writes 1 to `writes` of this connection are stored." */
export function storedThrough(writes: number): Uint8Array {
  return encoding.encode((encoder) => {
    encoding.writeVarUint(encoder, MESSAGE.stored);
    encoding.writeVarUint(encoder, writes);
  });
}

/** "The study's remarks are others now": the type says it all. */
export function remarksChanged(): Uint8Array {
  return encoding.encode((encoder) => encoding.writeVarUint(encoder, MESSAGE.remarks));
}

export function jsonMessage(type: typeof MESSAGE.status | typeof MESSAGE.people, value: unknown): Uint8Array {
  return encoding.encode((encoder) => {
    encoding.writeVarUint(encoder, type);
    encoding.writeVarString(encoder, JSON.stringify(value));
  });
}
