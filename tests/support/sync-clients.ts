import * as decoding from "lib0/decoding";
import * as encoding from "lib0/encoding";
import { WebSocket as NodeSocket } from "ws";
import { Awareness, applyAwarenessUpdate } from "y-protocols/awareness";
import * as Y from "yjs";
import { MESSAGE, type PeoplePresent, SYNC } from "../../shared/schemas/sync.ts";
import { type OpenOptions, openStudy } from "../../src/sync/study.ts";
import { PEOPLE, type PersonId, STUDY } from "./sync-server.ts";

interface Place {
  readonly address: string;
  readonly origin: string;
}

/** A person's page, as the browser runs it, without the browser. */
export function openAs(person: PersonId, place: Place, options: OpenOptions = {}) {
  return openStudy(STUDY, { id: person }, PEOPLE[person].role, {
    server: place.address,
    WebSocket: socketOf(person, place.origin),
    keeping: null,
    ...options,
  });
}

function socketOf(person: PersonId, origin: string): typeof WebSocket {
  return class extends NodeSocket {
    constructor(url: string | URL) {
      super(url, { origin, headers: { cookie: `person=${person}` } });
    }
  } as unknown as typeof WebSocket;
}

/** Waits until something holds, looking every few milliseconds; fails with the words after ten seconds. */
export async function until(holds: () => boolean, words: string | (() => string), patience = 10_000): Promise<void> {
  const end = Date.now() + patience;
  while (!holds()) {
    if (Date.now() > end) throw new Error(`Waited in vain: ${typeof words === "string" ? words : words()}`);
    await new Promise((later) => setTimeout(later, 4));
  }
}

/** A client made by hand, that may send what no page would. */
export class RawClient {
  readonly socket: NodeSocket;
  readonly doc = new Y.Doc();
  readonly awareness = new Awareness(this.doc);
  readonly received: string[] = [];
  stored = 0;
  people: PeoplePresent | undefined;
  closed: { code: number; reason: string } | undefined;

  constructor(address: string, headers: Record<string, string>) {
    this.socket = new NodeSocket(address, { headers });
    this.socket.binaryType = "arraybuffer";
    this.socket.on("message", (data: ArrayBuffer) => this.#read(new Uint8Array(data)));
    this.socket.on("close", (code, reason) => {
      this.closed = { code, reason: reason.toString() };
    });
    this.socket.on("error", () => {});
  }

  static async as(person: PersonId, place: Place, study: string = STUDY): Promise<RawClient> {
    const client = new RawClient(`${place.address}/${study}`, {
      origin: place.origin,
      cookie: `person=${person}`,
    });
    await client.opened();
    return client;
  }

  opened(): Promise<void> {
    return until(() => this.socket.readyState !== NodeSocket.CONNECTING, "the socket never opened");
  }

  async closing(): Promise<{ code: number; reason: string }> {
    await until(() => this.closed !== undefined, "the server never closed the socket");
    return this.closed as { code: number; reason: string };
  }

  ask(): void {
    this.send(MESSAGE.sync, SYNC.ask, Y.encodeStateVector(this.doc));
  }

  /** What was added to the document by `change`, as the update a page would send. */
  edit(change: (doc: Y.Doc) => void): Uint8Array {
    const before = Y.encodeStateVector(this.doc);
    this.doc.transact(() => change(this.doc));
    return Y.encodeStateAsUpdate(this.doc, before);
  }

  update(update: Uint8Array): void {
    this.send(MESSAGE.sync, SYNC.update, update);
  }

  answer(update: Uint8Array): void {
    this.send(MESSAGE.sync, SYNC.answer, update);
  }

  present(id: number, clock: number, state: unknown): void {
    const entries = encoding.encode((encoder) => {
      encoding.writeVarUint(encoder, 1);
      encoding.writeVarUint(encoder, id);
      encoding.writeVarUint(encoder, clock);
      encoding.writeVarString(encoder, typeof state === "string" ? state : JSON.stringify(state));
    });
    this.send(MESSAGE.presence, entries);
  }

  /** Integers, then bytes. */
  send(...fields: (number | Uint8Array)[]): void {
    this.socket.send(
      encoding.encode((encoder) => {
        for (const field of fields) {
          if (typeof field === "number") encoding.writeVarUint(encoder, field);
          else encoding.writeVarUint8Array(encoder, field);
        }
      }),
    );
  }

  async leave(): Promise<void> {
    this.socket.close();
    await this.closing();
    this.awareness.destroy();
  }

  #read(bytes: Uint8Array): void {
    const decoder = decoding.createDecoder(bytes);
    const type = decoding.readVarUint(decoder);
    if (type === MESSAGE.sync) {
      const kind = decoding.readVarUint(decoder);
      this.received.push(["ask", "answer", "update"][kind]);
      if (kind !== SYNC.ask) Y.applyUpdate(this.doc, decoding.readVarUint8Array(decoder), "server");
    } else if (type === MESSAGE.presence) {
      this.received.push("presence");
      applyAwarenessUpdate(this.awareness, decoding.readVarUint8Array(decoder), "server");
    } else if (type === MESSAGE.stored) {
      this.received.push("stored");
      this.stored = decoding.readVarUint(decoder);
    } else if (type === MESSAGE.people) {
      this.received.push("people");
      this.people = JSON.parse(decoding.readVarString(decoder));
    } else this.received.push(`type ${type}`);
  }
}
