import type { Locator, Page } from "playwright-core";
import { bandOf, eventually, wordsOf } from "./editing.ts";

/** Picks an entry of the study's own menu. */
export async function choose(page: Page, entry: string): Promise<void> {
  await page.getByRole("button", { name: "More", exact: true }).first().click();
  await page.getByRole("menuitem", { name: entry }).click();
}

/** Adds a cell of a kind at the end of the study; its band. */
export async function addCell(page: Page, kind: string, name: string): Promise<Locator> {
  await page.getByRole("listitem").getByRole("button", { name: kind, exact: true }).click();
  const band = bandOf(page, name);
  await band.waitFor();
  return band;
}

/** Replaces a line of a source, a key at a time, as a person would. */
export async function rewriteLine(editor: Locator, begins: string, words: string): Promise<void> {
  await editor.locator(".cm-line", { hasText: begins }).first().click();
  await editor.press("Home");
  await editor.press("Shift+End");
  await editor.pressSequentially(words, { delay: 5 });
}

/** The right page of a band: state, and finding or what stands in its place. */
export const findingOf = (page: Page, cell: string): Locator => bandOf(page, cell).locator(".recto");

/** Waits until a cell's right page says so much; what it says. */
export function untilSays(page: Page, cell: string, words: RegExp | string): Promise<string> {
  return eventually(
    () => wordsOf(findingOf(page, cell)),
    (said) => (typeof words === "string" ? said.includes(words) : words.test(said)),
    `${cell} says ${words}`,
  );
}

/** What the API answers with the page's own cookie. */
export async function fromApi<T>(page: Page, path: string): Promise<T> {
  const answer = await page.request.get(path);
  if (!answer.ok()) throw new Error(`${path} answers ${answer.status()}: ${await answer.text()}`);
  return (await answer.json()) as T;
}
