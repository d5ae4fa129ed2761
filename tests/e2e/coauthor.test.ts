import type { Browser, BrowserContext, Locator, Page, WebSocketRoute } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import { bandOf, eventually, openText, savedState, sourceInFile, textIn, typeAt, wordsOf } from "./editing.ts";
import { demoStudyId, ILSE, openBrowser, Product, signIn, TOMAS } from "./support.ts";

const CELL = "survey";
const KILLS = Number(process.env.E2E_KILLS ?? 3);

let product: Product;
let browser: Browser;
let studyId: string;
let ilse: Page;
let tomas: Page;
let ilseText: Locator;
let tomasText: Locator;

/** The line between Tomás's browser and the server, which can be cut while pages still load. */
const line = { cut: false, open: new Set<WebSocketRoute>() };

const cuttable = (context: BrowserContext) =>
  context.routeWebSocket(/\/sync\//, (socket) => {
    if (line.cut) return void socket.close({ code: 1001 });
    socket.connectToServer();
    line.open.add(socket);
  });

async function cut(): Promise<void> {
  line.cut = true;
  for (const socket of line.open) await socket.close({ code: 1001 });
  line.open.clear();
}

const isSaved = (page: Page) =>
  eventually(
    () => wordsOf(savedState(page)),
    (words) => /^Saved/.test(words),
    "saved",
  );

const agree = (...holds: string[]) =>
  eventually(
    async () => [await textIn(ilseText), await textIn(tomasText)],
    ([one, other]) => one === other && holds.every((words) => one.includes(words)),
    `both read the same, with ${holds.join(" and ")}`,
  );

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  ilse = await signIn(browser, product, ILSE);
  tomas = await signIn(browser, product, TOMAS, cuttable);
  studyId = await demoStudyId(ilse);
  for (const page of [ilse, tomas]) await page.goto(`/studies/${studyId}`);
  [ilseText, tomasText] = [await openText(ilse, CELL), await openText(tomas, CELL)];
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

it("two people type into one cell at once, and see each other there", async () => {
  await Promise.all([
    typeAt("start", ilseText, "# Ilse begins here: "),
    typeAt("end", tomasText, "# Tomás ends here, with units"),
  ]);
  const [text] = await agree("# Ilse begins here: ", "# Tomás ends here, with units");
  expect(text.startsWith("# Ilse begins here: # One row")).toBe(true);
  expect(text.endsWith("# Tomás ends here, with units")).toBe(true);
  await ilseText.press("ArrowRight");
  await tomasText.press("ArrowLeft");
  await eventually(
    () => ilseText.locator(".cm-ySelectionInfo").allTextContents(),
    (flags) => flags.includes("Tomás"),
    "his caret",
  );
  await eventually(
    () => tomasText.locator(".cm-ySelectionInfo").allTextContents(),
    (flags) => flags.includes("Ilse"),
    "her caret",
  );
  const here = () => wordsOf(ilse.getByRole("list", { name: "People here" }));
  await eventually(here, (words) => /Tomás Adeyemi.* in survey/.test(words), "he is in the cell");
  await Promise.all([
    tomasText.pressSequentially(" of measurement", { delay: 60 }),
    bandOf(ilse, CELL).getByText("Tomás is typing here").first().waitFor(),
  ]);
  await Promise.all([isSaved(ilse), isSaved(tomas)]);
  expect(sourceInFile(product.database, studyId, CELL)).toBe(await textIn(ilseText));
});

it("a change by one makes the same finding appear for both", async () => {
  const finding = (page: Page) => wordsOf(bandOf(page, CELL).locator(".recto"));
  const before = await eventually(
    () => finding(ilse),
    (words) => words.includes("Current"),
    "a current finding",
  );
  await tomasText.locator(".cm-line", { hasText: "keep:" }).click();
  await tomasText.press("Home");
  await tomasText.press("Shift+End");
  await tomasText.pressSequentially("keep: members <= 4", { delay: 5 });
  await eventually(
    async () => [await finding(ilse), await finding(tomas)],
    ([one, other]) => one === other && one !== before && one.includes("Current") && !one.includes("Fetching"),
    "the same new finding in both",
  );
});

it("edits made without a connection are kept, shown as kept, and merged on return", async () => {
  await tomas.context().setOffline(true);
  await eventually(
    () => wordsOf(savedState(tomas)),
    (words) => words.includes("Working alone since"),
    "alone",
  );
  await Promise.all([typeAt("end", tomasText, "; written alone"), typeAt("start", ilseText, "# meanwhile # ")]);
  await isSaved(ilse);
  await eventually(
    () => wordsOf(savedState(tomas)),
    (words) => /\d+ edits kept/.test(words),
    "edits kept",
  );
  expect(await textIn(ilseText)).not.toContain("written alone");
  expect(await textIn(tomasText)).not.toContain("meanwhile");
  await tomas.context().setOffline(false);
  await agree("; written alone", "# meanwhile # ");
  await Promise.all([isSaved(ilse), isSaved(tomas)]);
});

it("a reload with unsynced edits warns, and loses nothing", async () => {
  await cut();
  await eventually(
    () => wordsOf(savedState(tomas)),
    (words) => words.includes("Working alone since"),
    "alone",
  );
  await typeAt("end", tomasText, "; before the reload");
  await eventually(
    () => wordsOf(savedState(tomas)),
    (words) => /Working alone since .*kept/.test(words),
    "kept here",
  );
  const kinds: string[] = [];
  tomas.on("dialog", (dialog) => {
    kinds.push(dialog.type());
    void dialog.accept();
  });
  await tomas.reload();
  expect(kinds).toEqual(["beforeunload"]);
  tomasText = await openText(tomas, CELL);
  await eventually(
    () => wordsOf(savedState(tomas)),
    (words) => /Working alone since .*kept/.test(words),
    "still kept",
  );
  expect(await textIn(tomasText)).toContain("; before the reload");
  expect(sourceInFile(product.database, studyId, CELL)).not.toContain("; before the reload");
  line.cut = false;
  await agree("; before the reload");
  await isSaved(tomas);
  expect(sourceInFile(product.database, studyId, CELL)).toContain("; before the reload");
});

it(`${KILLS} SIGKILLs of the server while both type lose nothing that was called saved, and in the end nothing at all`, async () => {
  const chance = seededRandom(20_250_512);
  const promised: string[] = [];
  const typed: string[] = [];
  for (let round = 1; round <= KILLS; round++) {
    const saved = [`i${round}saved.`, `t${round}saved.`];
    await Promise.all([typeAt("start", ilseText, `# ${saved[0]} `), typeAt("end", tomasText, ` ${saved[1]}`)]);
    await Promise.all([isSaved(ilse), isSaved(tomas)]);
    promised.push(...saved);
    const cutShort = [`i${round}cut.`, `t${round}cut.`];
    const typing = Promise.all([
      typeAt("start", ilseText, `# ${cutShort[0]} `),
      typeAt("end", tomasText, ` ${cutShort[1]}`),
    ]);
    await new Promise((later) => setTimeout(later, chance.integer(150)));
    await product.kill();
    await typing;
    typed.push(...saved, ...cutShort);
    const file = sourceInFile(product.database, studyId, CELL);
    expect(promised.filter((words) => !file.includes(words))).toEqual([]);
    await product.start();
    await agree(...typed);
  }
  await Promise.all([isSaved(ilse), isSaved(tomas)]);
  expect(sourceInFile(product.database, studyId, CELL)).toBe(await textIn(ilseText));
});

it("a remark, a reply to it and its settling are seen by the other as they happen", async () => {
  const remarks = (page: Page) => page.getByRole("region", { name: "Remarks on base" });
  const symmetry = (page: Page) => page.getByRole("link", { name: /^Remark b by Tomás Adeyemi, on Symmetry$/ });
  await bandOf(tomas, "base").focus();
  await tomas.keyboard.press("r");
  await tomas.keyboard.type("Does it survive Italianer's correction?");
  await remarks(tomas).getByLabel("About").selectOption({ label: "Symmetry" });
  await remarks(tomas).getByRole("button", { name: "Add the remark" }).click();
  const seen = remarks(ilse).getByRole("listitem").filter({ hasText: "Does it survive" }).last();
  await seen.waitFor();
  await symmetry(ilse).waitFor();
  await seen.getByRole("button", { name: "Reply to the remark by Tomás Adeyemi" }).click();
  await ilse.keyboard.type("It does.");
  await ilse.keyboard.press("Control+Enter");
  await remarks(tomas).getByText("It does.").waitFor();
  await seen.getByRole("button", { name: "Settle the remark by Tomás Adeyemi" }).click();
  await remarks(tomas).getByRole("button", { name: "1 settled remark" }).waitFor();
  await symmetry(tomas).waitFor({ state: "detached" });
});

it("who changed what is told, a checkpoint is returned to, and one's own steps are undone in words", async () => {
  const source = () => sourceInFile(product.database, studyId, "linear");
  const before = source();
  const linear = await openText(tomas, "linear");
  await linear.locator(".cm-line", { hasText: "form:" }).click();
  await linear.press("Home");
  await linear.press("Shift+End");
  await ilse.getByRole("link", { name: "Checkpoints" }).click();
  await ilse.getByRole("button", { name: "Keep the study as it stands" }).click();
  await ilse.getByLabel("Name").fill("Before the referee");
  await ilse.getByRole("button", { name: "Keep it" }).click();
  const kept = ilse.getByRole("listitem").filter({ hasText: "kept by you" });
  await kept.getByText("Before the referee").first().waitFor();
  await linear.pressSequentially("form: les", { delay: 5 });
  await isSaved(tomas);
  const entry = ilse.getByRole("listitem").filter({ hasText: /Tomás Adeyemi in linear: form changed from .* to les/ });
  await entry.getByRole("button", { name: /^Look/ }).click();
  await entry.getByText("les", { exact: true }).waitFor();
  await kept.getByRole("button", { name: "Return to it Before the referee" }).click();
  await kept.getByText("1 cell changes.").waitFor();
  await kept.getByRole("button", { name: "Return to it", exact: true }).click();
  await eventually(source, (words) => words === before, "returned");
  await ilse.getByText("Before returning to Before the referee").first().waitFor();
  await ilse.locator("body").press("Control+z");
  await ilse.getByText("Undone: returning to Before the referee.").waitFor();
  await eventually(source, (words) => words.includes("form: les"), "the return undone");
  await ilse.goBack();
  await bandOf(ilse, "linear").waitFor();
});
