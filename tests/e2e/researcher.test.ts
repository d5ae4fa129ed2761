import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { replicateBundle } from "../../server/bin/replicate-bundle.ts";
import { isReplicated, replicationInWords } from "../../server/bin/replication-words.ts";
import { QUIET } from "../../server/engine/run.ts";
import type { SlutskyFinding } from "../../shared/schemas/slutsky.ts";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import { purchasesCsv } from "../support/purchases-csv.ts";
import { bandOf, eventually, openText, textIn, typeAt, wordsOf } from "./editing.ts";
import { addCell, choose, findingOf, fromApi, rewriteLine, untilSays } from "./study-page.ts";
import { linkSentTo, openBrowser, Product } from "./support.ts";
import { watch } from "./watch.ts";

const FIXTURES = new URL("../reference/fixtures/", import.meta.url);
const TUNA = fileURLToPath(new URL("tuna-weekly.csv", FIXTURES));
const reference = JSON.parse(readFileSync(new URL("tuna.json", FIXTURES), "utf8"));
const TITLE = "Weekly tuna purchases";
const ANNA = { name: "Anna Verhoeven", email: "anna.verhoeven@vihe.example", passphrase: "seven brands of tuna" };
const BORIS = { name: "Boris Lindqvist", email: "boris.lindqvist@vihe.example", passphrase: "thirteen in a case" };

let product: Product;
let browser: Browser;
let page: Page;
let watched: ReturnType<typeof watch>;

const studyPath = () => new URL(page.url()).pathname;
const studyApi = () => `/api${studyPath()}`;

async function statusOf(cell: string) {
  const { cells } = await fromApi<StudyStatus>(page, `${studyApi()}/status`);
  const found = cells.find(({ name }) => name === cell);
  if (!found) throw new Error(`There is no cell ${cell}.`);
  return found;
}

async function findingFromApi<T>(cell: string) {
  const { fingerprint } = await statusOf(cell);
  return fromApi<{ finding: T; foundAt: string }>(page, `${studyApi()}/findings/${fingerprint}`);
}

async function createAccount(who: Page, { name, email, passphrase }: typeof ANNA): Promise<void> {
  await who.goto("/sign-in");
  await who.getByRole("link", { name: "Create an account" }).click();
  await who.getByRole("button", { name: "Send the link" }).waitFor();
  await who.getByLabel("Email").fill(email);
  await who.getByRole("button", { name: "Send the link" }).click();
  await who.getByText("A message is on its way").waitFor();
  await who.goto(await linkSentTo(product, email));
  await who.getByLabel("Name").fill(name);
  await who.getByLabel("Passphrase", { exact: true }).fill(passphrase);
  await who.getByRole("button", { name: "Create the account" }).click();
  await who.getByRole("heading", { name: "Studies", level: 1 }).waitFor();
}

/** Gives the page's file field a file, from memory or from a path. */
const give = (file: string | { name: string; text: string }) =>
  page
    .getByLabel("Choose a file")
    .setInputFiles(
      typeof file === "string" ? file : { name: file.name, mimeType: "text/csv", buffer: Buffer.from(file.text) },
    );

const near = (actual: number, expected: number, bound: number) =>
  expect(Math.abs(actual - expected) / (1 + Math.abs(expected))).toBeLessThan(bound);

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  const context = await browser.newContext({ baseURL: product.origin, viewport: { width: 1440, height: 1000 } });
  page = await context.newPage();
  watched = watch(page, product.origin);
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

it("creates an account, signs out and in again", async () => {
  await page.goto("/");
  await page.waitForURL((url) => url.pathname === "/sign-in");
  await createAccount(page, ANNA);
  await page.getByText("No study yet.").waitFor();
  await page.getByRole("button", { name: "Sign out" }).click();
  await page.getByLabel("Email").fill(ANNA.email);
  await page.getByLabel("Passphrase", { exact: true }).fill("eight brands of tuna");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  expect(await wordsOf(page.getByRole("alert"))).toMatch(/\w+ \w+.*\.$/);
  await page.getByLabel("Passphrase", { exact: true }).fill(ANNA.passphrase);
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.getByRole("heading", { name: "Studies", level: 1 }).waitFor();
  // Asking who is signed in, and the wrong passphrase: refused as they should be, and nothing else went wrong.
  expect(watched.takeFaults()).toEqual([
    expect.stringMatching(/401.*\/api\/me/),
    expect.stringMatching(/401.*\/sign-in\/email/),
  ]);
});

it("makes a study with a data cell that waits for a file", async () => {
  await page.getByRole("button", { name: "New study" }).click();
  await page.getByRole("dialog", { name: "New study" }).getByLabel("Title").fill(TITLE);
  await page.getByRole("button", { name: "Make the study" }).click();
  await page.waitForURL((url) => url.pathname.startsWith("/studies/"));
  await addCell(page, "data", "purchases");
  await untilSays(page, "purchases", "waits for a file");
});

const lines = readFileSync(TUNA, "utf8").split("\n");
const changed = (at: number, change: (line: string) => string) =>
  lines.map((line, index) => (index === at ? change(line) : line)).join("\n");

it.each([
  ["not a CSV", { name: "letter.csv", text: "Dear colleague\nthe file follows\n" }, /header.*Dear colleague.*no comma/],
  ["a ragged row", { name: "ragged.csv", text: changed(41, (line) => `${line},1`) }, /[Rr]ow 41\b.*16 cells.*15/],
  ["a duplicate header", { name: "twice.csv", text: changed(0, (line) => line.replace("p2", "p1")) }, /\bp1\b/],
])("refuses %s in a sentence that names the place, and keeps the study as it was", async (_, file, sentence) => {
  await give(file);
  const alert = page.getByRole("alert");
  await alert.waitFor();
  expect(await wordsOf(alert)).toMatch(sentence);
  expect(await wordsOf(alert)).toContain(file.name);
  await untilSays(page, "purchases", "waits for a file");
  expect(await fromApi(page, `${studyApi()}/uploads`)).toEqual([]);
  expect(watched.takeFaults()).toEqual([expect.stringMatching(/422.*\/uploads/)]);
});

it("uploads the weekly tuna file and sees how far it is", async () => {
  // As over a line that hardly carries anything until there was something to see.
  const line = await page.context().newCDPSession(page);
  const speed = { offline: false, latency: 0, downloadThroughput: -1, uploadThroughput: 1_000 };
  await line.send("Network.emulateNetworkConditions", speed);
  const sent = page.getByRole("progressbar", { name: /^Sending tuna-weekly\.csv, \d+\s%$/ });
  await Promise.all([sent.waitFor(), give(TUNA)]);
  await line.send("Network.emulateNetworkConditions", { ...speed, uploadThroughput: -1 });
  await untilSays(page, "purchases", "All 338 rows are used.");
  expect(await page.getByRole("alert").count()).toBe(0);
});

it("finds a mapping suggested, takes it, and sees what became of every row", async () => {
  const band = bandOf(page, "purchases");
  expect(await wordsOf(band.locator(".verso"))).toContain("seven, each by price and quantity");
  await band.getByText("seven, each by price and quantity").click();
  expect(await band.getByRole("combobox", { name: "Price of good7" }).inputValue()).toBe("p7");
  expect(await band.getByRole("combobox", { name: "Quantity of good7" }).inputValue()).toBe("q7");
  expect(await band.getByLabel("Time", { exact: true }).inputValue()).toBe("week");
  await band.getByRole("link", { name: "Row accounting of purchases" }).click();
  const accounting = page.getByRole("region", { name: "Row accounting" }).first();
  await eventually(
    () => accounting.getByRole("row").allTextContents(),
    (rows) => /Rows uploaded.*338/.test(rows.join("\n")) && /Rows used.*338/.test(rows.join("\n")),
    "338 rows uploaded and used",
  );
  await page.getByRole("link", { name: "Back to the study" }).click();
});

it("is told of a column that is not there, and takes the nearest that is", async () => {
  const text = await openText(page, "purchases");
  await rewriteLine(text, "time:", "time: weak");
  await untilSays(page, "purchases", /Failed.*weak/);
  await findingOf(page, "purchases").getByRole("button", { name: "Use week" }).click();
  await untilSays(page, "purchases", "All 338 rows are used.");
  expect(await textIn(text)).toContain("time: week");
});

it("is told of a text that cannot be read where it cannot be, and keeps the text", async () => {
  const text = await openText(page, "purchases");
  const sound = await textIn(text);
  await rewriteLine(text, "time:", "time: week: month");
  const said = await untilSays(page, "purchases", /Failed/);
  expect(said).not.toContain("waits for a file");
  const written = await textIn(text);
  const band = bandOf(page, "purchases");
  await band.getByRole("button", { name: "Form", exact: true }).click();
  await band.getByText("The text cannot be read as it stands").waitFor();
  expect(await textIn(await openText(page, "purchases"))).toBe(written);
  await rewriteLine(text, "time:", "time: week");
  await untilSays(page, "purchases", "All 338 rows are used.");
  expect(await textIn(text)).toBe(sound);
});

it("adds a system, meets the mistake form: aid, and mends it with the word offered", async () => {
  const band = await addCell(page, "system", "base");
  const text = await openText(page, "base");
  expect(await textIn(text)).toContain("data: purchases");
  await rewriteLine(text, "form:", "form: aid");
  await untilSays(page, "base", /Failed.*at form, before estimation.*the nearest to aid is aids/);
  expect(await band.getByRole("button", { name: /^Estimate/ }).count()).toBe(0);
  await band.getByRole("button", { name: "Use aids" }).click();
  await untilSays(page, "base", /Draft.*never estimated/);
  expect(await textIn(text)).toContain("form: aids");
});

it("chooses the estimator in the form, and both write one text", async () => {
  const band = bandOf(page, "base");
  await band.getByRole("button", { name: "Form", exact: true }).click();
  expect(await band.getByRole("checkbox", { name: "homogeneity" }).isChecked()).toBe(true);
  expect(await band.getByRole("checkbox", { name: "symmetry" }).isChecked()).toBe(true);
  await band.getByLabel("Estimator").selectOption({ value: "least squares" });
  const text = await textIn(await openText(page, "base"));
  expect(text).toContain("impose: [homogeneity, symmetry]");
  expect(text).toContain("estimator: least squares");
  // What holds without being said is not written.
  await band.getByRole("button", { name: "Form", exact: true }).click();
  await band.getByLabel("Estimator").selectOption({ value: "maximum likelihood" });
  expect(await textIn(await openText(page, "base"))).not.toContain("estimator:");
});

it("estimates, and the log-likelihood is that of a general optimiser", async () => {
  await bandOf(page, "base")
    .getByRole("button", { name: /^Estimate aids, / })
    .click();
  await untilSays(page, "base", /Current.*Fold|Current.*Price terms/);
  const { finding } = await findingFromApi<SystemFinding>("base");
  near(finding.logLikelihood, reference.aids.logLikelihood, 1e-9);
  await page.getByRole("link", { name: "Open of base" }).click();
  const fit = page.getByRole("region", { name: "Fit and convergence" });
  const printed = reference.aids.logLikelihood.toLocaleString("en-GB", {
    minimumFractionDigits: 1,
    maximumFractionDigits: 1,
  });
  expect(await wordsOf(fit)).toContain(`Log-likelihood${printed}`);
  await page.getByRole("link", { name: "Back to the study" }).click();
});

it("adds a matrix, which follows by itself and is checked", async () => {
  await addCell(page, "slutsky", "matrix");
  await untilSays(page, "matrix", /The matrix is symmetric and (not )?negative semidefinite at the base point/);
  const verdicts = await findingOf(page, "matrix").getByRole("list", { name: "What theory says of the matrix" });
  expect(await verdicts.getByRole("listitem").count()).toBe(5);
  for (const law of ["Adding-up", "Homogeneity", "Symmetry", "Negativity", "Monotonicity"]) {
    expect(await wordsOf(verdicts)).toContain(law);
  }
  const { finding } = await findingFromApi<SlutskyFinding>("matrix");
  const { base } = reference.aids;
  finding.at.share.forEach((row, i) => {
    row.forEach((entry, j) => {
      near(entry, base.matrix[i][j], 1e-8);
    });
  });
  finding.at.eigenvalues.forEach(({ value }, i) => {
    near(value, base.eigenvalues[i], 1e-8);
  });
});

it("opens the matrix, goes from entry to entry with the arrow keys and reads the mirror", async () => {
  await page.getByRole("link", { name: "Open of matrix" }).click();
  const matrix = page.getByRole("grid", { name: "Slutsky matrix, share form, at the base point" });
  const panel = page.getByRole("region", { name: "Entry pointed at" });
  await matrix.getByRole("gridcell", { name: /^good1, price of good2:/ }).focus();
  for (const key of ["ArrowRight", "ArrowDown", "ArrowDown"]) await page.keyboard.press(key);
  const focused = page.locator(":focus");
  expect(await focused.getAttribute("aria-label")).toMatch(/^good3, price of good3: .*, standard error /);
  expect(await wordsOf(panel)).toContain("Own price");
  await page.keyboard.press("ArrowLeft");
  expect(await focused.getAttribute("aria-label")).toMatch(/^good3, price of good2:/);
  const mirror = matrix.getByRole("gridcell", { name: /^good2, price of good3:/ });
  const [, value] = /: (\S+),/.exec((await mirror.getAttribute("aria-label")) ?? "") ?? [];
  expect(await wordsOf(panel)).toContain(`Mirror, good2 by good3${value}`);
  await page.keyboard.press("m");
  expect(await focused.getAttribute("aria-label")).toBe(await mirror.getAttribute("aria-label"));
  for (let n = 0; n < 9; n++) await page.keyboard.press("ArrowUp");
  expect(await focused.getAttribute("aria-label")).toMatch(/^good1, price of good3:/);
  await page.keyboard.press("Escape");
});

it("changes the source: out of date and why, the old finding under its own specification", async () => {
  if (!/^\/studies\/[^/]+$/.test(studyPath())) await page.getByRole("link", { name: "Back to the study" }).click();
  const text = await openText(page, "base");
  await rewriteLine(text, "form:", "form: les");
  await rewriteLine(text, "impose:", "impose: []");
  await untilSays(page, "base", /Out of date.*form changed from aids to les/);
  await untilSays(page, "matrix", /Out of date.*base changed/);
  const recto = findingOf(page, "base");
  expect(await recto.getByRole("button", { name: /Price terms/ }).count()).toBe(0);
  await recto.getByRole("button", { name: "Look at the aids finding" }).click();
  const kept = recto.getByRole("region", { name: "The last finding, under its own specification" });
  await kept.getByRole("list", { name: "What theory says of the system" }).waitFor();
  expect(await wordsOf(kept)).toContain("Not this specification's.");
  expect(await wordsOf(kept)).toContain("form: aids");
  expect(await wordsOf(kept)).toContain("impose: [homogeneity, symmetry]");
});

it("undoes the change and is answered from the store", async () => {
  const before = await statusOf("base");
  const asked = watched.requests.length;
  await findingOf(page, "base").getByRole("button", { name: "Return to aids" }).click();
  await untilSays(page, "base", /^Current/);
  await untilSays(page, "matrix", /^Current/);
  const after = await statusOf("base");
  expect(after.fingerprint).toBe(before.last?.fingerprint);
  expect((await findingFromApi("base")).foundAt).toBe(before.last?.at);
  expect(watched.requests.slice(asked).filter((address) => /estimation/.test(address))).toEqual([]);
});

it("looks at rows, replaces the file by a new version, and pins the old", async () => {
  await page.getByRole("link", { name: "Row accounting of purchases" }).click();
  await page.getByRole("button", { name: "Look at the rows of tuna-weekly.csv" }).click();
  const rows = page.getByRole("dialog", { name: "tuna-weekly.csv" });
  await rows.getByText("1 to 50 of 338 rows").waitFor();
  await rows.getByRole("button", { name: "Last" }).click();
  await rows.getByText("301 to 338 of 338 rows").waitFor();
  await page.keyboard.press("Escape");
  const outliers = page.getByRole("list", { name: "Look at the rows of outliers" }).getByRole("button").first();
  await outliers.focus();
  await page.keyboard.press("Enter");
  const far = page.getByRole("dialog", { name: /^Outliers: / });
  await far.getByRole("columnheader", { name: /price ÷ median/ }).waitFor();
  expect(await wordsOf(far)).toMatch(/keep only rows with p\d [<>]= \d/);
  await page.keyboard.press("Escape");
  await page.getByRole("link", { name: "Back to the study" }).click();

  await choose(page, "Uploads");
  const dialog = page.getByRole("dialog", { name: "Uploads" });
  await dialog.getByRole("button", { name: "Replace by a new version of tuna-weekly.csv" }).click();
  const shorter = lines
    .filter((line) => line !== "")
    .slice(0, -1)
    .join("\n");
  const next = dialog.getByLabel("Choose the next version of tuna-weekly.csv");
  await next.setInputFiles({ name: "weeks.csv", mimeType: "text/csv", buffer: Buffer.from(shorter) });
  await dialog.getByText("Against version 1: 1 row fewer, the same columns").waitFor();
  await page.keyboard.press("Escape");
  await untilSays(page, "purchases", "All 337 rows are used.");
  await untilSays(page, "base", /Out of date.*upload replaced by version 2 of tuna-weekly\.csv/);
  const band = bandOf(page, "purchases");
  await band.getByRole("button", { name: "Form", exact: true }).click();
  await band.getByLabel("Version").selectOption("1");
  await untilSays(page, "purchases", "All 338 rows are used.");
  await untilSays(page, "base", /^Current/);
  expect(await textIn(await openText(page, "purchases"))).toContain("version: 1");
});

it("copies a system by a key, sets both side by side, and folds and lists by keys", async () => {
  await bandOf(page, "base").focus();
  await page.keyboard.press("d");
  await untilSays(page, "base 2", /^Current/);
  await bandOf(page, "base 2").focus();
  await page.keyboard.press("b");
  await page.waitForURL((url) => url.pathname.includes("/compare/"));
  await page.getByLabel("On the right").selectOption("base");
  await page.getByText("Both ask the same.").waitFor();
  await page.getByText("The expenditure elasticities agree to 3 decimals for every good.").waitFor();
  const said = page.getByText("No likelihood ratio is formed: base 2 and base are the same system");
  await said.waitFor();
  const table = page.getByRole("group", { name: "Coefficients of the share equations side by side" });
  expect(await table.getByRole("rowheader").allTextContents()).toContainEqual(expect.stringMatching(/difference$/));
  await said.click();
  await page.keyboard.press("Escape");
  await bandOf(page, "base 2").focus();
  await page.keyboard.press("?");
  const sheet = page.getByRole("dialog", { name: "Keys" });
  await sheet.getByText("adds a copy of the cell below it").waitFor();
  await page.keyboard.press("Escape");
  await bandOf(page, "base 2").focus();
  await page.keyboard.press("c");
  await page.reload();
  await bandOf(page, "base 2").getByRole("button", { name: "Unfold base 2" }).click();
  await bandOf(page, "base 2").focus();
  await page.keyboard.press("Delete");
  await page.getByRole("button", { name: "Undo the removal of base 2" }).waitFor();
  await page.getByRole("button", { name: "Leave it so" }).click();
});

it("is told at which row a column of numbers holds a word", async () => {
  const band = await addCell(page, "data", "purchases 2");
  await give({ name: "worded.csv", text: changed(200, (line) => line.replace(/[^,]+$/, "unknown")) });
  await untilSays(page, "purchases 2", "All 338 rows are used.");
  const text = await openText(page, "purchases 2");
  const source = await textIn(text);
  expect(source).not.toContain("p7");
  await text.focus();
  await text.press("Control+Home");
  await rewriteLine(text, "good6:", "good6: {price: p7, quantity: q6}");
  const said = await untilSays(page, "purchases 2", /Failed.*p7/);
  expect(said).toMatch(/row 200\b.*unknown|unknown.*row 200\b/);
  await untilSays(page, "base", /^Current/);
  await band.getByRole("button", { name: "More for purchases 2" }).click();
  await page.getByRole("menuitem", { name: "Remove" }).click();
});

it("cancels an estimation that takes long, and can estimate again", async () => {
  await choose(page, "Uploads");
  const dialog = page.getByRole("dialog", { name: "Uploads" });
  await dialog.getByRole("button", { name: "Remove worded.csv" }).click();
  await dialog.getByRole("button", { name: "Remove worded.csv" }).waitFor({ state: "detached" });
  await give({ name: "wide.csv", text: purchasesCsv({ goods: 24, rows: 4_000, seed: 5 }) });
  await dialog.getByText("4,000 rows, 48 columns").waitFor();
  await dialog.getByRole("button", { name: "Close" }).click();
  // A new data cell begins with the upload that no other cell has taken.
  await addCell(page, "data", "purchases 2");
  await untilSays(page, "purchases 2", "All 4,000 rows are used.");
  const band = await addCell(page, "system", "base 2");
  await band.getByRole("button", { name: /^Estimate aids, / }).click();
  await untilSays(page, "base 2", /Estimating.*(iteration \d|\d\s%).*; \d:\d\d.*Cancel/);
  const running = (await statusOf("base 2")).fingerprint;
  await band.getByRole("button", { name: "Cancel" }).click();
  await untilSays(page, "base 2", /Draft.*cancelled/);
  expect((await page.request.get(`${studyApi()}/findings/${running}`)).status()).toBe(404);
  // The thread is free again: another question is answered at once.
  const text = await openText(page, "base 2");
  await rewriteLine(text, "data:", "data: purchases");
  await rewriteLine(text, "form:", "form: la-aids");
  await band.getByRole("button", { name: /^Estimate la-aids, / }).click();
  await untilSays(page, "base 2", /^Current.*Price terms/);
  const { finding } = await findingFromApi<SystemFinding>("base 2");
  near(finding.logLikelihood, reference.laAids.both.logLikelihood, 1e-9);
});

it("quotes a finding in prose: the number stays true, and says so when it is out of date", async () => {
  await addCell(page, "text", "argument");
  await typeAt("end", await openText(page, "argument"), "On {base: rows} weeks, with $T$ so large.");
  await untilSays(
    page,
    "argument",
    /Current1 quoted number, from a current finding.*On 338 weeks, with .*T.* so large/,
  );
  expect(await bandOf(page, "argument").locator("math").count()).toBe(1);
  const text = await openText(page, "base");
  // A form that has not been estimated on these rows: another would be answered from the store.
  await rewriteLine(text, "form:", "form: quaids");
  // Not before the whole word is typed: on the way to it the cell says other things.
  await untilSays(page, "argument", /^Out of datethe quoted number is out of date/);
  await untilSays(page, "argument", /338 is out of date: base was found .*form changed from aids to quaids/);
  await rewriteLine(text, "form:", "form: aids");
  await untilSays(page, "argument", /^Current/);
  expect(await wordsOf(bandOf(page, "base").locator(".paper-words"))).toContain("(Deaton and Muellbauer 1980)");
});

it("takes a replication bundle away, from which every number is found again", async () => {
  await choose(page, "Replication bundle");
  const dialog = page.getByRole("dialog");
  await dialog.getByRole("radio", { name: /^go along/ }).check();
  const [file] = await Promise.all([
    page.waitForEvent("download"),
    dialog.getByRole("button", { name: "Make the bundle" }).click(),
  ]);
  expect(file.suggestedFilename()).toBe("replication-weekly-tuna-purchases.zip");
  await dialog.getByText("is with your browser's downloads").waitFor();
  await page.keyboard.press("Escape");
  const path = `${product.folder}/bundle.zip`;
  await file.saveAs(path);
  const replication = await replicateBundle(path, [], QUIET);
  const words = replicationInWords(replication, "this program");
  expect(replication.cells.map(({ name }) => name)).toEqual(expect.arrayContaining(["purchases", "base", "matrix"]));
  expect(isReplicated(replication), words).toBe(true);
});

it("invites a coauthor by e-mail, who makes an account on the way and is in the study", async () => {
  const context = await browser.newContext({ baseURL: product.origin });
  const other = await context.newPage();
  await choose(page, "People");
  const dialog = page.getByRole("dialog", { name: "People" });
  await dialog.getByLabel("Email").fill(BORIS.email);
  await dialog.getByRole("button", { name: "Invite", exact: true }).click();
  await dialog.getByText(`A message is on its way to ${BORIS.email}.`).waitFor();
  await dialog.getByRole("button", { name: `Withdraw the invitation of ${BORIS.email}` }).waitFor();
  await dialog.getByRole("button", { name: "Close" }).click();
  await other.goto(await linkSentTo(product, BORIS.email));
  await other.getByText(`Anna Verhoeven invites ${BORIS.email} to ${TITLE}`).waitFor();
  await other.getByLabel("Name").fill(BORIS.name);
  await other.getByLabel("Passphrase", { exact: true }).fill(BORIS.passphrase);
  await other.getByRole("button", { name: "Create the account and accept" }).click();
  await untilSays(other, "matrix", /^Current/);
  const here = page.getByRole("list", { name: "People here" });
  await eventually(
    () => wordsOf(here),
    (words) => words.includes("Boris Lindqvist"),
    "he is here",
  );
  await context.close();
});

it("signs out, and the study is closed", async () => {
  const [study, asked] = [studyPath(), studyApi()];
  expect(watched.outside).toEqual([]);
  await choose(page, "Sign out");
  await page.waitForURL((url) => url.pathname === "/sign-in");
  expect((await page.request.get(asked)).status()).toBe(401);
  await page.goBack();
  await page.goto(study);
  await page.waitForURL((url) => url.pathname === "/sign-in");
  expect(await page.getByText(TITLE).count()).toBe(0);
});
