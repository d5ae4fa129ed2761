import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";

const css = readFileSync("src/styles/tokens.css", "utf8");
const dark = css.slice(css.indexOf('[data-theme="dark"]'), css.indexOf("@layer base"));
const light = css.slice(0, css.indexOf('[data-theme="dark"]'));

function palette(text: string): Record<string, string> {
  return Object.fromEntries(
    [...text.matchAll(/--([\w-]+): (#[0-9a-f]{6});/g)].map(([, name, colour]) => [name, colour]),
  );
}

/** Relative luminance and contrast ratio of WCAG 2. */
function luminance(colour: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const part = Number.parseInt(colour.slice(at, at + 2), 16) / 255;
    return part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}
function contrast(a: string, b: string): number {
  const [high, low] = [luminance(a), luminance(b)].toSorted((x, y) => y - x);
  return (high + 0.05) / (low + 0.05);
}

const THEMES = { light: palette(light), dark: palette(dark) };
const SIGNED = ["n5", "n4", "n3", "n2", "n1", "z0", "p1", "p2", "p3", "p4", "p5"];

describe.each(Object.entries(THEMES))("the %s palette", (theme, colours) => {
  it("has every colour of the other", () => {
    expect(Object.keys(colours).toSorted()).toEqual(Object.keys(THEMES.light).toSorted());
    expect(Object.keys(colours)).toHaveLength(39);
  });

  it("sets every text at 4.5 to 1 or more on every page", () => {
    const texts = ["ink", "ink2", "ink3", "accent", "stale", "fail", "who-a", "who-b", "who-c", "who-d"];
    for (const text of texts) {
      for (const page of ["paper", "verso", "recto"]) {
        expect(contrast(colours[text], colours[page]), `${text} on ${page}`).toBeGreaterThanOrEqual(4.5);
      }
    }
    for (const [text, ground] of [
      ["accent-ink", "accent"],
      ["accent-ink", "accent-2"],
      ["stale", "stale-wash"],
      ["fail", "fail-wash"],
      ["accent", "accent-wash"],
      ["ink3", "stale-wash"],
    ]) {
      expect(contrast(colours[text], colours[ground]), `${text} on ${ground}`).toBeGreaterThanOrEqual(4.5);
    }
  });

  it("draws edges and series at 3 to 1 or more", () => {
    for (const page of ["paper", "verso", "recto"])
      expect(contrast(colours.ctl, colours[page])).toBeGreaterThanOrEqual(3);
    for (const series of ["s1", "s2", "s3", "s4", "s5", "s6"]) {
      expect(contrast(colours[series], colours.recto), series).toBeGreaterThanOrEqual(3);
    }
  });

  it("prints on every step of the signed scale", () => {
    for (const step of SIGNED) {
      const deep = ["n5", "n4", "p4", "p5"].includes(step);
      const text = deep ? (theme === "light" ? colours.recto : colours.paper) : colours.ink;
      expect(contrast(text, colours[step]), step).toBeGreaterThanOrEqual(4.5);
    }
  });
});
