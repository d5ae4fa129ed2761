import * as Y from "yjs";
import { CLOSE } from "../../shared/schemas/sync.ts";
import type { CellEdit } from "../../shared/study/cell-edit.ts";
import { CellEdits } from "./cell-edits.ts";
import type { Limits } from "./limits.ts";
import { malformed, SyncRefused } from "./refused.ts";
import { checkNew } from "./shape.ts";

/** What is new in a change: the least update, and what it does to which cells. */
export interface Fresh {
  readonly update: Uint8Array;
  readonly edits: readonly CellEdit[];
}

/**
 * A scratch copy of a study's document on which a write is tried before it is stored. It runs ahead of
 * the document others read; after a refusal it is spoilt and is replaced by a fresh copy.
 */
export class TrialDocument {
  readonly #doc = new Y.Doc();
  readonly #edits: CellEdits;
  readonly #limits: Limits;

  constructor(stored: Uint8Array, limits: Limits) {
    this.#limits = limits;
    Y.applyUpdate(this.#doc, stored);
    this.#edits = new CellEdits(this.#doc);
  }

  /** Nothing when nothing is new in the change. Throws `SyncRefused`. */
  attempt(change: (doc: Y.Doc) => void): Fresh | undefined {
    const pieces: Uint8Array[] = [];
    const keep = (update: Uint8Array) => pieces.push(update);
    this.#doc.on("update", keep);
    try {
      change(this.#doc);
      if (this.#doc.store.pendingStructs !== null || this.#doc.store.pendingDs !== null) {
        throw new SyncRefused(CLOSE.missingEarlier, "This edit came without the ones it builds on.");
      }
      if (pieces.length === 0) return undefined;
      const fresh = pieces.length === 1 ? pieces[0] : Y.mergeUpdates(pieces);
      checkNew(this.#doc, fresh, this.#limits);
      return { update: fresh, edits: this.#edits.take() };
    } finally {
      this.#doc.off("update", keep);
    }
  }

  destroy(): void {
    this.#doc.destroy();
  }
}

/** A change that came over the wire. */
export function received(update: Uint8Array): (doc: Y.Doc) => void {
  return (doc) => {
    try {
      Y.applyUpdate(doc, update);
    } catch {
      throw malformed("The write cannot be read as an update.");
    }
  };
}
