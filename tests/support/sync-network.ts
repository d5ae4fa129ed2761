import * as decoding from "lib0/decoding";
import * as Y from "yjs";
import type { Connection } from "../../server/sync/connection.ts";
import { addCell, type DocumentUpdates } from "../../server/sync/index.ts";
import { LIMITS } from "../../server/sync/limits.ts";
import { answerWith, askFor, updateOf } from "../../server/sync/messages.ts";
import { Room } from "../../server/sync/room.ts";
import type { Role } from "../../shared/schemas/resources.ts";
import { MESSAGE, SYNC } from "../../shared/schemas/sync.ts";
import { EditLedger } from "../../src/sync/edit-ledger.ts";

export interface Chance {
  uniform(): number;
  integer(n: number): number;
}

/** A database in memory, under rooms that can be killed at any moment. */
export class MemoryStore {
  readonly rows: Uint8Array[] = [];
  /** The next append fails. */
  failing = false;

  constructor() {
    const doc = new Y.Doc();
    addCell(doc, { id: "cell", name: "cell", kind: "text", source: "" });
    this.rows.push(Y.encodeStateAsUpdate(doc));
  }

  /** Stored rows as one document's text. */
  text(): string {
    const doc = new Y.Doc();
    for (const row of this.rows) Y.applyUpdate(doc, row);
    return textOf(doc).toString();
  }

  /** A room over the store, and how to kill it: nothing of it reaches the store afterwards. */
  open(): { room: Room; kill(): void } {
    let dead = false;
    const updates: DocumentUpdates = {
      load: () => this.rows.map((row) => row.slice()),
      append: (_study, update) => {
        if (dead || this.failing) throw new Error("disk I/O error");
        this.rows.push(update.slice());
      },
    };
    const needs = { updates, limits: { ...LIMITS, changedAfterMs: 0 }, changed() {}, empty() {}, report() {} };
    const room = new Room("study", needs);
    return {
      room,
      kill: () => {
        dead = true;
      },
    };
  }
}

export const textOf = (doc: Y.Doc): Y.Text =>
  (doc.getMap("cells").get("cell") as Y.Map<unknown>).get("source") as Y.Text;

interface Made {
  readonly token: string;
  readonly kind: "insert" | "delete";
}

/** One page on a wire that can be cut: what it has made, and what it believes stored. */
export class NetworkPage {
  readonly doc = new Y.Doc();
  readonly ledger = new EditLedger();
  readonly made: Made[] = [];
  readonly toServer: Uint8Array[] = [];
  readonly toPage: Uint8Array[] = [];
  connection: Connection | undefined;
  #answered = false;
  #wire = { whole: false };
  readonly #alphabet: number;
  readonly #chance: Chance;
  readonly id: string;
  readonly role: Role;

  constructor(number: number, role: Role, chance: Chance) {
    this.id = `page${number}`;
    this.role = role;
    this.#alphabet = 0x4e00 + number * 2_000;
    this.#chance = chance;
  }

  connect(room: Room): void {
    this.ledger.connecting();
    this.#answered = false;
    // A room that was killed may still speak into the wire it had; that wire is cut.
    const wire = { whole: true };
    this.#wire = wire;
    const link = {
      send: (message: Uint8Array) => wire.whole && this.toPage.push(message),
      close: () => wire.whole && this.cut(),
      unread: () => 0,
    };
    this.connection = room.join(link, { id: this.id, name: this.id }, this.role);
    this.toServer.push(askFor(Y.encodeStateVector(this.doc)));
  }

  /** The wire breaks: what is under way is lost on both sides. */
  cut(): void {
    const connection = this.connection;
    this.connection = undefined;
    this.#wire.whole = false;
    this.toServer.length = 0;
    this.toPage.length = 0;
    connection?.gone();
  }

  /** Types one character of one's own, or deletes one. */
  edit(): void {
    if (this.doc.getMap("cells").size === 0) return;
    const text = textOf(this.doc);
    const own = [...text.toString()].filter((token) => this.#isOwn(token));
    const update = this.#change(() => {
      if (own.length > 0 && this.#chance.uniform() < 0.3) {
        const token = own[this.#chance.integer(own.length)];
        text.delete(text.toString().indexOf(token), 1);
        this.made.push({ token, kind: "delete" });
      } else {
        const token = String.fromCodePoint(this.#alphabet + this.made.length);
        text.insert(this.#chance.integer(text.length + 1), token);
        this.made.push({ token, kind: "insert" });
      }
    });
    this.ledger.edited();
    if (this.connection !== undefined && this.#answered) this.#write(updateOf(update));
  }

  /** What no page of a reader would send. */
  forge(): void {
    if (this.doc.getMap("cells").size === 0) return;
    const copy = new Y.Doc();
    Y.applyUpdate(copy, Y.encodeStateAsUpdate(this.doc));
    textOf(copy).insert(0, "forged");
    const update = Y.encodeStateAsUpdate(copy);
    if (this.connection !== undefined) this.toServer.push(updateOf(update), answerWith(update));
  }

  deliverToServer(): void {
    const message = this.toServer.shift();
    if (message !== undefined) this.connection?.receive(message);
  }

  deliverToPage(times: number): void {
    const message = this.toPage.shift();
    if (message !== undefined) this.#read(message, times);
  }

  /** What the page calls stored and the store does not have; nothing, if all is well. */
  untrue(stored: string): string[] {
    const known = this.made.slice(0, this.made.length - this.ledger.unstored);
    const deletedLater = new Set(this.made.filter(({ kind }) => kind === "delete").map(({ token }) => token));
    return known.flatMap(({ token, kind }) => {
      const there = stored.includes(token);
      if (kind === "insert" && !there && !deletedLater.has(token)) return [`${this.id}: ${token} was lost`];
      if (kind === "delete" && there) return [`${this.id}: ${token} came back`];
      return [];
    });
  }

  #isOwn(token: string): boolean {
    const code = token.codePointAt(0) ?? 0;
    return code >= this.#alphabet && code < this.#alphabet + 2_000;
  }

  #change(change: () => void): Uint8Array {
    let made: Uint8Array = new Uint8Array();
    const keep = (update: Uint8Array) => {
      made = update;
    };
    this.doc.on("update", keep);
    this.doc.transact(change);
    this.doc.off("update", keep);
    return made;
  }

  #write(message: Uint8Array): void {
    this.ledger.wrote();
    this.toServer.push(message);
  }

  #read(message: Uint8Array, times: number): void {
    const decoder = decoding.createDecoder(message);
    const type = decoding.readVarUint(decoder);
    if (type === MESSAGE.stored) this.ledger.acknowledged(decoding.readVarUint(decoder));
    if (type !== MESSAGE.sync) return;
    const kind = decoding.readVarUint(decoder);
    const content = decoding.readVarUint8Array(decoder);
    if (kind === SYNC.ask) {
      this.#answered = true;
      this.#write(answerWith(Y.encodeStateAsUpdate(this.doc, content)));
    } else for (let time = 0; time < times; time++) Y.applyUpdate(this.doc, content);
  }
}
