import { createHash } from "node:crypto";
import { readFileSync, writeFileSync } from "node:fs";
import { parse } from "csv-parse/sync";
import type { Browser, BrowserContext, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { replicateBundle } from "../../server/bin/replicate-bundle.ts";
import { simulateSurvey } from "../../server/demo/simulate.ts";
import { QUIET } from "../../server/engine/run.ts";
import { type RefereeCopy, refereeCopy, type SealedContent } from "../../shared/schemas/referee-copy.ts";
import { canonicalJson } from "../../shared/study/canonical-json.ts";
import { printFixed } from "../../shared/tables/numbers.ts";
import { faultsOf } from "./access.ts";
import { eventually, wordsOf } from "./editing.ts";
import { choose, untilSays } from "./study-page.ts";
import { demoStudyId, ILSE, openBrowser, Product, signIn } from "./support.ts";
import { watch } from "./watch.ts";

const NOTE = "For the second round: the matrix of table 4.";
const ROUNDING = 1e-12;
const MATHEMATICS = /prose-with-mathematics|KaTeX/;

let product: Product;
let browser: Browser;
let ilse: Page;
let link: string;
let context: BrowserContext;
let page: Page;
let watched: ReturnType<typeof watch>;
let copy: RefereeCopy;
const cookiesSent: string[] = [];

const recomputation = (of: Page) => of.getByRole("region", { name: "Recomputation" });
const apiOf = (address: string) => address.replace("/referee/", "/api/referee/");
const fingerprintOf = (content: SealedContent) => createHash("sha256").update(canonicalJson(content)).digest("hex");

/** A size as the page prints it, "3 × 10−16", as a number. */
function sizeOf(words: string): number {
  const printed = /(\d+(?:\.\d+)?)(?: × 10−(\d+))?$/.exec(words.trim());
  if (!printed) throw new Error(`No size at the end of "${words}".`);
  return Number(`${printed[1]}e-${printed[2] ?? 0}`);
}

/** What the page says once it has computed everything again. */
async function computedAgain(of: Page): Promise<{ largest: number; parts: Record<string, string> }> {
  const heading = recomputation(of).getByRole("heading", { name: /^Largest difference/ });
  await heading.waitFor();
  const rows = await recomputation(of).getByRole("row").all();
  const parts = await Promise.all(
    rows.slice(1).map(async (row) => {
      const name = await wordsOf(row.getByRole("rowheader"));
      return [name, await wordsOf(row.getByRole("cell").last())] as const;
    }),
  );
  return { largest: sizeOf(await wordsOf(heading)), parts: Object.fromEntries(parts) };
}

async function stranger(width = 1440): Promise<Page> {
  const own = await browser.newContext({ baseURL: product.origin, viewport: { width, height: 900 } });
  return own.newPage();
}

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  ilse = await signIn(browser, product, ILSE);
  await ilse.goto(`/studies/${await demoStudyId(ilse)}`);
  context = await browser.newContext({ baseURL: product.origin, viewport: { width: 1440, height: 1000 } });
  page = await context.newPage();
  watched = watch(page, product.origin);
  page.on("request", async (request) => {
    const headers = await request.allHeaders().catch(() => ({}) as Record<string, string>);
    if (headers.cookie) cookiesSent.push(request.url());
  });
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

it("the owner seals a copy of the matrix and is told its link once", async () => {
  await untilSays(ilse, "matrix", /^Current/);
  await choose(ilse, "Referee copies");
  const dialog = ilse.getByRole("dialog", { name: "Referee copies" });
  await dialog.getByRole("radio", { name: "matrix" }).check();
  await dialog.getByLabel("A note to the referee").fill(NOTE);
  await dialog.getByRole("button", { name: "Seal a referee copy" }).click();
  link = await dialog.getByRole("textbox", { name: "Link to the referee copy" }).inputValue();
  expect(link).toMatch(new RegExp(`^${product.origin}/referee/[\\w-]{43}$`));
  await ilse.reload();
  await choose(ilse, "Referee copies");
  await dialog.getByText("not opened yet").waitFor();
  expect(await ilse.content()).not.toContain(link.slice(-43));
});

it("the referee opens the link without an account and reads what was sealed", async () => {
  expect(await context.cookies()).toEqual([]);
  const answered = page.waitForResponse((response) => response.url() === apiOf(link));
  await page.goto(link);
  copy = refereeCopy.parse(await (await answered).json());
  const { slutsky, system, accounting, study } = copy.content;
  await page.getByRole("heading", { level: 1, name: study.title }).waitFor();
  const all = await wordsOf(page.locator("body"));
  expect(all).toContain(NOTE);
  expect(all).toContain("Authors withheld for review.");

  const cells = page
    .getByRole("grid", { name: "Slutsky matrix, share form, at the base point" })
    .getByRole("gridcell", { name: /, price of / });
  const labels = await cells.evaluateAll((found) => found.map((cell) => cell.getAttribute("aria-label")));
  const { goods } = slutsky.fitted;
  const entries = goods.flatMap((good, i) =>
    goods.map((other, j) => {
      const [entry, error] = [slutsky.at.share[i][j], slutsky.at.shareErrors[i][j]];
      return `${good}, price of ${other}: ${printFixed(entry, 4)}, standard error ${printFixed(error, 4)}`;
    }),
  );
  expect(labels).toEqual(entries);

  const verdicts = page.getByRole("list", { name: "What theory says of the matrix" }).getByRole("listitem");
  const laws = (await verdicts.allTextContents()).map(
    (words) => /^[A-Z][a-z-]+?(?=holds|imposed|at |breaks|not )/.exec(words)?.[0],
  );
  expect(laws).toEqual(["Adding-up", "Homogeneity", "Symmetry", "Negativity", "Monotonicity"]);

  const eigenvalues = page.getByRole("table", { name: "Eigenvalues" }).getByRole("row");
  const printed = (await eigenvalues.allTextContents()).map((words) => /^[−\d.]+/.exec(words)?.[0]);
  expect(printed).toEqual([...slutsky.at.eigenvalues.map(({ value }) => printFixed(value, 4)), "0"]);

  const specification = page.getByRole("region", { name: "Specification" });
  expect(await wordsOf(specification)).toContain("homogeneity and symmetry");
  await specification.getByRole("button", { name: "As text" }).click();
  expect(await wordsOf(specification)).toContain(copy.content.cells.sources[1].source.trim());
  await specification.getByRole("button", { name: /^Coefficients, \d+ of them/ }).click();
  await specification.getByRole("table", { name: /^Coefficients of the share equations/ }).waitFor();
  expect(await wordsOf(specification)).toContain(printFixed(system.coefficients[0].estimate, 4));

  const rows = await page
    .getByRole("table", { name: /^Rows uploaded/ })
    .getByRole("row")
    .allTextContents();
  expect(rows[0]).toBe(`Rows uploaded${printFixed(accounting.uploaded, 0)}`);
  expect(rows.at(-1)).toBe(`Rows used${printFixed(accounting.used, 0)}`);
  const left = accounting.leftOut.filter(({ count }) => count > 0);
  expect(rows.slice(1, -1)).toEqual(left.map(({ label, count }) => `${label}${printFixed(-count, 0)}`));
  expect(left.reduce((sum, { count }) => sum + count, accounting.used)).toBe(accounting.uploaded);

  const hex = page.getByRole("img", { name: `Fingerprint ${copy.fingerprint}` });
  expect((await wordsOf(hex)).replaceAll(" ", "")).toBe(copy.fingerprint);
});

it("the recomputation in the referee's browser agrees below 1e-12, part by part", async () => {
  const { largest, parts } = await computedAgain(page);
  expect(largest).toBeLessThan(ROUNDING);
  expect(Object.keys(parts).length).toBe(7);
  for (const [part, difference] of Object.entries(parts)) {
    if (part === "Verdicts") expect(difference).toBe("agree");
    else expect(sizeOf(difference), part).toBeLessThan(ROUNDING);
  }
  await page.getByText("Computed again from what this page received: the same.").waitFor();
  await recomputation(page).getByRole("button", { name: "Recompute" }).click();
  expect((await computedAgain(page)).largest).toBe(largest);
});

async function download(name: string): Promise<string> {
  const [saved] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("region", { name: "Downloads" }).getByRole("button", { name }).click(),
  ]);
  return readFileSync(await saved.path(), "utf8");
}

const numbersOf = (rows: string[][], from: number) => rows.map((row) => row.slice(from).map(Number));

it("the numbers taken away as CSV and JSON are the same doubles", async () => {
  const { slutsky, system } = copy.content;
  const matrix: string[][] = parse(await download("Matrix, with standard errors"));
  const [, ...lines] = matrix;
  const figure = (words: string) =>
    numbersOf(
      lines.filter((line) => line[1] === words),
      2,
    );
  expect(figure("estimate")).toEqual(slutsky.at.share);
  expect(figure("standard error")).toEqual(slutsky.at.shareErrors);

  const [head, ...coefficients]: string[][] = parse(await download("Coefficients, with full covariance"));
  expect(head.slice(0, 5)).toEqual(["block", "good", "column", "estimate", "standard error"]);
  const numbers = numbersOf(coefficients, 3);
  expect(numbers.map(([estimate]) => estimate)).toEqual(system.coefficients.map(({ estimate }) => estimate));
  expect(numbers.map(([, error]) => error)).toEqual(system.coefficients.map(({ standardError }) => standardError));
  expect(numbers.map((row) => row.slice(2))).toEqual(system.fitted.covariance);

  const json = await download("Everything sealed");
  expect(JSON.parse(json)).toEqual(copy.content);
  expect(createHash("sha256").update(json).digest("hex")).toBe(copy.fingerprint);
});

it("whoever has the data finds every sealed number again from the bundle, and without them the matrix", async () => {
  const [saved] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("button", { name: "Replication bundle, without the data" }).click(),
  ]);
  expect(saved.suggestedFilename()).toBe(`referee-copy-${copy.fingerprint.slice(0, 8)}-replication.zip`);
  const path = `${product.folder}/sealed.zip`;
  await saved.saveAs(path);
  const { matrix, system, data } = copy.content.cells;
  const alone = await replicateBundle(path, [], QUIET);
  const again = alone.cells.find(({ name }) => name === matrix);
  expect(again).toMatchObject({ from: "coefficients", compared: { apartCount: 0, unlikeCount: 0 } });
  const purchases = `${product.folder}/whose-name-tells-nothing.csv`;
  writeFileSync(purchases, simulateSurvey());
  const whole = await replicateBundle(path, [purchases], QUIET);
  for (const name of [data, system, matrix]) {
    const cell = whole.cells.find((one) => one.name === name);
    expect(cell, name).toMatchObject({ from: "data", compared: { apartCount: 0, unlike: [] } });
  }
});

/** Every key and every value of some JSON. */
function* walk(value: unknown, key = ""): Generator<[key: string, value: unknown]> {
  yield [key, value];
  if (typeof value !== "object" || value === null) return;
  for (const [name, inner] of Object.entries(value)) yield* walk(inner, Array.isArray(value) ? key : name);
}

it("no household's data are in what the link gives", async () => {
  const text = JSON.stringify(copy);
  const found = [...walk(copy)];
  const keys = new Set(found.map(([key]) => key));
  for (const key of ["brokenRows", "row", "village", "cluster", "strip", "upload", "household"]) {
    expect(keys, key).not.toContain(key);
  }
  const survey: Record<string, string>[] = parse(simulateSurvey(), { columns: true });
  expect(survey.length).toBe(copy.content.accounting.uploaded);
  for (const column of ["household_id", "region"]) {
    const labels = new Set(survey.map((row) => row[column]));
    expect([...labels].filter((label) => text.includes(`"${label}"`))).toEqual([]);
  }
  // Prices, expenditures, quantities and totals have decimals; what is sealed are sums over thousands of rows.
  const values = new Set(
    survey
      .flatMap((row) => Object.values(row))
      .filter((cell) => /^\d+\.\d*[1-9]\d*$/.test(cell))
      .map(Number),
  );
  expect(values.size).toBeGreaterThan(5_000);
  const numbers = found.flatMap(([, value]) => (typeof value === "number" && !Number.isInteger(value) ? [value] : []));
  expect(numbers.length).toBeGreaterThan(1_000);
  expect(numbers.filter((number) => values.has(number))).toEqual([]);
  // As many numbers in a row as there are rows would be a column.
  const longest = Math.max(...found.map(([, value]) => (Array.isArray(value) ? value.length : 0)));
  expect(longest).toBeLessThan(200);
});

it("nothing else is asked of anyone: no other address, no cookie, nothing of the study", async () => {
  expect(watched.outside).toEqual([]);
  expect(watched.takeFaults()).toEqual([]);
  expect(cookiesSent).toEqual([]);
  expect(await context.cookies()).toEqual([]);
  const asked = watched.requests.map((address) => new URL(address).pathname).filter((path) => path.startsWith("/api/"));
  expect(asked).toEqual([new URL(apiOf(link)).pathname]);
});

/** Opens the link with the answer of the API changed on its way. */
async function openChanged(change: (copy: RefereeCopy) => RefereeCopy): Promise<Page> {
  const other = await stranger();
  await other.route(apiOf(link), async (route) => {
    const response = await route.fetch();
    await route.fulfill({ response, json: change((await response.json()) as RefereeCopy) });
  });
  await other.goto(link);
  return other;
}

it("a coefficient changed on its way is seen: in the matrix and in the fingerprint", async () => {
  const other = await openChanged((received) => {
    received.content.slutsky.fitted.theta[7] += 1e-6;
    return received;
  });
  const { largest, parts } = await computedAgain(other);
  expect(largest).toBeGreaterThan(1e-7);
  expect(sizeOf(parts.Matrix)).toBeGreaterThan(ROUNDING);
  await other.getByText("Recomputed in this browser, and it does not agree").waitFor();
  await other.getByText(/^What this page received has another: /).waitFor();
  await other.context().close();
});

it("one who seals a changed matrix anew is found out by the coefficients", async () => {
  const other = await openChanged(({ content }) => {
    content.slutsky.at.share[0][1] += 1e-6;
    content.slutsky.at.share[1][0] += 1e-6;
    return { content, fingerprint: fingerprintOf(content) };
  });
  const { largest, parts } = await computedAgain(other);
  expect(largest).toBeCloseTo(1e-6, 9);
  expect(sizeOf(parts.Matrix)).toBe(1e-6);
  await other.getByText("Recomputed in this browser, and it does not agree").waitFor();
  await other.getByText("Computed again from what this page received: the same.").waitFor();
  await other.context().close();
});

it("reads on a phone, nothing to be scrolled sideways but the page's own tables", async () => {
  const phone = await stranger(390);
  await phone.goto(link);
  expect((await computedAgain(phone)).largest).toBeLessThan(ROUNDING);
  const entry = phone.getByRole("gridcell", { name: /^sweet drinks, price of grains:/i });
  await entry.click();
  expect(await wordsOf(phone.getByRole("region", { name: "Entry pointed at" }))).toMatch(
    /Mirror, grains by sweet drinks/i,
  );
  await phone.getByRole("button", { name: "Each difference" }).click();
  await phone.getByRole("button", { name: "As text" }).click();
  const [width, inner] = await phone.evaluate(() => [document.documentElement.scrollWidth, window.innerWidth]);
  expect(inner).toBe(390);
  expect(width).toBeLessThanOrEqual(390);
  await phone.context().close();
});

it("a newer copy with further findings takes the first one's place, and the first link leads to it", async () => {
  const dialog = ilse.getByRole("dialog", { name: "Referee copies" });
  await ilse.reload();
  await untilSays(ilse, "fifths", /^Current/);
  const argument = await untilSays(ilse, "argument", /^Current.*η = [\d.]+ \(/s);
  await choose(ilse, "Referee copies");
  await dialog.getByRole("radio", { name: "matrix" }).check();
  await dialog.getByRole("checkbox", { name: "laws tests" }).check();
  await dialog.getByRole("checkbox", { name: "fifths elasticities" }).check();
  await dialog.getByRole("checkbox", { name: "argument text" }).check();
  await dialog.getByRole("checkbox", { name: /^With the methods of its systems/ }).check();
  await dialog.getByLabel("The link opens").selectOption("for 90 days");
  await dialog.getByLabel("In the place of").selectOption({ index: 1 });
  await dialog.getByLabel("Send the link to").fill("editor@journal.example");
  await dialog.getByRole("button", { name: "Seal a referee copy" }).click();
  await dialog.getByText(/on its way to editor@journal\.example/).waitFor();
  await dialog.getByText(/matrix with laws, fifths and argument.*opens until/).waitFor();
  await dialog.getByText(/replaced by that of/).waitFor();

  const other = await stranger();
  const asked: string[] = [];
  other.on("request", (request) => asked.push(request.url()));
  await other.goto(link);
  await other.getByRole("complementary", { name: "A newer copy" }).getByRole("button").click();
  await other.getByRole("region", { name: "laws tests" }).getByRole("table").first().waitFor();
  await other.getByRole("region", { name: "fifths elasticities" }).getByRole("table").first().waitFor();
  const text = other.getByRole("region", { name: "argument text" });
  await text.locator(".katex-display").waitFor();
  const [luxury] = /η = ([\d.]+ \([\d.]+\))/.exec(argument)?.slice(1) ?? [];
  expect(luxury).toBeDefined();
  expect(await wordsOf(text)).toContain(`η = ${luxury}, and grains a necessity`);
  expect(await wordsOf(text.getByRole("row", { name: /^base: eta, meat & fish/ }))).toContain(luxury);
  expect(await wordsOf(other.getByRole("region", { name: "base methods" }))).toContain("Deaton");
  expect((await computedAgain(other)).largest).toBeLessThan(ROUNDING);
  expect(await faultsOf(other)).toEqual([]);
  // The type of formulae is fetched for a copy that has some, and for no other.
  expect(watched.requests.filter((address) => MATHEMATICS.test(address))).toEqual([]);
  expect(asked.some((address) => MATHEMATICS.test(address))).toBe(true);
  await other.context().close();
});

it("a revoked and a wrong link give the same plain page and the same answer", async () => {
  const dialog = ilse.getByRole("dialog", { name: "Referee copies" });
  await ilse.reload();
  await choose(ilse, "Referee copies");
  await dialog
    .getByText(/last opened/)
    .first()
    .waitFor();
  // The older of the two: the list has the newest first.
  await dialog.getByRole("button", { name: "Revoke the copy of matrix" }).last().click();
  await dialog.getByText(/; revoked /).waitFor();
  const wrong = link.replace(/[\w-]{43}$/, (token) => [...token].reverse().join(""));
  const seen = async (address: string) => {
    const other = await stranger();
    const answered = other.waitForResponse((response) => response.url() === apiOf(address));
    await other.goto(address);
    await other.getByRole("heading", { level: 1, name: "This link opens nothing" }).waitFor();
    const response = await answered;
    const headers = Object.keys(await response.allHeaders()).toSorted();
    const shown = { page: await other.locator("body").innerHTML(), title: await other.title() };
    const said = { status: response.status(), body: await response.text(), headers };
    await other.context().close();
    return { ...shown, ...said };
  };
  const [revoked, unknown] = [await seen(link), await seen(wrong)];
  expect(revoked).toEqual(unknown);
  expect(revoked.status).toBe(404);
  expect(revoked.page).not.toContain(copy.content.study.title);
  await eventually(
    async () => (await page.request.get(apiOf(link))).status(),
    (status) => status === 404,
    "the copy is gone for who had it open",
  );
});
