import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import { figures, firstLoad } from "./first-load.ts";
import { fromApi } from "./study-page.ts";
import { demoStudyId, ILSE, openBrowser, Product, signIn } from "./support.ts";

/** What a page may ask for, compressed, before it can be read. */
const MOST = 220_000;
/** Charts, the editor and mathematics: large, and needed by no first look. */
const LATER = /plotly|source-editor|katex/;

let product: Product;
let browser: Browser;
let ilse: Page;
const paths = new Map<string, string>();

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  ilse = await signIn(browser, product, ILSE);
  const studyId = await demoStudyId(ilse);
  const { cells } = await fromApi<StudyStatus>(ilse, `/api/studies/${studyId}/status`);
  const matrix = cells.find(({ name }) => name === "matrix")!;
  const sealed = await ilse.request.post(`/api/studies/${studyId}/referee-copies`, {
    data: { cellId: matrix.cellId, note: "", withholdAuthors: true },
    headers: { origin: product.origin },
  });
  paths.set("sign-in", "/sign-in");
  paths.set("studies", "/");
  paths.set("study", `/studies/${studyId}`);
  paths.set("opened cell", `/studies/${studyId}/cells/${matrix.cellId}`);
  paths.set("referee copy", `/referee/${((await sealed.json()) as { token: string }).token}`);
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

it.each([
  ["sign-in", "form button", 1440],
  ["studies", "main a[href^='/studies/']", 1440],
  ["study", "main table", 1440],
  ["study", "main table", 390],
  ["opened cell", ".type-finding-open", 1440],
  ["referee copy", "main table", 1440],
] as const)("%s can be read (%s, %i px) before 220 kB of scripts have come", async (name, selector, width) => {
  const context = await browser.newContext({
    baseURL: product.origin,
    viewport: { width, height: 1000 },
    ...(name !== "sign-in" && name !== "referee copy" && { storageState: await ilse.context().storageState() }),
  });
  const page = await context.newPage();
  const load = await firstLoad(page, paths.get(name)!, selector);
  const told = figures(load);
  console.log(`${name} at ${width} px: ${told}`);
  expect(load.bytes, told).toBeGreaterThan(50_000);
  expect(load.bytes, told).toBeLessThanOrEqual(MOST);
  expect(load.before.map((one) => one.name).filter((one) => LATER.test(one))).toEqual([]);
  // The editor may come by itself where a source is shown as text, once the finding stands; a chart only where one is looked at.
  const laterToo = load.after.filter((one) => LATER.test(one));
  expect(laterToo.filter((one) => name !== "study" || width === 390 || !one.includes("source-editor"))).toEqual([]);
  await context.close();
});
