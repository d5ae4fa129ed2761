import { CLOSE, type CloseCode, type PresentPerson } from "../../shared/schemas/sync.ts";
import { rolesThatMay } from "../policies/can.ts";
import { Allowance, type Limits } from "./limits.ts";
import { readMessage, storedThrough } from "./messages.ts";
import { SyncRefused } from "./refused.ts";

/** The wire under a connection. */
export interface Link {
  send(message: Uint8Array): void;
  close(code: CloseCode, sentence: string): void;
  /** Bytes sent and not yet taken by the other side. */
  unread(): number;
}

/** As much of a room as a connection needs. */
interface Hall {
  answer(connection: Connection, stateVector: Uint8Array): void;
  write(connection: Connection, update: Uint8Array): void;
  presence(connection: Connection, entries: Uint8Array): void;
  leave(connection: Connection): void;
}

/** What an ask costs of the allowance: it is answered with the whole document. */
const COST_OF_ASKING = 20;

/** One window of one person. */
export class Connection {
  readonly person: PresentPerson;
  readonly mayWrite: boolean;
  readonly #link: Link;
  readonly #hall: Hall;
  readonly #limits: Limits;
  readonly #allowance: Allowance;
  #written = 0;
  #expelled = false;

  constructor(link: Link, person: PresentPerson, hall: Hall, limits: Limits) {
    this.#link = link;
    this.person = person;
    this.mayWrite = rolesThatMay("document.write").includes(person.role);
    this.#hall = hall;
    this.#limits = limits;
    this.#allowance = new Allowance(limits, Date.now());
  }

  /** Closed by the server: what it sent and has not been stored yet is no longer wanted. */
  get expelled(): boolean {
    return this.#expelled;
  }

  receive(bytes: Uint8Array): void {
    if (this.#expelled) return;
    try {
      this.#take(bytes);
    } catch (error) {
      if (!(error instanceof SyncRefused)) throw error;
      this.expel(error);
    }
  }

  #take(bytes: Uint8Array): void {
    if (bytes.length > this.#limits.message) {
      throw new SyncRefused(
        CLOSE.tooLarge,
        `The message has ${bytes.length} bytes; at most ${this.#limits.message} are read.`,
      );
    }
    const message = readMessage(bytes, this.mayWrite);
    if (!this.#allowance.take(message.kind === "ask" ? COST_OF_ASKING : 1, Date.now())) {
      throw new SyncRefused(CLOSE.tooMany, `More than ${this.#limits.messagesPerSecond} messages a second.`);
    }
    if (message.kind === "ask") this.#hall.answer(this, message.stateVector);
    else if (message.kind === "write") this.#hall.write(this, message.update);
    else if (message.kind === "presence") this.#hall.presence(this, message.entries);
  }

  /** The next of this connection's writes is stored: they are stored in the order received. */
  acknowledge(): void {
    this.#written += 1;
    this.tellStored();
  }

  tellStored(): void {
    this.send(storedThrough(this.#written));
  }

  send(message: Uint8Array): void {
    if (this.#expelled) return;
    if (this.#link.unread() > this.#limits.unread) {
      this.expel(new SyncRefused(CLOSE.tooSlow, "More is waiting than this connection takes."));
      return;
    }
    this.#link.send(message);
  }

  /** Closes from the server's side, at once: nothing it has sent is taken any more. */
  expel(refusal: SyncRefused): void {
    if (this.#expelled) return;
    this.#expelled = true;
    this.#link.close(refusal.code, refusal.message);
    this.#hall.leave(this);
  }

  /** The other side has closed, or the wire has broken; what it sent is still stored. */
  gone(): void {
    this.#hall.leave(this);
  }
}
