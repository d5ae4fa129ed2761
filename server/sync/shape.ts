import { generateKeyBetween } from "fractional-indexing";
import * as Y from "yjs";
import { CELLS } from "./document.ts";
import type { Limits } from "./limits.ts";
import { malformed, tooLarge } from "./refused.ts";

/** Longest value of each word of a cell, in characters. */
const WORDS: Record<string, number> = { name: 200, kind: 40, order: 200 };
const LONGEST_ID = 64;

/**
 * Checks what an update has just put into the document: cells under `cells`, their three words and a plain
 * text each. Throws otherwise; the document is then no longer to be used. Looks only at what is new, so the cost is
 * the update's and not the document's.
 */
export function checkNew(doc: Y.Doc, update: Uint8Array, limits: Limits): void {
  const cells = doc.getMap(CELLS);
  for (const struct of Y.decodeUpdate(update).structs) {
    if (!(struct instanceof Y.Item)) continue;
    for (const item of itemsOf(doc, struct.id, struct.length)) checkItem(item, cells, limits);
  }
  if (doc.share.size > 1) throw malformed(`The document has no other root than ${CELLS}.`);
  if (cells.size > limits.cells) throw tooLarge(`The study would have ${cells.size} cells; at most ${limits.cells}.`);
}

/** The items that hold a run of clocks now: applying an update may have split or joined what it brought. */
function* itemsOf(doc: Y.Doc, from: Y.ID, length: number): Generator<Y.Item> {
  let clock = from.clock;
  while (clock < from.clock + length) {
    const struct = Y.getItem(doc.store, Y.createID(from.client, clock)) as Y.Item | Y.GC;
    if (struct instanceof Y.Item && !struct.deleted) yield struct;
    clock = struct.id.clock + struct.length;
  }
}

function checkItem(item: Y.Item, cells: Y.Map<unknown>, limits: Limits): void {
  const parent = item.parent;
  if (parent === cells) checkCell(item, item.parentSub);
  else if (isCell(parent, cells)) checkEntry(item, item.parentSub, limits);
  else if (parent instanceof Y.Text && isCell(parent._item?.parent, cells)) checkText(item, parent, limits);
  else throw malformed("The write holds something that belongs to no cell.");
}

function isCell(type: unknown, cells: Y.Map<unknown>): type is Y.Map<unknown> {
  return type instanceof Y.Map && type._item?.parent === cells;
}

function checkCell(item: Y.Item, id: string | null): void {
  if (id === null || id.length === 0 || id.length > LONGEST_ID) {
    throw malformed(`A cell's id has 1 to ${LONGEST_ID} characters; this one has ${id?.length ?? 0}.`);
  }
  const { content } = item;
  if (!(content instanceof Y.ContentType && content.type instanceof Y.Map)) {
    throw malformed(`Under ${CELLS} there are cells only, and ${id} is none.`);
  }
}

function checkEntry(item: Y.Item, key: string | null, limits: Limits): void {
  const { content } = item;
  if (key === "source") {
    if (!(content instanceof Y.ContentType && content.type instanceof Y.Text)) throw malformed("A source is a text.");
    if (content.type.length > limits.source) throw sourceTooLong(content.type, limits);
    return;
  }
  const longest = key === null ? undefined : Object.hasOwn(WORDS, key) ? WORDS[key] : undefined;
  if (longest === undefined) throw malformed(`A cell has no ${key ?? "list"}.`);
  const value: unknown = content instanceof Y.ContentAny && content.arr.length === 1 ? content.arr[0] : undefined;
  if (typeof value !== "string") throw malformed(`A cell's ${key} is a word.`);
  if (value.length > longest) {
    throw tooLarge(`A cell's ${key} has at most ${longest} characters; this one has ${value.length}.`);
  }
  if (key === "order" && !isOrderKey(value)) throw malformed("A cell's order is a fractional key.");
}

/** One that is not would keep everyone from adding a cell after it. */
function isOrderKey(value: string): boolean {
  try {
    return generateKeyBetween(value, null) > value;
  } catch {
    return false;
  }
}

function checkText(item: Y.Item, text: Y.Text, limits: Limits): void {
  if (!(item.content instanceof Y.ContentString) || item.parentSub !== null) {
    throw malformed("A source holds characters only.");
  }
  if (text.length > limits.source) throw sourceTooLong(text, limits);
}

const sourceTooLong = (text: Y.Text, limits: Limits) =>
  tooLarge(`A source has at most ${limits.source} characters; this one would have ${text.length}.`);
