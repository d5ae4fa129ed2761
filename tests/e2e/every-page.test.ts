import type { Browser, BrowserContext, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import type { StudyStatus } from "../../shared/schemas/status.ts";
import { faultsOf, picture, settled, THEMES } from "./access.ts";
import { eventually } from "./editing.ts";
import { fromApi, untilSays } from "./study-page.ts";
import { demoStudyId, ILSE, linkSentTo, openBrowser, Product, signIn } from "./support.ts";
import { watch } from "./watch.ts";

/**
 * Whoever sees badly, hears the page or has a small one: every page in both themes and at three widths; all
 * rules of access in every one of the six.
 */
const WIDTHS = [1440, 720, 390] as const;
const TELEPHONE = 390;
interface Place {
  readonly name: string;
  readonly path: () => string;
  /** Waits until the page is there in full. */
  readonly ready: (page: Page) => Promise<unknown>;
  readonly signedIn: boolean;
  /** Answers that are refused because that is what the page is about. */
  readonly refused?: RegExp;
}

let product: Product;
let browser: Browser;
let state: Awaited<ReturnType<BrowserContext["storageState"]>>;
let studyId: string;
const ids = new Map<string, string>();
const tokens = new Map<string, string>();
/** Pages behind links that were sent. */
const links = new Map<string, string>();

const heading = (name: string | RegExp) => (page: Page) => page.getByRole("heading", { name }).first().waitFor();
const cell = (name: string) => () => `/studies/${studyId}/cells/${ids.get(name)}`;
const copy = (name: string) => () => `/referee/${tokens.get(name)}`;

const PLACES: readonly Place[] = [
  {
    name: "sign-in",
    path: () => "/sign-in",
    ready: (page) => page.getByRole("region", { name: "The demo study" }).waitFor(),
    signedIn: false,
  },
  { name: "create-account", path: () => "/create-account", ready: heading("Create an account"), signedIn: false },
  {
    name: "finish-account",
    path: () => links.get("account") ?? "",
    ready: (page) => page.getByLabel("Name").waitFor(),
    signedIn: false,
  },
  {
    name: "forgotten-passphrase",
    path: () => "/forgotten-passphrase",
    ready: heading("Forgotten passphrase"),
    signedIn: false,
  },
  {
    name: "reset-passphrase",
    path: () => "/reset-passphrase/a-link",
    ready: heading("Set a new passphrase"),
    signedIn: false,
  },
  { name: "confirm-address", path: () => "/confirm-address/a-link", ready: heading("Confirm"), signedIn: false },
  {
    name: "invitation",
    path: () => links.get("invitation") ?? "",
    ready: (page) => page.getByLabel("Name").waitFor(),
    signedIn: false,
    // Asks whether whoever opens the link is signed in.
    refused: /401.*\/api\/me\b/,
  },
  { name: "account", path: () => "/account", ready: heading("What is kept of you"), signedIn: true },
  { name: "messages", path: () => "/administration", ready: heading("Finish your account"), signedIn: true },
  {
    name: "accounts",
    path: () => "/administration/accounts",
    ready: (page) => page.getByText("Petra Vance").waitFor(),
    signedIn: true,
  },
  {
    name: "studies",
    path: () => "/",
    ready: (page) => page.getByRole("link", { name: /^Food demand in Velmark/ }).waitFor(),
    signedIn: true,
  },
  {
    name: "deleted-studies",
    path: () => "/",
    ready: async (page) => {
      await page.getByRole("button", { name: /^Deleted/ }).click();
      await page.getByRole("button", { name: "Delete for good Bread by week" }).click();
    },
    signedIn: true,
  },
  {
    name: "installation-journal",
    path: () => "/administration/journal",
    ready: (page) => page.getByText(/deleted a study for good|study was deleted for good/i).waitFor(),
    signedIn: true,
  },
  {
    name: "study",
    path: () => `/studies/${studyId}`,
    ready: async (page) => {
      for (const name of ids.keys()) await untilSays(page, name, /^Current(?!.*Fetching)/);
    },
    signedIn: true,
  },
  { name: "data-cell", path: cell("survey"), ready: heading("Row accounting"), signedIn: true },
  {
    name: "system-cell",
    path: cell("base"),
    ready: async (page) => {
      await heading("Fit and convergence")(page);
      // The figure is drawn when it comes near the window, from which parts that arrive above may push it again.
      const figure = page.getByRole("heading", { name: "Engel curves" });
      const ticks = page.locator(".js-plotly-plot .ytick text");
      const look = async () => {
        await figure.evaluate((element) => element.scrollIntoView());
        return ticks.count();
      };
      await eventually(look, (count) => count > 0, "the Engel curves are drawn");
    },
    signedIn: true,
  },
  {
    name: "side-by-side",
    path: () => `/studies/${studyId}/compare/${ids.get("base")}/${ids.get("linear")}`,
    ready: (page) => page.getByRole("group", { name: "Elasticities side by side" }).waitFor(),
    signedIn: true,
  },
  {
    name: "history",
    path: () => `/studies/${studyId}/history`,
    ready: async (page) => {
      await page.getByText(/added survey/).waitFor();
      await page.getByRole("button", { name: "Keep the study as it stands" }).click();
      await page.getByLabel("Name").waitFor();
    },
    signedIn: true,
  },
  { name: "tests-cell", path: cell("laws"), ready: heading("All statistics"), signedIn: true },
  {
    name: "slutsky-cell",
    path: cell("matrix"),
    ready: (page) => page.getByRole("region", { name: "Entry pointed at" }).waitFor(),
    signedIn: true,
  },
  {
    name: "elasticities-cell",
    path: cell("fifths"),
    ready: heading("Price elasticities"),
    signedIn: true,
  },
  {
    name: "figure-cell",
    path: cell("demand"),
    ready: async (page) => {
      await heading(/^Quantity bought against its own price/)(page);
      const ticks = page.locator(".js-plotly-plot .ytick text");
      await eventually(
        () => ticks.count(),
        (count) => count > 0,
        "the demand curve is drawn",
      );
    },
    signedIn: true,
  },
  {
    name: "price-change-cell",
    path: cell("levy"),
    ready: async (page) => {
      await heading("Who bears it")(page);
      await page.getByRole("slider", { name: "Sweet drinks" }).waitFor();
    },
    signedIn: true,
  },
  { name: "text-cell", path: cell("argument"), ready: heading("Quoted numbers"), signedIn: true },
  { name: "referee-copy", path: copy("with authors"), ready: heading(/^Largest difference/), signedIn: false },
  { name: "blinded-copy", path: copy("without authors"), ready: heading(/^Largest difference/), signedIn: false },
  {
    name: "no-copy",
    path: () => "/referee/nothing",
    ready: heading("This link opens nothing"),
    signedIn: false,
    refused: /404.*\/api\/referee\/nothing/,
  },
  {
    name: "nowhere",
    path: () => "/not/an/address",
    ready: (page) => page.locator("h1").first().waitFor(),
    signedIn: true,
  },
];

beforeAll(async () => {
  product = await Product.start();
  browser = await openBrowser();
  const ilse = await signIn(browser, product, ILSE);
  studyId = await demoStudyId(ilse);
  const { cells } = await fromApi<StudyStatus>(ilse, `/api/studies/${studyId}/status`);
  for (const { name, cellId } of cells) ids.set(name, cellId);
  for (const withholdAuthors of [false, true]) {
    const sealed = await ilse.request.post(`/api/studies/${studyId}/referee-copies`, {
      data: { cellId: ids.get("matrix"), note: "The matrix of table 4.", withholdAuthors },
      headers: { origin: product.origin },
    });
    const { token } = (await sealed.json()) as { token: string };
    tokens.set(withholdAuthors ? "without authors" : "with authors", token);
  }
  const headers = { origin: product.origin };
  await ilse.request.post("/api/account-links", { data: { email: "nora.lind@vihe.example" }, headers });
  links.set("account", await linkSentTo(product, "nora.lind@vihe.example"));
  const invited = { email: "jun.okafor@vihe.example", role: "reader" };
  await ilse.request.post(`/api/studies/${studyId}/invitations`, { data: invited, headers });
  links.set("invitation", await linkSentTo(product, invited.email));
  for (const title of ["Bread by week", "Salt by week"]) {
    const made = await ilse.request.post("/api/studies", { data: { title }, headers });
    const { id } = (await made.json()) as { id: string };
    await ilse.request.delete(`/api/studies/${id}`, { headers });
    if (title.startsWith("Salt")) await ilse.request.delete(`/api/deleted-studies/${id}`, { headers });
  }
  state = await ilse.context().storageState();
  await ilse.context().close();
});

afterAll(async () => {
  await browser?.close();
  await product?.remove();
});

/** One profile for whoever is signed in and one for whoever is not, as people have: what has been fetched is not fetched again. */
const profiles = new Map<boolean, BrowserContext>();

async function openPage(signedIn: boolean): Promise<Page> {
  const profile =
    profiles.get(signedIn) ??
    (await browser.newContext({
      baseURL: product.origin,
      viewport: { width: WIDTHS[0], height: 1000 },
      colorScheme: THEMES[0],
      reducedMotion: "reduce",
      ...(signedIn && { storageState: state }),
    }));
  profiles.set(signedIn, profile);
  return profile.newPage();
}

/** Gives an open page a width; the narrowest is a telephone's and pointed at with a finger. */
async function resizer(page: Page): Promise<(width: number) => Promise<void>> {
  const device = await page.context().newCDPSession(page);
  return async (width) => {
    await device.send("Emulation.setTouchEmulationEnabled", { enabled: width === TELEPHONE });
    await page.setViewportSize({ width, height: width === TELEPHONE ? 844 : 1000 });
  };
}

/** Shows what an opened cell keeps shut on a narrow screen, and what any page keeps for whoever asks. */
async function unfold(page: Page): Promise<void> {
  const form = page.getByRole("button", { name: "Form", exact: true, pressed: false });
  if ((await page.locator(".opened-band").count()) > 0 && (await form.count()) > 0) await form.click();
  await page.evaluate(() => {
    for (const details of document.querySelectorAll("details")) details.open = true;
  });
}

it.each(PLACES)("$name has no fault that a machine can find, in either theme at any width", async (place) => {
  const page = await openPage(place.signedIn);
  const watched = watch(page, product.origin);
  const resize = await resizer(page);
  for (const theme of THEMES) {
    // From wide to narrow in one theme and back in the other, so that each end is also where a page begins.
    const widths = theme === THEMES[0] ? WIDTHS : WIDTHS.toReversed();
    await resize(widths[0]);
    await page.emulateMedia({ colorScheme: theme });
    await page.goto(place.path());
    await place.ready(page);
    for (const width of widths) {
      await resize(width);
      if (width !== widths[0]) await unfold(page);
      await settled(page);
      expect(await page.locator("html").getAttribute("data-theme")).toBe(theme);
      expect(await page.evaluate(() => matchMedia("(pointer: coarse)").matches)).toBe(width === TELEPHONE);
      if (width !== WIDTHS[1]) await picture(page, `${place.name}-${theme}-${width}`, { fullPage: true });
      expect.soft(await faultsOf(page), `${theme}, ${width} pixels`).toEqual([]);
      const [wide, inner] = await page.evaluate(() => [document.documentElement.scrollWidth, innerWidth]);
      expect.soft(wide, `the document's width at ${width} pixels, ${theme}`).toBeLessThanOrEqual(inner);
    }
  }
  expect.soft(watched.takeFaults().filter((fault) => !place.refused?.test(fault))).toEqual([]);
  expect.soft(watched.outside).toEqual([]);
  await page.close();
});
