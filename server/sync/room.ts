import * as Y from "yjs";
import type { Role } from "../../shared/schemas/resources.ts";
import { CLOSE, MESSAGE, type PresentPerson } from "../../shared/schemas/sync.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { Connection, type Link } from "./connection.ts";
import { readCells } from "./document.ts";
import type { Limits } from "./limits.ts";
import { answerWith, askFor, jsonMessage, presenceOf, remarksChanged, updateOf } from "./messages.ts";
import { colourOf, peopleIn } from "./people.ts";
import { Presence } from "./presence.ts";
import { malformed, SyncRefused } from "./refused.ts";
import { received } from "./trial.ts";
import type { DocumentUpdates } from "./updates.ts";
import { Writes } from "./writes.ts";

export interface RoomNeeds {
  readonly updates: DocumentUpdates;
  readonly limits: Limits;
  /** Stored changes have been applied; `userId` is the last who made one. */
  changed(studyId: string, userId: string | null): void;
  /** The document has been loaded. */
  opened?(studyId: string): void;
  /** The last connection has gone, or a question was put to a room without people. */
  empty(room: Room): void;
  report(error: unknown): void;
}

/** One study: the document as stored, and everyone who has it open. */
export class Room {
  readonly studyId: string;
  readonly #needs: RoomNeeds;
  readonly #doc = new Y.Doc();
  readonly #connections = new Set<Connection>();
  readonly #presence: Presence;
  readonly #writes: Writes;
  #status: Uint8Array | undefined;
  #changedTimer: ReturnType<typeof setTimeout> | undefined;
  #changedBy: string | null = null;

  constructor(studyId: string, needs: RoomNeeds) {
    this.studyId = studyId;
    this.#needs = needs;
    const rows = needs.updates.load(studyId);
    this.#doc.transact(() => {
      for (const row of rows) Y.applyUpdate(this.#doc, row);
    });
    this.#presence = new Presence(needs.limits);
    this.#writes = new Writes({
      studyId,
      updates: needs.updates,
      limits: needs.limits,
      report: needs.report,
      storedState: () => Y.encodeStateAsUpdate(this.#doc),
      bytes: rows.reduce((sum, row) => sum + row.length, 0),
      rows: rows.length,
    });
  }

  get connections(): ReadonlySet<Connection> {
    return this.#connections;
  }

  /** Throws `SyncRefused` when the room, or the person's share of it, is full. */
  join(link: Link, person: { id: string; name: string }, role: Role): Connection {
    this.#checkPlaces(person.id);
    const present: PresentPerson = {
      id: person.id,
      name: person.name,
      role,
      colour: colourOf(person.id, this.#connections),
    };
    const connection = new Connection(link, present, this, this.#needs.limits);
    this.#connections.add(connection);
    this.#tellPeople();
    if (this.#status !== undefined) connection.send(this.#status);
    if (connection.mayWrite) connection.send(askFor(Y.encodeStateVector(this.#doc)));
    const everyone = this.#presence.everyone();
    if (everyone !== undefined) connection.send(presenceOf(everyone));
    return connection;
  }

  leave(connection: Connection): void {
    if (!this.#connections.delete(connection)) return;
    this.#tell(this.#presence.leave(connection), connection);
    this.#tellPeople();
    if (this.#connections.size === 0) this.#needs.empty(this);
  }

  answer(connection: Connection, stateVector: Uint8Array): void {
    let lacking: Uint8Array;
    try {
      lacking = Y.encodeStateAsUpdate(this.#doc, stateVector);
    } catch {
      throw malformed("The state vector cannot be read.");
    }
    connection.send(answerWith(lacking));
  }

  write(connection: Connection, update: Uint8Array): void {
    this.#writes.add({
      change: received(update),
      userId: connection.person.id,
      wanted: () => !connection.expelled,
      stored: (fresh) => {
        if (fresh === undefined) return connection.acknowledge();
        Y.applyUpdate(this.#doc, fresh);
        connection.acknowledge();
        this.#broadcast(updateOf(fresh), connection);
        this.#noteChange(connection.person.id);
      },
      refused: (refusal) => connection.expel(refusal),
    });
  }

  presence(connection: Connection, entries: Uint8Array): void {
    this.#tell(this.#presence.receive(connection, entries), connection);
  }

  /** A change made by the program itself; kept when it is on disk. */
  edit(change: (doc: Y.Doc) => void): Promise<void> {
    return new Promise((resolve, reject) => {
      this.#writes.add({
        change: (doc) => doc.transact(() => change(doc)),
        userId: null,
        wanted: () => true,
        stored: (fresh) => {
          if (fresh !== undefined) {
            Y.applyUpdate(this.#doc, fresh);
            this.#broadcast(updateOf(fresh));
            this.#noteChange(null);
          }
          resolve();
        },
        refused: reject,
      });
    });
  }

  sources(): CellSource[] {
    return readCells(this.#doc);
  }

  publish(status: unknown): void {
    this.#status = jsonMessage(MESSAGE.status, status);
    this.#broadcast(this.#status);
  }

  tellRemarks(): void {
    this.#broadcast(remarksChanged());
  }

  idle(): Promise<void> {
    return this.#writes.idle();
  }

  /** Only when idle and empty. */
  unload(): void {
    this.tellChanged();
    this.#writes.compact();
    this.#writes.destroy();
    this.#doc.destroy();
  }

  tellChanged(): void {
    if (this.#changedTimer === undefined) return;
    clearTimeout(this.#changedTimer);
    this.#changedTimer = undefined;
    this.#needs.changed(this.studyId, this.#changedBy);
  }

  #noteChange(userId: string | null): void {
    this.#changedBy = userId;
    this.#changedTimer ??= setTimeout(() => this.tellChanged(), this.#needs.limits.changedAfterMs);
  }

  #checkPlaces(personId: string): void {
    const own = [...this.#connections].filter(({ person }) => person.id === personId).length;
    const { connectionsOfPerson, connectionsOfStudy } = this.#needs.limits;
    if (own >= connectionsOfPerson) {
      throw new SyncRefused(CLOSE.tooMany, `You have this study open ${own} times; at most ${connectionsOfPerson}.`);
    }
    if (this.#connections.size >= connectionsOfStudy) {
      throw new SyncRefused(CLOSE.tooMany, `This study is open ${connectionsOfStudy} times, which is the most.`);
    }
  }

  #tell(entries: Uint8Array | undefined, except: Connection): void {
    if (entries !== undefined) this.#broadcast(presenceOf(entries), except);
  }

  #tellPeople(): void {
    const people = peopleIn(this.#connections);
    for (const connection of this.#connections) {
      connection.send(jsonMessage(MESSAGE.people, { you: connection.person, people }));
    }
  }

  #broadcast(message: Uint8Array, except?: Connection): void {
    for (const connection of this.#connections) if (connection !== except) connection.send(message);
  }
}
