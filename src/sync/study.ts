import { Awareness } from "y-protocols/awareness";
import type { WebsocketProvider } from "y-websocket";
import * as Y from "yjs";
import type { Account, Role } from "../../shared/schemas/resources.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import {
  addCell,
  cellsOf,
  listCells,
  moveCell,
  removeCell,
  renameCell,
  replaceSource,
  restoreCell,
  returnToCells,
  sourceOf,
} from "./cells.ts";
import { EditLedger } from "./edit-ledger.ts";
import { type Keeping, keepInBrowser } from "./keeping.ts";
import { openLine } from "./line.ts";
import { type Doing, OwnEdits } from "./own-edits.ts";
import { whereabouts } from "./people.ts";
import { emptySnapshot, Observed, type StudySnapshot } from "./snapshot.ts";

export interface OpenOptions {
  readonly server?: string;
  readonly WebSocket?: typeof WebSocket;
  /** Where edits are kept meanwhile; null keeps nothing. */
  readonly keeping?: ((doc: Y.Doc) => Keeping) | null;
  readonly now?: () => number;
}

const TYPING_MS = 3_000;

/** One study open in one window: its document, the line to the server, and what the page shows of both. */
export class StudyConnection {
  readonly studyId: string;
  readonly doc = new Y.Doc();
  readonly awareness = new Awareness(this.doc);
  /** This person's own steps in this window; others' are never among them. */
  readonly undo: Y.UndoManager;
  readonly #own: OwnEdits;
  readonly #ledger = new EditLedger();
  readonly #observed: Observed<StudySnapshot>;
  readonly #keeping: Keeping | null;
  readonly #line: WebsocketProvider;
  #typing: ReturnType<typeof setTimeout> | undefined;
  #closed = false;

  constructor(studyId: string, account: Pick<Account, "id">, role: Role, options: OpenOptions = {}) {
    const reads = role === "reader";
    this.studyId = studyId;
    this.#observed = new Observed(emptySnapshot(reads));
    this.#own = new OwnEdits(this.doc, this);
    this.undo = this.#own.manager;
    // Before line and keeping listen, so that an edit is counted before it is sent or kept.
    this.doc.on("update", (_update: Uint8Array, origin: unknown) => this.#updated(origin));
    cellsOf(this.doc).observeDeep(() => {
      const cells = listCells(this.doc, this.snapshot().cells);
      this.#own.noteNames(cells);
      this.#observed.set({ cells });
    });
    const keeping =
      options.keeping === undefined ? (doc: Y.Doc) => keepInBrowser(account.id, studyId, doc) : options.keeping;
    this.#keeping = reads || keeping === null ? null : keeping(this.doc);
    this.#line = openLine({
      studyId,
      doc: this.doc,
      awareness: this.awareness,
      ledger: this.#ledger,
      snapshot: this.#observed,
      acknowledged: () => this.#tellStored(),
      now: options.now ?? Date.now,
      server: options.server,
      WebSocket: options.WebSocket,
    });
    this.awareness.on("change", () => this.#noteWhereabouts());
    if (reads) this.awareness.setLocalState(null);
    void this.#begin();
  }

  /** The latest; the same object until something changes. */
  readonly snapshot = () => this.#observed.get();

  /** Calls the listener after every change of the snapshot; returns how to stop. */
  readonly subscribe = (listener: () => void): (() => void) => this.#observed.subscribe(listener);

  /** Adds a cell after the one named, first (null) or last; returns its id. */
  addCell(cell: Pick<CellSource, "name" | "kind" | "source">, after?: string | null): string {
    return this.#change("adding", () => addCell(this.doc, cell, after));
  }

  renameCell(cellId: string, name: string): void {
    this.#change("renaming", () => renameCell(this.doc, cellId, name));
  }

  /** Puts a cell after another, or first. */
  moveCell(cellId: string, after: string | null): void {
    this.#change("moving", () => moveCell(this.doc, cellId, after));
  }

  removeCell(cellId: string): void {
    this.#change("removing", () => removeCell(this.doc, cellId));
  }

  /** The live text of a cell's source, for the editor. */
  sourceOf(cellId: string): Y.Text | undefined {
    return sourceOf(this.doc, cellId);
  }

  /** Turns a cell's source into another text as one change. */
  replaceSource(cellId: string, next: string): void {
    this.#change("changing", () => replaceSource(this.doc, cellId, next));
  }

  /** Several changes as one step; `object` is what it was done to, where that is not a cell. */
  atOnce<T>(doing: Doing, change: () => T, object?: string): T {
    return this.#change(doing, change, object);
  }

  /** Turns the study into a state it was in, as one step; cells keep their ids. `name` is what the state is called. */
  returnTo(cells: readonly CellSource[], name: string): void {
    this.#change("returning to", () => returnToCells(this.doc, cells), name);
  }

  /** Gives a cell the source it had; one that is gone comes back whole, under its id. */
  bringBack(cell: CellSource): void {
    this.#change("bringing back", () => {
      if (this.sourceOf(cell.id) === undefined) restoreCell(this.doc, cell);
      else replaceSource(this.doc, cell.id, cell.source);
    });
  }

  /** Undoes this person's last step, in the whole study or in one cell, and says so. */
  undoStep(cellId?: string): void {
    if (!this.snapshot().readOnly) this.#observed.set({ undone: this.#own.undo(cellId) });
  }

  redoStep(cellId?: string): void {
    if (!this.snapshot().readOnly) this.#observed.set({ undone: this.#own.redo(cellId) });
  }

  /** Tells the others which cell this person is in. */
  goTo(cellId: string | null): void {
    this.awareness.setLocalStateField("cell", cellId);
  }

  /** Asks again after a refusal. */
  retry(): void {
    this.#observed.set({ connection: { state: "connecting" } });
    this.#line.connect();
  }

  async close(): Promise<void> {
    if (this.#closed) return;
    this.#closed = true;
    clearTimeout(this.#typing);
    listenToWindow("remove", "beforeunload", warnOnLeaving);
    listenToWindow("remove", "offline", this.#networkLost);
    listenToWindow("remove", "online", this.#networkBack);
    this.#own.destroy();
    this.#line.destroy();
    await this.#keeping?.close();
    this.awareness.destroy();
    this.doc.destroy();
  }

  /** What an earlier visit left is taken up first, so that the first answer to the server holds it. */
  async #begin(): Promise<void> {
    this.#ledger.found((await this.#keeping?.loaded) ?? 0);
    if (this.#closed) return;
    if (cellsOf(this.doc).size > 0) this.#observed.set({ loaded: true });
    this.#tellStored();
    listenToWindow("add", "offline", this.#networkLost);
    listenToWindow("add", "online", this.#networkBack);
    this.#line.connect();
  }

  #updated(origin: unknown): void {
    if (origin === this.#line || this.#keeping?.brought(origin)) return;
    this.#ledger.edited();
    this.#tellStored();
    this.#nowTyping();
  }

  #tellStored(): void {
    const { connection, stored: before } = this.snapshot();
    const stored = { everything: this.#ledger.everythingStored, unstored: this.#ledger.unstored };
    if (stored.unstored === before.unstored && stored.everything === before.everything) return;
    if (stored.unstored !== before.unstored) {
      this.#keeping?.note(stored.unstored);
      listenToWindow(stored.unstored > 0 ? "add" : "remove", "beforeunload", warnOnLeaving);
    }
    const alone = connection.state === "working alone";
    this.#observed.set({ stored, ...(alone && { connection: { ...connection, editsKept: stored.unstored } }) });
  }

  #nowTyping(): void {
    const local = this.awareness.getLocalState();
    if (local === null) return;
    clearTimeout(this.#typing);
    if (local.typing !== true) this.awareness.setLocalStateField("typing", true);
    this.#typing = setTimeout(() => this.awareness.setLocalStateField("typing", false), TYPING_MS);
  }

  #noteWhereabouts(): void {
    const before = this.snapshot().whereabouts;
    const now = whereabouts(this.awareness, before);
    if (now !== before) this.#observed.set({ whereabouts: now });
  }

  /** Each is one step of undoing, apart from the typing before and after it. */
  #change<T>(doing: Doing, change: () => T, object?: string): T {
    if (this.snapshot().readOnly) throw new Error("A reader cannot change the study.");
    return this.#own.step(doing, change, object);
  }

  /** The browser knows at once, the socket only after half a minute. Asking goes on: the server may be on this machine. */
  readonly #networkLost = (): void => {
    if (this.snapshot().connection.state === "refused") return;
    this.#line.disconnect();
    this.#line.connect();
  };

  readonly #networkBack = (): void => {
    if (this.snapshot().connection.state === "working alone") this.#line.connect();
  };
}

/** Opens a study; close it with `close`. */
export function openStudy(
  studyId: string,
  account: Pick<Account, "id">,
  role: Role,
  options?: OpenOptions,
): StudyConnection {
  return new StudyConnection(studyId, account, role, options);
}

function warnOnLeaving(event: Event): void {
  event.preventDefault();
}

/** There is no window in a test without a page. */
function listenToWindow(how: "add" | "remove", type: string, listener: (event: Event) => void): void {
  if (typeof window === "undefined") return;
  if (how === "add") window.addEventListener(type, listener);
  else window.removeEventListener(type, listener);
}
