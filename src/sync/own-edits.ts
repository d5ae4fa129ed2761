import * as Y from "yjs";
import { listWords } from "../../shared/study/words.ts";
import { cellsOf } from "./cells.ts";

/** What a person did, as *Undone: …* goes on. */
export type Doing =
  | "adding"
  | "removing"
  | "renaming"
  | "moving"
  | "changing"
  | "typing in"
  | "bringing back"
  | "returning to";

/** What undoing or redoing came to. */
export interface Undone {
  readonly sentence: string;
  /** Whether it can be taken back by the other of the two. */
  readonly again?: "undo" | "redo";
  /** The cell it was done in, when there is one and it is there. */
  readonly cellId?: string;
}

/** What one step did, kept with it on the stack. */
interface Did {
  readonly doing: Doing;
  /** Beside the cells' names: what was returned to. */
  readonly object?: string;
  /** Names by cell id. */
  readonly cells: Map<string, string>;
  readonly added: Set<string>;
  readonly removed: Set<string>;
}

type Stack = Y.UndoManager["undoStack"];
type Step = Stack[number];
type Direction = "undo" | "redo";

const DID = "did";
const DONE: Record<Direction, string> = { undo: "Undone", redo: "Done again" };

/**
 * The steps of one person in one window, and the way back over them. Steps are shared by the whole study, so that a cell's
 * text and form, adding, moving and removing come back in the order they were done; within a cell only its own steps do.
 * Others' edits are no steps and are never touched: a step that would take others' words along is refused.
 */
export class OwnEdits {
  readonly manager: Y.UndoManager;
  readonly #doc: Y.Doc;
  readonly #origin: unknown;
  readonly #names = new Map<string, string>();
  #doing: Pick<Did, "doing" | "object"> | undefined;

  constructor(doc: Y.Doc, origin: unknown) {
    this.#doc = doc;
    this.#origin = origin;
    this.manager = new Y.UndoManager(cellsOf(doc), { trackedOrigins: new Set([origin]) });
    this.manager.on("stack-item-added", (event) => this.#note(event));
    this.manager.on("stack-item-updated", (event) => this.#note(event));
  }

  /** Names outlive their cells, so that it can be said what was removed. */
  noteNames(cells: readonly { readonly id: string; readonly name: string }[]): void {
    for (const { id, name } of cells) this.#names.set(id, name);
  }

  /** One step, apart from the typing before and after it; what is done within it belongs to it. */
  step<T>(doing: Doing, change: () => T, object?: string): T {
    if (this.#doing !== undefined) return change();
    this.#doing = { doing, ...(object !== undefined && { object }) };
    this.manager.stopCapturing();
    try {
      return this.#doc.transact(change, this.#origin);
    } finally {
      this.manager.stopCapturing();
      this.#doing = undefined;
    }
  }

  undo = (cellId?: string): Undone => this.#go("undo", cellId);
  redo = (cellId?: string): Undone => this.#go("redo", cellId);

  destroy(): void {
    this.manager.destroy();
  }

  #go(direction: Direction, cellId: string | undefined): Undone {
    const stack = direction === "undo" ? this.manager.undoStack : this.manager.redoStack;
    if (cellId !== undefined) bringUp(stack, cellId);
    const top = stack.at(-1);
    if (top === undefined || (cellId !== undefined && !belongsIn(top, cellId))) return { sentence: NOTHING[direction] };
    const losing = this.#wouldLose(top, direction);
    if (losing.length > 0) {
      stack.pop();
      return {
        sentence: `${listWords(losing)} ${losing.length === 1 ? "holds" : "hold"} the words of others by now: ${WORDS_OF_OTHERS}`,
      };
    }
    const step = direction === "undo" ? this.manager.undo() : this.manager.redo();
    const did = step && didOf(step);
    if (!did) return { sentence: NOTHING[direction] };
    const back = direction === "undo" ? "redo" : "undo";
    (back === "redo" ? this.manager.redoStack : this.manager.undoStack).at(-1)?.meta.set(DID, did);
    const there = [...did.cells.keys()].filter((id) => cellsOf(this.#doc).has(id));
    return {
      sentence: `${DONE[direction]}: ${inWords(did)}.`,
      again: back,
      ...(there.length === 1 && { cellId: there[0] }),
    };
  }

  /** Names of the cells that would go and hold what others wrote. */
  #wouldLose(step: Step, direction: Direction): string[] {
    const did = didOf(step);
    const going = did === undefined ? [] : [...(direction === "undo" ? did.added : did.removed)];
    return going.filter((id) => this.#holdsOthersWords(id)).map((id) => this.#names.get(id) ?? id);
  }

  #holdsOthersWords(cellId: string): boolean {
    const entry = cellsOf(this.#doc).get(cellId);
    if (!(entry instanceof Y.Map)) return false;
    const isOthers = (item: Y.Item) => !item.deleted && item.id.client !== this.#doc.clientID;
    if ([...entry._map.values()].some(isOthers)) return true;
    const source = entry.get("source");
    for (let item = source instanceof Y.Text ? source._start : null; item !== null; item = item.right) {
      if (isOthers(item)) return true;
    }
    return false;
  }

  #note({ stackItem, origin, changedParentTypes }: StepEvent): void {
    const doing = origin === this.#origin ? this.#doing : undefined;
    const did = didOf(stackItem) ?? {
      ...(doing ?? { doing: "typing in" as const }),
      cells: new Map(),
      added: new Set(),
      removed: new Set(),
    };
    stackItem.meta.set(DID, did);
    const cells = cellsOf(this.#doc);
    for (const event of changedParentTypes.get(cells) ?? []) {
      const inside = cellAround(event.target, cells);
      if (inside !== undefined) this.#noteCell(did, inside);
      else {
        event.changes.keys.forEach(({ action }, id) => {
          this.#noteCell(did, id);
          if (action === "add") did.added.add(id);
          if (action === "delete") did.removed.add(id);
        });
      }
    }
  }

  #noteCell(did: Did, cellId: string): void {
    if (!did.cells.has(cellId)) did.cells.set(cellId, this.#names.get(cellId) ?? "a cell");
  }
}

/** The cell a changed part belongs to; none for the map of cells itself. Events name their path to observers only. */
function cellAround(part: Y.AbstractType<unknown>, cells: Y.Map<unknown>): string | undefined {
  for (let item = part._item; item !== null; ) {
    const { parent } = item;
    if (parent === cells) return item.parentSub ?? undefined;
    item = parent instanceof Y.AbstractType ? parent._item : null;
  }
  return undefined;
}

interface StepEvent {
  readonly stackItem: Step;
  readonly origin: unknown;
  // biome-ignore lint/suspicious/noExplicitAny: as Yjs types it
  readonly changedParentTypes: Map<Y.AbstractType<any>, Y.YEvent<any>[]>;
}

const NOTHING: Record<Direction, string> = {
  undo: "There is nothing of yours left to undo here.",
  redo: "There is nothing to do again here.",
};
const WORDS_OF_OTHERS = "it stays. Remove it yourself if that is meant.";

const didOf = (step: Step): Did | undefined => step.meta.get(DID);

/** A cell's own way back does not end in the cell's going. */
function belongsIn(step: Step, cellId: string): boolean {
  const did = didOf(step);
  return did?.cells.has(cellId) === true && !did.added.has(cellId) && !did.removed.has(cellId);
}

/** The latest step in a cell is put on top: steps are undone by what they did, in any order. */
function bringUp(stack: Stack, cellId: string): void {
  const place = stack.findLastIndex((step) => belongsIn(step, cellId));
  if (place >= 0) stack.push(...stack.splice(place, 1));
}

const MOST_NAMED = 3;

function inWords({ doing, object, cells }: Did): string {
  const names = [...cells.values()];
  if (object !== undefined) return `${doing} ${object}`;
  // Cells that follow a new name are not what the person renamed.
  if (doing === "renaming") return `${doing} ${names[0]}`;
  return `${doing} ${names.length > MOST_NAMED ? `${names.length} cells` : listWords(names)}`;
}
