import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { bibtexEntry, cited, referenceInWords, sortedReferences } from "../../../shared/tables/cite.ts";
import { REFERENCES, type Reference, type ReferenceKey } from "../../../shared/tables/references.ts";

const KEYS = Object.keys(REFERENCES) as ReferenceKey[];
const ROOT = new URL("../../../", import.meta.url).pathname;

/** Comments of everything that computes, as one text on one line. */
function comments(): string {
  const files = ["shared/systems", "shared/economics", "shared/schemas", "server/engine"].flatMap((folder) =>
    readdirSync(join(ROOT, folder), { recursive: true, encoding: "utf8" })
      .filter((name) => name.endsWith(".ts"))
      .map((name) => readFileSync(join(ROOT, folder, name), "utf8")),
  );
  return files.join("\n").replace(/\s*\n\s*(\*|\/\/)?\s*/g, " ");
}

describe("references", () => {
  it("have every field a journal prints, pages in order", () => {
    for (const key of KEYS) {
      const { journal, volume, issue, pages, school } = REFERENCES[key] as Reference;
      if (journal === undefined) expect(school).toBeTruthy();
      else {
        expect([typeof volume, typeof issue]).toEqual(["number", "number"]);
        expect(pages?.[0]).toBeLessThan(pages?.[1] ?? 0);
      }
      expect(key.endsWith(String(REFERENCES[key].year))).toBe(true);
    }
  });

  it("agree in volume and pages with the docstrings that cite them", () => {
    const text = comments();
    let compared = 0;
    const plain = (name: string) => name.replaceAll(" & ", " and ");
    for (const key of KEYS) {
      const { authors, year, journal, volume, pages } = REFERENCES[key] as Reference;
      const names = authors.map(([family]) => family).join("(?: & |, | and )");
      const cites = new RegExp(`${names},? \\(?${year},? ([A-Z][^();]*?) (\\d+)(?:, (\\d+)–(\\d+))?[).,;:]`, "g");
      for (const [whole, where, number, first, last] of text.matchAll(cites)) {
        if (journal === undefined) continue;
        expect(`${plain(where)} ${number}`, whole).toBe(`${plain(journal)} ${volume}`);
        if (first) expect([Number(first), Number(last)], whole).toEqual(pages);
        compared += 1;
      }
    }
    expect(compared).toBeGreaterThan(12);
  });

  it("read in words and as BibTeX", () => {
    expect(referenceInWords("laitinen1978")).toBe(
      "Laitinen, K. (1978). Why is demand homogeneity so often rejected? Economics Letters 1(3), 187–191.",
    );
    expect(referenceInWords("barten1966")).toMatch(/Doctoral thesis, Netherlands School of Economics, Rotterdam\.$/);
    expect(cited("banksBlundellLewbel1997")).toBe("Banks, Blundell and Lewbel 1997");
    expect(bibtexEntry("kunsch1989")).toBe(
      '@article{kunsch1989,\n  author = {K{\\"u}nsch, H. R.},\n  title = {The jackknife and the bootstrap for general stationary observations},\n  journal = {Annals of Statistics},\n  volume = {17},\n  number = {3},\n  pages = {1217--1241},\n  year = {1989}\n}',
    );
    expect(bibtexEntry("lewbelPendakur2009")).toContain("title = {Tricks with {Hicks}: the {EASI} demand system}");
    expect(bibtexEntry("ryanWales1998")).toContain("Business \\& Economic");
  });

  it("stand once each by author, then year", () => {
    expect(sortedReferences(["stone1954", "moschini1998", "moschini1995", "stone1954"])).toEqual([
      "moschini1995",
      "moschini1998",
      "stone1954",
    ]);
  });
});
