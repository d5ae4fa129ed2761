import { mkdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { AxeBuilder } from "@axe-core/playwright";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { demoStudyId, ILSE, openBrowser, Product, signIn } from "./support.ts";
import { watch } from "./watch.ts";

/** Whoever sees badly, hears the page or has a small one: every page, in both themes and at three widths. */
const WIDTHS = [1440, 720, 390] as const;
/** Where pictures of the pages are left to be looked at; no part of the repository. */
const PICTURES = fileURLToPath(new URL("../artefacts/", import.meta.url));

let product: Product;
let browser: Browser;
let page: Page;
let addresses: Record<string, string>;
let watched: ReturnType<typeof watch>;

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  page = await signIn(browser, product, ILSE);
  const studyId = await demoStudyId(page);
  watched = watch(page, product.origin);
  mkdirSync(PICTURES, { recursive: true });
  const status = await page.request.get(`/api/studies/${studyId}/status`);
  const { cells } = (await status.json()) as { cells: { cellId: string; name: string }[] };
  const idOf = (name: string) => cells.find((one) => one.name === name)?.cellId;
  const cell = (name: string) => `/studies/${studyId}/cells/${idOf(name)}`;
  const sealed = await page.request.post(`/api/studies/${studyId}/referee-copies`, {
    data: { cellId: idOf("matrix"), note: "The matrix of Table 4", withholdAuthors: true },
    headers: { origin: product.origin },
  });
  const { token } = (await sealed.json()) as { token: string };
  addresses = {
    studies: "/",
    study: `/studies/${studyId}`,
    data: cell("survey"),
    system: cell("base"),
    matrix: cell("matrix"),
    door: "/sign-in",
    "create an account": "/create-account",
    "referee copy": `/referee/${token}`,
    nowhere: "/not/an/address",
  };
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

/** The page at an address once nothing moves on it and no finding is still on its way. */
async function settledAt(address: string): Promise<void> {
  await page.goto(address);
  await page.locator("h1").first().waitFor();
  await page.getByText("Fetching").first().waitFor({ state: "hidden" });
  await page.waitForFunction(() => document.getAnimations().every(({ playState }) => playState !== "running"));
}

async function faultsOf(where: string): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  return violations.map(({ id, help, nodes }) => `${where}: ${id}, ${help}: ${nodes[0].html.slice(0, 200)}`);
}

it.each(["light", "dark"] as const)("has no fault that a machine can find, in the %s theme", async (theme) => {
  const faults: string[] = [];
  await page.emulateMedia({ colorScheme: theme, reducedMotion: "reduce" });
  for (const width of WIDTHS) {
    await page.setViewportSize({ width, height: 1000 });
    for (const [name, address] of Object.entries(addresses)) {
      await settledAt(address);
      expect(await page.locator("html").getAttribute("data-theme")).toBe(theme);
      faults.push(...(await faultsOf(`${name}, ${width}`)));
      const aside = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
      if (aside > 0) faults.push(`${name}, ${width}: the page scrolls ${aside} pixels sideways`);
      await page.screenshot({ path: `${PICTURES}${name}, ${width}, ${theme}.png`, fullPage: true });
    }
  }
  expect([...faults, ...watched.takeFaults()]).toEqual([]);
  expect(watched.outside).toEqual([]);
});

it("has none in what is laid over a study either", async () => {
  await page.setViewportSize({ width: 1440, height: 1000 });
  await settledAt(addresses.study);
  for (const entry of ["People", "Uploads", "Referee copies", "Settings", "Delete the study"]) {
    await page.getByRole("button", { name: "More", exact: true }).click();
    await page.getByRole("menuitem", { name: entry }).click();
    await page.getByRole("dialog").waitFor();
    expect(await faultsOf(entry)).toEqual([]);
    await page.keyboard.press("Escape");
    await page.getByRole("dialog").waitFor({ state: "hidden" });
  }
});
