import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { parse } from "yaml";
import { applyEdit, keyEdit, removeKey, setKey, type Value } from "../../../shared/study/edit.ts";

const SYSTEM = "# top\ndata: survey # where\nform: aids\nimpose: [homogeneity]\n\n# tail\n";
const DATA =
  "upload: u.csv\ngoods: # six\n  a: {price: p, quantity: q} # aa\n  b: {price: r, quantity: s}\n# end\nkeep: x > 1\n";

describe("setKey", () => {
  it.each<[string, string, string[], Value, string]>([
    ["replaces a word", SYSTEM, ["form"], "les", SYSTEM.replace("aids", "les")],
    [
      "adds below the last key, above what follows it",
      SYSTEM,
      ["alpha0"],
      1.5,
      SYSTEM.replace("[homogeneity]\n", "[homogeneity]\nalpha0: 1.5\n"),
    ],
    [
      "quotes what needs it",
      SYSTEM,
      ["demographics"],
      ["a", "b, c"],
      SYSTEM.replace("[homogeneity]\n", '[homogeneity]\ndemographics: [a, "b, c"]\n'),
    ],
    ["fills an empty key", "form:\n", ["form"], "les", "form: les\n"],
    ["begins an empty text", "", ["form"], "les", "form: les\n"],
    ["begins below a comment", "# why", ["form"], "les", "# why\nform: les\n"],
    ["replaces within braces", DATA, ["goods", "a", "price"], "zz", DATA.replace("price: p,", "price: zz,")],
    ["adds within braces", "at: {x: 3}\n", ["at", "row"], 2, "at: {x: 3, row: 2}\n"],
    [
      "adds to a block",
      DATA,
      ["goods", "c"],
      { price: "t", quantity: "3" },
      DATA.replace("s}\n", 's}\n  c: {price: t, quantity: "3"}\n'),
    ],
    ["makes the maps on the way", "form: les\n", ["at", "row"], 2, "form: les\nat: {row: 2}\n"],
    ["turns a block into a word", "at:\n  row: 3\n# c\n", ["at"], "mean", "at: mean\n# c\n"],
    [
      "writes goods one to a line",
      "upload: u\n",
      ["goods"],
      { a: { price: "p" }, b: { price: "q" } },
      "upload: u\ngoods:\n  a: {price: p}\n  b: {price: q}\n",
    ],
  ])("%s", (_, source, path, value, expected) => {
    expect(setKey(source, path, value)).toBe(expected);
  });

  it("reads back as the value set, and leaves the rest alone", () => {
    const word = fc.oneof(
      fc.string({ maxLength: 12 }),
      fc.constantFrom("yes", "null", "1e3", "# no", "a: b", "{x", "- l", "é", " ", "'", '"', "a\nb"),
    );
    const value: fc.Arbitrary<Value> = fc.oneof(
      word,
      fc.double({ noNaN: true, noDefaultInfinity: true }),
      fc.array(word, { maxLength: 4 }),
      fc.boolean(),
    );
    fc.assert(
      fc.property(
        fc.constantFrom("form", "new key", "goods", "keep"),
        value,
        fc.constantFrom(SYSTEM, DATA, "a: 1"),
        (key, set, source) => {
          const before = parse(source, { version: "1.2" });
          const after = parse(setKey(source, [key], set), { version: "1.2" });
          expect(after).toEqual({ ...before, [key]: set });
        },
      ),
      { numRuns: 300 },
    );
  });

  it("is one small replacement, so that edits elsewhere in the text stay apart from it", () => {
    const edit = keyEdit(SYSTEM, ["form"], "les");
    expect(SYSTEM.slice(edit.from, edit.to)).toBe("aids");
    expect(edit.insert).toBe("les");
    expect(applyEdit(SYSTEM, edit)).toBe(setKey(SYSTEM, ["form"], "les"));
  });

  it("refuses a text that cannot be read", () => {
    expect(() => setKey("form: [a", ["form"], "les")).toThrow("the text must be mended");
    expect(() => setKey("words", ["form"], "les")).toThrow("the text is not a set of keys");
  });
});

describe("removeKey", () => {
  it.each<[string, string, string[], string]>([
    ["removes the line", SYSTEM, ["data"], SYSTEM.replace("data: survey # where\n", "")],
    ["removes a block", DATA, ["goods"], "upload: u.csv\n# end\nkeep: x > 1\n"],
    ["removes from a block", DATA, ["goods", "b"], DATA.replace("  b: {price: r, quantity: s}\n", "")],
    ["removes the first within braces", DATA, ["goods", "a", "price"], DATA.replace("price: p, ", "")],
    ["removes the last within braces", DATA, ["goods", "a", "quantity"], DATA.replace(", quantity: q", "")],
    ["removes the map that is left empty", "form: les\nat: {row: 2}\n", ["at", "row"], "form: les\n"],
    ["leaves what is not there", SYSTEM, ["index"], SYSTEM],
  ])("%s", (_, source, path, expected) => {
    expect(removeKey(source, path)).toBe(expected);
  });
});
