import type { Browser, BrowserContext, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import { faultsOf, picture, settled, THEMES, turn } from "./access.ts";
import { choose, fromApi } from "./study-page.ts";
import { demoStudyId, ILSE, openBrowser, PETRA, Product, signIn } from "./support.ts";
import { watch } from "./watch.ts";

/** What lies over a page, in both themes; the pages themselves: every-page.test.ts. */
const DIALOG = "[role=dialog]";

let product: Product;
let browser: Browser;
let state: Awaited<ReturnType<BrowserContext["storageState"]>>;
let studyId: string;
let surveyId: string;

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  const ilse = await signIn(browser, product, ILSE);
  studyId = await demoStudyId(ilse);
  const { cells } = await fromApi<StudyStatus>(ilse, `/api/studies/${studyId}/status`);
  surveyId = cells.find(({ name }) => name === "survey")!.cellId;
  state = await ilse.context().storageState();
  await ilse.context().close();
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

async function openPage(): Promise<Page> {
  const context = await browser.newContext({
    baseURL: product.origin,
    viewport: { width: 1440, height: 1000 },
    colorScheme: THEMES[0],
    reducedMotion: "reduce",
    storageState: state,
  });
  return context.newPage();
}

it("what is laid over a study has no fault that a machine can find", async () => {
  const page = await openPage();
  const watched = watch(page, product.origin);
  await page.goto(`/studies/${studyId}`);
  await page.getByRole("heading", { level: 1 }).waitFor();
  await settled(page);
  for (const entry of [
    "People",
    "Uploads",
    "Remarks",
    "Referee copies",
    "Replication bundle",
    "Journal",
    "Settings",
    "Keys",
    "Delete the study",
  ]) {
    await choose(page, entry);
    await page.getByRole("dialog").waitFor();
    for (const theme of THEMES) {
      await turn(page, theme);
      await settled(page);
      await picture(page, `${entry.toLowerCase().replaceAll(" ", "-")}-${theme}`);
      expect.soft(await faultsOf(page, DIALOG), `${entry}, ${theme}`).toEqual([]);
    }
    await page.keyboard.press("Escape");
    await page.getByRole("dialog").waitFor({ state: "hidden" });
  }
  expect.soft(watched.takeFaults()).toEqual([]);
  await page.context().close();
});

it("nor have the rows of an upload and of a caution", async () => {
  const page = await openPage();
  const watched = watch(page, product.origin);
  await page.goto(`/studies/${studyId}/cells/${surveyId}`);
  const outliers = page.getByRole("list", { name: "Look at the rows of outliers" }).getByRole("button").first();
  const lists = { "rows of an upload": page.getByRole("button", { name: /^Look at the rows of .*\.csv$/ }), outliers };
  for (const [name, button] of Object.entries(lists)) {
    await button.click();
    await page.getByRole("dialog").getByRole("table").waitFor();
    for (const theme of THEMES) {
      await turn(page, theme);
      await settled(page);
      await picture(page, `${name.replaceAll(" ", "-")}-${theme}`);
      expect.soft(await faultsOf(page, DIALOG), `${name}, ${theme}`).toEqual([]);
    }
    await page.keyboard.press("Escape");
    await page.getByRole("dialog").waitFor({ state: "hidden" });
  }
  expect.soft(watched.takeFaults()).toEqual([]);
  await page.context().close();
});

it("nor have remarks that are folded to letters, opened over the finding and written", async () => {
  const page = await openPage();
  const watched = watch(page, product.origin);
  await page.setViewportSize({ width: 1100, height: 1000 });
  await page.goto(`/studies/${studyId}`);
  const remarks = page.getByRole("region", { name: "Remarks on base" });
  await remarks.getByRole("button", { name: "Remark a by Tomás Adeyemi" }).click();
  await remarks.getByRole("button", { name: "Reply to the remark by Tomás Adeyemi" }).click();
  await remarks.getByRole("button", { name: "Add a remark on base" }).first().click();
  for (const theme of THEMES) {
    await turn(page, theme);
    await settled(page);
    await picture(page, `remarks-over-${theme}`);
    expect.soft(await faultsOf(page), theme).toEqual([]);
  }
  expect.soft(watched.takeFaults()).toEqual([]);
  await page.context().close();
});

it("nor has the dialog that deletes an account, whether studies are to be handed over first or not", async () => {
  const others = await signIn(browser, product, PETRA);
  const own = await openPage();
  for (const [name, page, there] of [
    ["delete-account", others, "Keep it"],
    ["hand-over-first", own, "Food demand in Velmark, 2029–31"],
  ] as const) {
    await page.emulateMedia({ reducedMotion: "reduce" });
    await page.goto("/account");
    await page.getByRole("button", { name: "Delete the account" }).click();
    await page.getByRole("dialog").getByText(there).waitFor();
    for (const theme of THEMES) {
      await turn(page, theme);
      await settled(page);
      await picture(page, `${name}-${theme}`);
      expect.soft(await faultsOf(page, DIALOG), `${name}, ${theme}`).toEqual([]);
    }
    await page.context().close();
  }
});

it("nor has the list of columns to choose from", async () => {
  const page = await openPage();
  const watched = watch(page, product.origin);
  await page.goto(`/studies/${studyId}/cells/${surveyId}`);
  const field = page.getByRole("combobox", { name: "Quantity of Sweet drinks" }).last();
  for (const theme of THEMES) {
    await turn(page, theme);
    await field.click();
    await page.keyboard.type("q_sw");
    await page.getByText(/q_sweet is q_sweet_l within 2/).waitFor();
    await settled(page);
    await picture(page, `columns-${theme}`);
    expect.soft(await faultsOf(page, ".column-choices"), theme).toEqual([]);
    await page.keyboard.press("Escape");
  }
  expect.soft(watched.takeFaults()).toEqual([]);
  await page.context().close();
});

it("a dialog keeps what is typed while nothing answers, and one that cannot be fetched leaves the page as it is", async () => {
  const page = await openPage();
  await page.goto(`/studies/${studyId}`);
  await choose(page, "People");
  const dialog = page.getByRole("dialog");
  const address = dialog.getByLabel("Email");
  await address.fill("nora.lind@vihe.example");
  await page.route(/\/(api|assets)\//, (route) => route.abort());
  await dialog.getByRole("button", { name: "Invite", exact: true }).click();
  await dialog.getByText("The installation does not answer. Check the connection, then try again.").waitFor();
  expect(await address.inputValue()).toBe("nora.lind@vihe.example");
  await page.keyboard.press("Escape");
  await choose(page, "Keys");
  const note = page.getByRole("complementary", { name: "Not fetched" });
  await note.waitFor();
  for (const theme of THEMES) {
    await turn(page, theme);
    await picture(page, `not-fetched-${theme}`);
    expect.soft(await faultsOf(page, "[aria-label='Not fetched']"), theme).toEqual([]);
  }
  await note.getByRole("button", { name: "Stay on the page" }).click();
  await note.waitFor({ state: "hidden" });
  expect(await page.getByRole("heading", { level: 1 }).textContent()).toContain("Food demand in Velmark");
  await page.context().close();
});
