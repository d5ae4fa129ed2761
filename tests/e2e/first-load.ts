import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { gzipSync } from "node:zlib";
import type { Page } from "playwright-core";

const BUILT = fileURLToPath(new URL("../../dist/client/", import.meta.url));

export interface FirstLoad {
  /** Every script asked for before the page could be read, with its compressed bytes. */
  readonly before: readonly { readonly name: string; readonly bytes: number }[];
  readonly bytes: number;
  /** The names of those asked for later, without anyone doing anything. */
  readonly after: readonly string[];
}

/**
 * Opens an address anew and reads from the browser's own log which scripts it asked for before anything that fits the
 * selector stood on the page. Compressed bytes are gzip's, as the server sends them to whoever takes nothing else.
 */
export async function firstLoad(page: Page, path: string, selector: string): Promise<FirstLoad> {
  await page.addInitScript((wanted) => {
    performance.setResourceTimingBufferSize(2_000);
    new MutationObserver((_, observer) => {
      if (!document.querySelector(wanted)) return;
      observer.disconnect();
      performance.mark("readable");
    }).observe(document, { childList: true, subtree: true });
  }, selector);
  await page.goto(path);
  await page.locator(selector).first().waitFor();
  await page.waitForLoadState("networkidle");
  const asked = await page.evaluate(() => {
    const [{ startTime: readable }] = performance.getEntriesByName("readable");
    return performance
      .getEntriesByType("resource")
      .map(({ name, startTime }) => ({ path: new URL(name).pathname, isBefore: startTime < readable }))
      .filter(({ path }) => path.endsWith(".js"));
  });
  const names = (isBefore: boolean) => [
    ...new Set(asked.filter((one) => one.isBefore === isBefore).map((one) => one.path.slice(1))),
  ];
  const before = names(true).map((name) => ({ name, bytes: gzipSync(readFileSync(`${BUILT}${name}`)).length }));
  return { before, bytes: before.reduce((sum, { bytes }) => sum + bytes, 0), after: names(false) };
}

/** The figures, largest first: what a failure is told with. */
export function figures({ before, bytes }: FirstLoad): string {
  const lines = before.toSorted((a, b) => b.bytes - a.bytes).map(({ name, bytes }) => `${inKb(bytes)} ${name}`);
  return [`${inKb(bytes)} in ${before.length} scripts`, ...lines].join("\n");
}

const inKb = (bytes: number) => `${(bytes / 1000).toFixed(1)} kB`;
