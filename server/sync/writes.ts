import type * as Y from "yjs";
import { CLOSE } from "../../shared/schemas/sync.ts";
import type { Limits } from "./limits.ts";
import { SyncRefused, tooLarge } from "./refused.ts";
import { type Fresh, TrialDocument } from "./trial.ts";
import type { DocumentUpdates, NewUpdate } from "./updates.ts";

/** A change waiting to be stored, and who is to be told how it went. */
export interface Write {
  readonly change: (doc: Y.Doc) => void;
  readonly userId: string | null;
  /** Asked when its turn has come: a person removed meanwhile writes nothing any more. */
  wanted(): boolean;
  /** On disk; `fresh` is what was new in it. */
  stored(fresh: Uint8Array | undefined): void;
  refused(refusal: SyncRefused): void;
}

interface Tried {
  readonly write: Write;
  readonly fresh: Fresh | undefined;
}

/**
 * The writes of one study, one after the other: tried, written to disk, then told. What waits at the same moment is written
 * together, so that many people cost one flush of the disk.
 */
export class Writes {
  readonly #studyId: string;
  readonly #updates: DocumentUpdates;
  readonly #limits: Limits;
  readonly #report: (error: unknown) => void;
  readonly #storedState: () => Uint8Array;
  readonly #waiting: Write[] = [];
  #trial: TrialDocument;
  #running: Promise<void> | undefined;
  #bytes: number;
  #rows: number;
  /** The scratch copy holds a refused write on top of those about to be stored. */
  #spoilt = false;

  constructor(given: {
    studyId: string;
    updates: DocumentUpdates;
    limits: Limits;
    report: (error: unknown) => void;
    /** The document others read, as one update. */
    storedState: () => Uint8Array;
    bytes: number;
    rows: number;
  }) {
    this.#studyId = given.studyId;
    this.#updates = given.updates;
    this.#limits = given.limits;
    this.#report = given.report;
    this.#storedState = given.storedState;
    this.#bytes = given.bytes;
    this.#rows = given.rows;
    this.#trial = new TrialDocument(this.#storedState(), this.#limits);
    if (this.#rows > this.#limits.rows) this.compact();
  }

  add(write: Write): void {
    this.#waiting.push(write);
    this.#running ??= this.#run();
  }

  /** When nothing waits. */
  async idle(): Promise<void> {
    while (this.#running !== undefined) await this.#running;
  }

  compact(): void {
    if (this.#rows < 2 || this.#updates.compact === undefined) return;
    try {
      this.#updates.compact(this.#studyId);
      this.#bytes = this.#storedState().length;
      this.#rows = 1;
    } catch (error) {
      // The rows are as they were, and say the same.
      this.#report(error);
    }
  }

  destroy(): void {
    this.#trial.destroy();
  }

  async #run(): Promise<void> {
    // Whatever else has arrived in this turn of the loop is written in the same transaction.
    await new Promise((resolve) => setImmediate(resolve));
    while (this.#waiting.length > 0) {
      const tried = this.#tryAll(this.#waiting.splice(0));
      await this.#storeAll(tried);
      if (this.#rows > this.#limits.rows) this.compact();
    }
    this.#running = undefined;
  }

  /** A refused one spoils the scratch copy for those tried before it and not yet stored: these end the batch. */
  #tryAll(writes: Write[]): Tried[] {
    const tried: Tried[] = [];
    for (const [index, write] of writes.entries()) {
      if (!write.wanted()) continue;
      try {
        tried.push({ write, fresh: this.#attempt(write) });
      } catch (error) {
        if (tried.length > 0) {
          this.#waiting.unshift(...writes.slice(index));
          this.#spoilt = true;
          return tried;
        }
        this.#resetTrial();
        write.refused(this.#asRefusal(error));
      }
    }
    return tried;
  }

  #attempt(write: Write): Fresh | undefined {
    const fresh = this.#trial.attempt(write.change);
    if (fresh !== undefined && this.#bytes + fresh.update.length > this.#limits.document) {
      this.compact();
      if (this.#bytes + fresh.update.length > this.#limits.document) {
        throw tooLarge(`The study has ${this.#bytes} bytes; at most ${this.#limits.document}.`);
      }
    }
    return fresh;
  }

  async #storeAll(tried: Tried[]): Promise<void> {
    const rows = tried.flatMap(({ write, fresh }) => (fresh === undefined ? [] : [{ ...fresh, userId: write.userId }]));
    try {
      await this.#append(rows);
    } catch (error) {
      this.#report(error);
      this.#resetTrial();
      const refusal = new SyncRefused(CLOSE.notStored, "The edit could not be stored; it is kept and sent again.");
      for (const { write } of tried) write.refused(refusal);
      return;
    }
    for (const row of rows) this.#bytes += row.update.length;
    this.#rows += rows.length;
    for (const { write, fresh } of tried) this.#tell(write, fresh?.update);
    if (this.#spoilt) this.#resetTrial();
  }

  /** One listener that fails must not keep the rest of the study from being stored. */
  #tell(write: Write, fresh: Uint8Array | undefined): void {
    try {
      write.stored(fresh);
    } catch (error) {
      this.#report(error);
    }
  }

  async #append(rows: readonly NewUpdate[]): Promise<void> {
    if (rows.length > 1 && this.#updates.appendAll !== undefined) {
      this.#updates.appendAll(this.#studyId, rows);
      return;
    }
    for (const { update, userId, edits } of rows) {
      await this.#updates.append(this.#studyId, update, userId, edits);
    }
  }

  #resetTrial(): void {
    this.#trial.destroy();
    this.#trial = new TrialDocument(this.#storedState(), this.#limits);
    this.#spoilt = false;
  }

  #asRefusal(error: unknown): SyncRefused {
    if (error instanceof SyncRefused) return error;
    this.#report(error);
    return new SyncRefused(CLOSE.malformed, "The write could not be read.");
  }
}
