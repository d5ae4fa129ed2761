import type { Locator, Page } from "playwright-core";
import * as Y from "yjs";
import { openDatabase } from "../../server/db/client.ts";
import { loadUpdates } from "../../server/db/queries/documents.ts";
import { readCells } from "../../server/sync/index.ts";
import { CELL_KINDS } from "../../shared/schemas/cell.ts";
import { PATIENCE } from "./support.ts";

/** A cell's band: source on the left, finding on the right. */
export function bandOf(page: Page, cell: string): Locator {
  // The whole name and the kind: a copy is called after its cell.
  const name = new RegExp(`^${cell} (${CELL_KINDS.join("|")})$`);
  return page.locator("section.band", { has: page.getByRole("heading", { name }) });
}

/** Shows the cell's source as text; the editor. */
export async function openText(page: Page, cell: string): Promise<Locator> {
  await bandOf(page, cell).getByRole("button", { name: "Text", exact: true }).click();
  const editor = page.locator(`.cm-content[aria-label="Source of ${cell}"]`);
  await editor.waitFor();
  return editor;
}

/** What the editor holds, without the carets of others drawn into it. */
export function textIn(editor: Locator): Promise<string> {
  return editor.evaluate((element) => {
    const copy = element.cloneNode(true) as HTMLElement;
    for (const caret of copy.querySelectorAll(".cm-ySelectionCaret, .cm-widgetBuffer")) caret.remove();
    return [...copy.querySelectorAll(".cm-line")].map((line) => line.textContent).join("\n");
  });
}

/** Types at the start or the end of the source, a key at a time. */
export async function typeAt(end: "start" | "end", editor: Locator, words: string, delay = 12): Promise<void> {
  await editor.focus();
  await editor.press(end === "start" ? "Control+Home" : "Control+End");
  await editor.pressSequentially(words, { delay });
}

export async function wordsOf(locator: Locator): Promise<string> {
  return (await locator.textContent()) ?? "";
}

export const savedState = (page: Page): Locator => page.locator(".saved");

/** Waits until something holds; fails with what is there instead. */
export async function eventually<T>(
  look: () => Promise<T> | T,
  holds: (seen: T) => boolean,
  words: string,
): Promise<T> {
  const end = Date.now() + PATIENCE;
  for (;;) {
    const seen = await look();
    if (holds(seen)) return seen;
    if (Date.now() > end) throw new Error(`Waited in vain: ${words}. There is: ${JSON.stringify(seen)}`);
    await new Promise((later) => setTimeout(later, 40));
  }
}

/** The document as the file has it. */
export function documentInFile(database: string, studyId: string): Y.Doc {
  const open = openDatabase(database);
  const doc = new Y.Doc();
  for (const row of loadUpdates(open.db, studyId)) Y.applyUpdate(doc, row);
  open.close();
  return doc;
}

/** A cell's source as the file has it. */
export function sourceInFile(database: string, studyId: string, cell: string): string {
  const found = readCells(documentInFile(database, studyId)).find(({ name }) => name === cell);
  if (found === undefined) throw new Error(`There is no cell ${cell} in the file.`);
  return found.source;
}
