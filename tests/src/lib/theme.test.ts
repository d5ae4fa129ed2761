import { readFileSync } from "node:fs";
import { runInThisContext } from "node:vm";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { chooseTheme, followTheme, themeChoice } from "../../../src/lib/theme.ts";

let systemIsDark = false;
const listeners = new Set<() => void>();
const theme = () => document.documentElement.dataset.theme;

beforeEach(() => {
  localStorage.clear();
  systemIsDark = false;
  vi.stubGlobal("matchMedia", () => ({
    get matches() {
      return systemIsDark;
    },
    addEventListener: (_: string, listener: () => void) => listeners.add(listener),
    removeEventListener: (_: string, listener: () => void) => listeners.delete(listener),
  }));
});
afterEach(() => vi.unstubAllGlobals());

describe("the theme", () => {
  it("follows the system until one is chosen, and again when the choice is given back", () => {
    const stop = followTheme();
    expect(theme()).toBe("light");
    systemIsDark = true;
    for (const listener of listeners) listener();
    expect(theme()).toBe("dark");
    chooseTheme("light");
    expect([theme(), themeChoice()]).toEqual(["light", "light"]);
    chooseTheme("system");
    expect([theme(), themeChoice()]).toEqual(["dark", "system"]);
    stop();
    expect(listeners.size).toBe(0);
  });

  it("is set before the first paint by the same rule", () => {
    const script = readFileSync("src/public/theme.js", "utf8");
    vi.stubGlobal("document", document);
    vi.stubGlobal("localStorage", localStorage);
    chooseTheme("dark");
    document.documentElement.dataset.theme = "";
    runInThisContext(script);
    expect(theme()).toBe("dark");
    chooseTheme("system");
    document.documentElement.dataset.theme = "";
    runInThisContext(script);
    expect(theme()).toBe("light");
  });
});
