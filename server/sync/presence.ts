import * as decoding from "lib0/decoding";
import * as encoding from "lib0/encoding";
import { type PresentPerson, presenceState } from "../../shared/schemas/sync.ts";
import type { Limits } from "./limits.ts";
import { malformed, tooLarge } from "./refused.ts";

/** As much of a connection as presence needs. */
export interface PresenceOwner {
  readonly person: PresentPerson;
}

interface Entry {
  readonly owner: PresenceOwner;
  readonly clock: number;
  readonly state: string;
}

const GONE = "null";

/**
 * Where everyone is, as the server tells it. A connection owns the first client id it names; everything it says of others is
 * ignored, and who it is comes from the session.
 */
export class Presence {
  readonly #entries = new Map<number, Entry>();
  readonly #idOf = new Map<PresenceOwner, number>();
  readonly #limits: Limits;
  /** Clients keep the last clock of an id beyond a restart of the server, so it begins at the time. */
  #clock = Date.now();

  constructor(limits: Limits) {
    this.#limits = limits;
  }

  /** Takes what a connection says of itself; returns what the others are to be told, if anything. */
  receive(owner: PresenceOwner, entries: Uint8Array): Uint8Array | undefined {
    if (entries.length > this.#limits.presenceMessage) {
      throw tooLarge(`Presence has ${entries.length} bytes; at most ${this.#limits.presenceMessage}.`);
    }
    for (const { id, state } of readEntries(entries)) {
      if (!this.#owns(owner, id, state)) continue;
      if (state === GONE) return this.#remove(id);
      if (state.length > this.#limits.presenceState) {
        throw tooLarge(`The presence has ${state.length} characters; at most ${this.#limits.presenceState}.`);
      }
      this.#clock += 1;
      this.#entries.set(id, { owner, clock: this.#clock, state: stamp(state, owner.person) });
      return this.#encode([id]);
    }
    return undefined;
  }

  /** The connection has closed; what the others are to be told. */
  leave(owner: PresenceOwner): Uint8Array | undefined {
    const id = this.#idOf.get(owner);
    if (id === undefined) return undefined;
    this.#idOf.delete(owner);
    return this.#entries.get(id)?.owner === owner ? this.#remove(id) : undefined;
  }

  everyone(): Uint8Array | undefined {
    return this.#entries.size === 0 ? undefined : this.#encode([...this.#entries.keys()]);
  }

  #owns(owner: PresenceOwner, id: number, state: string): boolean {
    const own = this.#idOf.get(owner);
    if (own !== undefined) return own === id;
    if (state === GONE) return false;
    const holder = this.#entries.get(id)?.owner;
    if (holder !== undefined) {
      // The same page come back before its old socket was found dead.
      if (holder.person.id !== owner.person.id) return false;
      this.#idOf.delete(holder);
    }
    this.#idOf.set(owner, id);
    return true;
  }

  #remove(id: number): Uint8Array | undefined {
    if (!this.#entries.delete(id)) return undefined;
    this.#clock += 1;
    return encodeEntries([{ id, clock: this.#clock, state: GONE }]);
  }

  #encode(ids: number[]): Uint8Array {
    return encodeEntries(ids.map((id) => ({ id, ...(this.#entries.get(id) as Entry) })));
  }
}

function stamp(state: string, user: PresentPerson): string {
  let value: unknown;
  try {
    value = JSON.parse(state);
  } catch {
    throw malformed("The presence is not JSON.");
  }
  const read = presenceState.safeParse(value);
  if (!read.success) throw malformed(`The presence is not understood at ${read.error.issues[0].path.join(".")}.`);
  return JSON.stringify({ ...read.data, user });
}

/** An awareness update: how many, then client id, clock and state of each. */
function readEntries(bytes: Uint8Array): { id: number; state: string }[] {
  const decoder = decoding.createDecoder(bytes);
  const entries: { id: number; state: string }[] = [];
  try {
    for (let left = decoding.readVarUint(decoder); left > 0; left--) {
      const id = decoding.readVarUint(decoder);
      decoding.readVarUint(decoder);
      entries.push({ id, state: decoding.readVarString(decoder) });
    }
  } catch {
    throw malformed("The presence ends before its last entry.");
  }
  if (decoding.hasContent(decoder)) throw malformed("The presence goes on after its last entry.");
  return entries;
}

function encodeEntries(entries: readonly { id: number; clock: number; state: string }[]): Uint8Array {
  return encoding.encode((encoder) => {
    encoding.writeVarUint(encoder, entries.length);
    for (const { id, clock, state } of entries) {
      encoding.writeVarUint(encoder, id);
      encoding.writeVarUint(encoder, clock);
      encoding.writeVarString(encoder, state);
    }
  });
}
