import { describe, expect, it } from "vitest";
import { proseSpans } from "../../../shared/study/prose-spans.ts";
import { quotable } from "../../../shared/study/quotable.ts";
import {
  quotationsOf,
  quotedCells,
  quotedWord,
  renameQuoted,
  withoutCellNames,
} from "../../../shared/study/quotations.ts";
import { ownTime } from "../../support/own-time.ts";

const asked = (text: string) =>
  quotationsOf(text).quotations.map(({ cell, words }) => [cell.word, ...words.map(({ word }) => word)]);

describe("quotations in prose", () => {
  it("are a cell's name, a colon and words, each at its place", () => {
    const text = "a luxury, η = {base: eta, meat & fish}, for {my matrix :rows that hold} of households";
    expect(asked(text)).toEqual([
      ["base", "eta", "meat & fish"],
      ["my matrix", "rows that hold"],
    ]);
    const [first] = quotationsOf(text).quotations;
    expect(text.slice(first.from, first.to)).toBe("{base: eta, meat & fish}");
    expect(text.slice(first.words[1].from, first.words[1].to)).toBe("meat & fish");
    expect(text.slice(first.cell.from, first.cell.to)).toBe("base");
  });

  it("may go over the end of a line, never over an empty one", () => {
    expect(asked("{base: eta,\n  meat\n  & fish}")).toEqual([["base", "eta", "meat & fish"]]);
    expect(asked("{base: eta,\n\nmeat}")).toEqual([]);
  });

  it("hold a name with commas or braces in double quotes", () => {
    expect(asked('{base: eta, "bread, rolls {white}"}')).toEqual([["base", "eta", "bread, rolls {white}"]]);
    expect([quotedWord("grains"), quotedWord("bread, rolls")]).toEqual(["grains", '"bread, rolls"']);
  });

  it.each([
    ["after a backslash", "\\{base: eta}"],
    ["in a code span", "write `{base: eta}` so"],
    ["in a code span of two", "write ``a ` {base: eta}`` so"],
    ["in a fence", "so:\n\n```\n{base: eta}\n```\n"],
    ["in a fence that stays open", "so:\n~~~ text\n{base: eta}\n"],
    ["without a name", "{1: eta}"],
    ["without a colon", "{base}"],
  ])("are none %s", (_, text) => expect(quotationsOf(text)).toEqual({ quotations: [], inMathematics: [] }));

  it("are told apart between dollar signs, inline and in a block", () => {
    for (const text of ["so $\\eta = {base: eta}$ is", "$$\n{base: eta}\n$$\n", "$$ {base: eta} $$"]) {
      const { quotations, inMathematics } = quotationsOf(text);
      expect([quotations.length, inMathematics.length]).toEqual([0, 1]);
    }
    // A price in dollars opens nothing where no second sign follows, or where it is escaped.
    expect(asked("at $5 a litre {base: rows}")).toEqual([["base", "rows"]]);
    expect(asked("at \\$5 and \\$6 {base: rows}")).toEqual([["base", "rows"]]);
    expect(asked("$a\n\nb$ {base: rows}")).toEqual([["base", "rows"]]);
  });

  it("close a code span at a backslashed backtick, as CommonMark does", () => {
    expect(asked("`a\\` {base: rows} `b`")).toEqual([["base", "rows"]]);
    expect(proseSpans("\\`a` {b: c} `").code).toEqual([{ from: 3, to: 13 }]);
  });

  it("name each cell once, in the order of the text", () => {
    expect(quotedCells("{b: rows} {a: rows} {b: eta, x}")).toEqual(["b", "a"]);
  });

  it("take over a cell's new name, and nothing else changes", () => {
    const text = "base {base: eta, base} `{base: rows}` {other: rows} {base : rows}";
    expect(renameQuoted(text, "base", "main system")).toBe(
      "base {main system: eta, base} `{base: rows}` {other: rows} {main system : rows}",
    );
  });

  it("ask the same whatever their cells are called", () => {
    expect(withoutCellNames("{a: rows} {b: rows} {a: aic}")).toBe(withoutCellNames("{x: rows} {y: rows} {x: aic}"));
    expect(withoutCellNames("{a: rows} {b: rows}")).not.toBe(withoutCellNames("{a: rows} {a: rows}"));
  });

  it.each([
    ["opening braces", "{a:"],
    ["quotation marks", '{a:"'],
    ["closed quotation marks", '{a:"{b:"'],
    ["backticks of growing length", "` `` "],
    ["dollars", "$ $$ "],
    ["quotations", "{b: eta, c} "],
  ])("are read in no time out of nothing but %s", (_, part) => {
    const text = part.repeat(Math.floor(32_768 / part.length));
    expect(ownTime(() => quotationsOf(text))).toBeLessThan(500);
  });
});

describe("the words a number goes by", () => {
  it("are the field's own, their signs, in any case", () => {
    for (const word of ["eta", "η", " ETA "]) expect(quotable("system", word)?.word).toBe("eta");
    expect(quotable("system", "R²")?.word).toBe("r2");
    expect(quotable("elasticities", "ε")?.word).toBe("uncompensated");
    expect(quotable("system", "etta")).toBeUndefined();
  });
});
