import { mkdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import axe from "axe-core";
import type { Page, PageScreenshotOptions } from "playwright-core";

/** The machine's themes; every page follows them. */
export const THEMES = ["light", "dark"] as const;
export type Theme = (typeof THEMES)[number];

/** The law's rules, the size of targets among them, and the practice beyond. */
const RULES = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"];
/** Where pictures of the pages are left to be looked at; no part of the repository. */
const PICTURES = fileURLToPath(new URL("../artefacts/", import.meta.url));

/** Turns the machine's theme on an open page, which follows it. */
export async function turn(page: Page, theme: Theme): Promise<void> {
  await page.emulateMedia({ colorScheme: theme });
  await page.locator(`html[data-theme="${theme}"]`).waitFor();
}

/** Waits until nothing moves and no finding is still on its way. */
export async function settled(page: Page): Promise<void> {
  await page.getByText("Fetching").first().waitFor({ state: "hidden" });
  await page.evaluate(() => document.fonts.ready);
  await page.waitForFunction(() => document.getAnimations().every(({ playState }) => playState !== "running"));
}

export async function picture(page: Page, name: string, options: PageScreenshotOptions = {}): Promise<void> {
  mkdirSync(PICTURES, { recursive: true });
  await page.screenshot({ ...options, path: `${PICTURES}${name}.png` });
}

/**
 * What breaks a rule of access in a page, or in the part of it that fits a selector: what is laid over a page is
 * looked at by itself, since the page beneath is looked at as a page. The rules are brought once into every page that
 * is loaded; only violations are described, and nothing is fetched again for rules that are not asked for.
 */
export async function faultsOf(page: Page, within?: string) {
  if (!(await page.evaluate(() => "axe" in window))) await page.evaluate(axe.source);
  const { violations } = await page.evaluate(
    ([rules, part]) => {
      const { axe: inPage } = window as unknown as { axe: typeof axe };
      return inPage.run(part ?? document, {
        runOnly: { type: "tag", values: [...rules] },
        resultTypes: ["violations"],
        preload: false,
      });
    },
    [RULES, within] as const,
  );
  return violations.flatMap(({ id, help, nodes }) =>
    nodes.map(({ html, any }) => ({ id, help, html: html.slice(0, 300), why: any[0]?.message })),
  );
}
