import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import * as Y from "yjs";
import { answerWith, presenceOf, updateOf } from "../../server/sync/messages.ts";
import {
  bandOf,
  documentInFile,
  eventually,
  openText,
  savedState,
  sourceInFile,
  textIn,
  typeAt,
  wordsOf,
} from "./editing.ts";
import { demoStudyId, ILSE, openBrowser, PETRA, Product, signIn } from "./support.ts";

const CELL = "survey";

let product: Product;
let browser: Browser;
let studyId: string;
let ilse: Page;
let petra: Page;
let ilseText: Locator;
let petraText: Locator;

const file = () => sourceInFile(product.database, studyId, CELL);
const isSaved = (page: Page) =>
  eventually(
    () => wordsOf(savedState(page)),
    (words) => /^Saved/.test(words),
    "saved",
  );

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  ilse = await signIn(browser, product, ILSE);
  petra = await signIn(browser, product, PETRA);
  studyId = await demoStudyId(ilse);
  for (const page of [ilse, petra]) await page.goto(`/studies/${studyId}`);
  [ilseText, petraText] = [await openText(ilse, CELL), await openText(petra, CELL)];
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

it("a reader sees edits and carets as they come, and the finding", async () => {
  await typeAt("start", ilseText, "# seen while it is written: ");
  await eventually(
    () => textIn(petraText),
    (text) => text.startsWith("# seen while it is written: "),
    "the edit",
  );
  await eventually(
    () => petraText.locator(".cm-ySelectionInfo").allTextContents(),
    (flags) => flags.includes("Ilse"),
    "her caret",
  );
  await eventually(
    () => wordsOf(bandOf(petra, CELL).locator(".recto")),
    (words) => words.includes("Current"),
    "the finding",
  );
  const here = () => wordsOf(ilse.getByRole("list", { name: "People here" }));
  await eventually(here, (words) => /Petra Vance.* reading/.test(words), "the reader is named");
});

it("a reader's page offers nothing to write with", async () => {
  const before = file();
  expect(await petraText.getAttribute("contenteditable")).toBe("false");
  await petraText.click();
  // In a source that she cannot write in, letters are commands, as beside it; none of these is one.
  await petra.keyboard.type("unseen");
  expect(await petra.getByRole("heading", { name: "Add a cell" }).count()).toBe(0);
  expect(await wordsOf(savedState(petra))).toBe("Reading along");
  await typeAt("end", ilseText, "# goes on");
  await eventually(
    () => textIn(petraText),
    (text) => text.endsWith("# goes on"),
    "the edit",
  );
  expect(await textIn(petraText)).not.toContain("unseen");
  await isSaved(ilse);
  expect(file()).toBe(`${before}# goes on`);
});

it("what a reader's browser sends by a socket of its own changes nothing for anyone", async () => {
  await isSaved(ilse);
  const [before, shown] = [file(), await textIn(ilseText)];
  const forged = documentInFile(product.database, studyId);
  for (const cell of forged.getMap<Y.Map<unknown>>("cells").values()) {
    (cell.get("source") as Y.Text).insert(0, "forged ");
    cell.set("name", "forged");
  }
  const update = Y.encodeStateAsUpdate(forged);
  const presence = presenceOf(new Uint8Array([1, 5, 9, 2, 123, 125]));
  const messages = [updateOf(update), answerWith(update), presence].map((message) => [...message]);
  const end = await petra.evaluate(
    ([id, bytes]) =>
      new Promise<string>((done) => {
        const socket = new WebSocket(`${window.location.origin.replace("http", "ws")}/sync/${id}`);
        socket.binaryType = "arraybuffer";
        let answered = 0;
        socket.onopen = () => {
          for (const message of bytes) socket.send(new Uint8Array(message));
          // A question at the end: once it is answered, all before it has been taken.
          socket.send(new Uint8Array([0, 0, 1, 0]));
        };
        socket.onmessage = ({ data }) => {
          const [type, kind] = new Uint8Array(data as ArrayBuffer);
          if (type === 0 && kind === 0) answered = -1_000;
          if (type === 0 && kind === 1) done(answered < 0 ? "asked" : "answered");
        };
        socket.onclose = ({ code }) => done(`closed ${code}`);
      }),
    [studyId, messages] as const,
  );
  expect(end).toBe("answered");
  await typeAt("end", ilseText, ".");
  await isSaved(ilse);
  expect(file()).toBe(`${before}.`);
  expect(await textIn(ilseText)).toBe(`${shown}.`);
  expect(await textIn(petraText)).not.toContain("forged");
});

it("a reader tries a price in her own browser, and keeps nothing", async () => {
  const levy = () => sourceInFile(product.database, studyId, "levy");
  const before = levy();
  await petra.getByRole("link", { name: "Open of levy" }).click();
  const ruler = petra.getByRole("slider", { name: "Meat & fish" });
  await ruler.focus();
  await petra.keyboard.press("Shift+ArrowRight");
  await petra.getByText(/Meat & fish 5\.0.% dearer/).waitFor();
  await petra.getByText("Trying out, not stored", { exact: true }).waitFor();
  await petra.getByText(/^Answered in this browser/).waitFor();
  expect(await petra.getByRole("button", { name: "Keep this price change" }).count()).toBe(0);
  expect(levy()).toBe(before);
  await petra.getByRole("link", { name: "Back to the study" }).click();
  await bandOf(petra, CELL).waitFor();
});

it("the interface over HTTP refuses a reader's changes", async () => {
  const headers = { origin: product.origin };
  const answer = await petra.request.patch(`/api/studies/${studyId}`, { data: { title: "Mine" }, headers });
  expect(answer.status()).toBe(403);
});

it("a reader remarks on a cell, which the owner sees at once, and still writes nothing", async () => {
  const before = file();
  const cell = "linear";
  const remarks = (page: Page) => page.getByRole("region", { name: `Remarks on ${cell}` });
  // The page she came back to is open to remarks once it has its connection.
  await savedState(petra).filter({ hasText: "Reading along" }).waitFor();
  await remarks(petra)
    .getByRole("button", { name: `Add a remark on ${cell}` })
    .click();
  await petra
    .getByRole("textbox", { name: `Remark on ${cell}` })
    .fill("Why this index? See https://vihe.example/indices.");
  await remarks(petra).getByLabel("About").selectOption({ label: "index" });
  await remarks(petra).getByRole("button", { name: "Add the remark" }).click();
  await remarks(petra).getByText("Why this index?").first().waitFor();
  await remarks(petra).getByRole("button", { name: "Add the remark" }).waitFor({ state: "hidden" });
  await remarks(ilse).getByText("Why this index?").waitFor();
  const link = remarks(ilse).getByRole("link", { name: "https://vihe.example/indices" });
  expect(await link.getAttribute("rel")).toBe("noopener nofollow");
  await bandOf(ilse, cell).getByRole("link", { name: "Remark a by Petra Vance, on the key index" }).waitFor();
  expect(await remarks(ilse).getByRole("button", { name: /^Edit/ }).count()).toBe(0);
  expect(await remarks(petra).getByRole("button", { name: "Settle the remark by Petra Vance" }).count()).toBe(1);
  expect(file()).toBe(before);
});
