import { mkdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import AxeBuilder from "@axe-core/playwright";
import type { Browser, BrowserContext, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import { fromApi, untilSays } from "./study-page.ts";
import { demoStudyId, ILSE, openBrowser, Product, signIn } from "./support.ts";
import { watch } from "./watch.ts";

/** Where pictures of the screens are left to be looked at; no part of the repository. */
const PICTURES = fileURLToPath(new URL("../artefacts/", import.meta.url));
const LAWS = ["wcag2a", "wcag2aa", "wcag21aa", "wcag22aa"];
const THEMES = ["light", "dark"] as const;
const WIDTHS = [1440, 390] as const;

interface Screen {
  readonly name: string;
  readonly path: () => string;
  /** Waits until the screen is there in full. */
  readonly ready: (page: Page) => Promise<void>;
  readonly signedIn: boolean;
  /** Answers that are refused because that is what the screen is about. */
  readonly refused?: RegExp;
}

let product: Product;
let browser: Browser;
let state: Awaited<ReturnType<BrowserContext["storageState"]>>;
let studyId: string;
let token: string;
const ids = new Map<string, string>();

const heading = (name: string | RegExp) => (page: Page) => page.getByRole("heading", { name }).first().waitFor();
const cell = (name: string) => () => `/studies/${studyId}/cells/${ids.get(name)}`;

const SCREENS: readonly Screen[] = [
  {
    name: "sign-in",
    path: () => "/sign-in",
    ready: (page) => page.getByRole("region", { name: "The demo study" }).waitFor(),
    signedIn: false,
  },
  { name: "create-account", path: () => "/create-account", ready: heading("Create an account"), signedIn: false },
  {
    name: "studies",
    path: () => "/",
    ready: (page) => page.getByRole("link", { name: /^Food demand in Velmark/ }).waitFor(),
    signedIn: true,
  },
  {
    name: "workspace",
    path: () => `/studies/${studyId}`,
    ready: async (page) => {
      for (const name of ["survey", "base", "laws", "matrix", "ninetieth", "fifths", "linear", "needs"]) {
        await untilSays(page, name, /^Current(?!.*Fetching)/);
      }
    },
    signedIn: true,
  },
  { name: "data-cell", path: cell("survey"), ready: heading("Row accounting"), signedIn: true },
  { name: "system-cell", path: cell("base"), ready: heading("Fit and convergence"), signedIn: true },
  {
    name: "slutsky-cell",
    path: cell("matrix"),
    ready: (page) => page.getByRole("region", { name: "Entry pointed at" }).waitFor(),
    signedIn: true,
  },
  { name: "referee-copy", path: () => `/referee/${token}`, ready: heading(/^Largest difference/), signedIn: false },
  {
    name: "plain-page",
    path: () => "/referee/nothing",
    ready: heading("This link opens nothing"),
    signedIn: false,
    refused: /404.*\/api\/referee\/nothing/,
  },
];

beforeAll(async () => {
  mkdirSync(PICTURES, { recursive: true });
  product = await Product.start();
  browser = await openBrowser();
  const ilse = await signIn(browser, product, ILSE);
  studyId = await demoStudyId(ilse);
  const { cells } = await fromApi<StudyStatus>(ilse, `/api/studies/${studyId}/status`);
  for (const { name, cellId } of cells) ids.set(name, cellId);
  const sealing = await ilse.request.post(`/api/studies/${studyId}/referee-copies`, {
    data: { cellId: ids.get("matrix"), note: "The matrix of table 4." },
    headers: { origin: product.origin },
  });
  token = ((await sealing.json()) as { token: string }).token;
  state = await ilse.context().storageState();
  await ilse.context().close();
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

describe.each(THEMES)("in the %s theme", (theme) => {
  describe.each(WIDTHS)("at %i pixels", (width) => {
    it.each(SCREENS)("$name keeps the rules of the open web", async ({ name, path, ready, signedIn, refused }) => {
      const context = await browser.newContext({
        baseURL: product.origin,
        viewport: { width, height: width === 390 ? 844 : 1000 },
        colorScheme: theme,
        reducedMotion: "reduce",
        hasTouch: width === 390,
        ...(signedIn && { storageState: state }),
      });
      const page = await context.newPage();
      const watched = watch(page, product.origin);
      await page.goto(path());
      await ready(page);
      await page.evaluate(() => document.fonts.ready);
      expect(await page.evaluate(() => document.documentElement.dataset.theme)).toBe(theme);
      await page.screenshot({ path: `${PICTURES}${name}-${theme}-${width}.png`, fullPage: true });

      const { violations } = await new AxeBuilder({ page }).withTags(LAWS).analyze();
      const found = violations.flatMap(({ id, nodes }) =>
        nodes.map(({ html, any }) => ({ id, html, why: any[0]?.message })),
      );
      expect.soft(found).toEqual([]);
      const [wide, inner] = await page.evaluate(() => [document.documentElement.scrollWidth, window.innerWidth]);
      expect.soft(wide, "the document's width").toBeLessThanOrEqual(inner);
      expect.soft(watched.takeFaults().filter((fault) => !refused?.test(fault))).toEqual([]);
      expect.soft(watched.outside).toEqual([]);
      await context.close();
    });
  });
});
