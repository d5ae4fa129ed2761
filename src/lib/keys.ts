import { letterKeysAct } from "./preferences.ts";

interface Command {
  /** As `strokeOf` writes them; the first is the one that is taught. */
  readonly strokes: readonly string[];
  readonly does: string;
  /** Whether it changes the study, and is not offered to those who only read. */
  readonly changes?: boolean;
}

interface PlaceOfKeys {
  readonly where: string;
  readonly commands: Readonly<Record<string, Command>>;
}

const does = (strokes: string, what: string): Command => ({ strokes: strokes.split(" "), does: what });
const changes = (strokes: string, what: string): Command => ({ ...does(strokes, what), changes: true });

/**
 * Every command of the keyboard by the place where it acts. What handles keys asks this table, and the sheet that lists
 * them is written from it.
 */
export const KEYS = {
  anywhere: {
    where: "Anywhere in a study, outside a field",
    commands: {
      help: does("?", "shows these keys"),
      undo: changes("Ctrl+z", "takes back your last step, wherever it was"),
      redo: changes("Ctrl+Shift+z Ctrl+y", "does again what you took back"),
    },
  },
  study: {
    where: "On the study’s page",
    commands: {
      next: does("j", "goes to the next cell"),
      previous: does("k", "goes to the cell before"),
      open: does("Enter", "opens the cell in full"),
      swap: does("t", "swaps form and text"),
      fold: does("c", "folds the cell to a line, or unfolds it"),
      compare: does("b", "sets a system beside another"),
      remark: does("r", "begins a remark on the cell"),
      rename: changes("F2", "renames the cell"),
      duplicate: changes("d", "adds a copy of the cell below it"),
      moveUp: changes("Alt+ArrowUp", "moves the cell up"),
      moveDown: changes("Alt+ArrowDown", "moves the cell down"),
      remove: changes("Delete", "removes the cell; it can be brought back"),
      leave: does("Escape", "goes from a field back to its cell"),
    },
  },
  page: {
    where: "In an opened cell, or with two systems side by side",
    commands: { leave: does("Escape", "goes back to the study") },
  },
  thread: {
    where: "In the thread beside the cells",
    commands: {
      previous: does("ArrowUp", "goes to the cell before"),
      next: does("ArrowDown", "goes to the next cell"),
    },
  },
  matrix: {
    where: "In a matrix",
    commands: {
      up: does("ArrowUp", "points at the entry above"),
      down: does("ArrowDown", "points at the entry below"),
      left: does("ArrowLeft", "points at the entry to the left"),
      right: does("ArrowRight", "points at the entry to the right"),
      first: does("Home", "points at the first entry of the row"),
      last: does("End", "points at the last entry of the row"),
      corner: does("Ctrl+Home", "points at the first entry of all"),
      opposite: does("Ctrl+End", "points at the last entry of all"),
      mirror: does("m", "points at the mirror of the entry"),
    },
  },
  source: {
    where: "In a source shown as text",
    commands: {
      complete: does("Ctrl+Space", "offers keys, values, columns and names"),
      problems: does("Ctrl+Shift+m", "lists what is wrong"),
      nextProblem: does("F8", "goes to the next thing that is wrong"),
      leave: does("Escape", "goes back to the cell"),
    },
  },
  handle: {
    where: "On the handle of a good",
    commands: { up: changes("ArrowUp", "moves the good up"), down: changes("ArrowDown", "moves the good down") },
  },
  ruler: {
    where: "On the ruler of a price",
    commands: {
      more: does("ArrowRight ArrowUp", "tries a higher price"),
      less: does("ArrowLeft ArrowDown", "tries a lower price"),
      muchMore: does("Shift+ArrowRight Shift+ArrowUp", "tries five steps more"),
      muchLess: does("Shift+ArrowLeft Shift+ArrowDown", "tries five steps less"),
    },
  },
  field: {
    where: "In a field of a form, a name or a title",
    commands: {
      write: does("Enter", "writes what is typed"),
      giveUp: does("Escape", "gives up what is typed"),
    },
  },
  column: {
    where: "In a field that chooses a column",
    commands: {
      next: does("ArrowDown", "opens the list, then goes to the next column"),
      previous: does("ArrowUp", "goes to the column before"),
      choose: does("Enter", "chooses the column pointed at"),
      giveUp: does("Escape", "closes the list and leaves what was chosen"),
    },
  },
  remark: {
    where: "While writing a remark",
    commands: {
      write: does("Ctrl+Enter", "writes the remark"),
      giveUp: does("Escape", "puts the remark away"),
    },
  },
  menu: {
    where: "On a word that opens a list",
    commands: { open: does("ArrowDown", "opens the list at its first entry") },
  },
} as const satisfies Readonly<Record<string, PlaceOfKeys>>;

export type KeyPlace = keyof typeof KEYS;
export type KeyCommand<P extends KeyPlace> = keyof (typeof KEYS)[P]["commands"] & string;

/** The part of an event of the keyboard that is looked at. */
type Struck = Pick<KeyboardEvent, "key" | "ctrlKey" | "metaKey" | "altKey" | "shiftKey">;

/** A stroke in words: "Ctrl+Shift+z", "Alt+ArrowUp", "?". Command of a Mac does for Ctrl. */
function strokeOf({ key, ctrlKey, metaKey, altKey, shiftKey }: Struck): string {
  const isControlled = ctrlKey || metaKey;
  const isCharacter = key.length === 1 && key !== " ";
  // Shift belongs to the character itself: to "?" as to a capital letter.
  const isShifted = shiftKey && (!isCharacter || isControlled);
  const name = key === " " ? "Space" : isCharacter ? key.toLowerCase() : key;
  return [isControlled && "Ctrl", altKey && "Alt", isShifted && "Shift", name].filter(Boolean).join("+");
}

/** Which command of a place an event asks for; none of single characters while those are turned off. */
export function commandOf<P extends KeyPlace>(place: P, event: Struck): KeyCommand<P> | undefined {
  const stroke = strokeOf(event);
  if (isSingleCharacter(stroke) && !letterKeysAct()) return undefined;
  const commands: Readonly<Record<string, Command>> = KEYS[place].commands;
  const found = Object.entries(commands).find(([, { strokes }]) => strokes.includes(stroke));
  return found?.[0] as KeyCommand<P> | undefined;
}

/** A character without Ctrl or Alt: such keys can be turned off. */
export const isSingleCharacter = (stroke: string): boolean => [...stroke].length === 1;
