import { CompletionContext } from "@codemirror/autocomplete";
import { EditorState } from "@codemirror/state";
import { describe, expect, it } from "vitest";
import { editorSubject } from "../../../src/features/editor/editor-subject.ts";
import { completeProse } from "../../../src/features/editor/prose/complete-prose.ts";
import { proseMarks } from "../../../src/features/editor/prose/prose-marks.ts";
import { studyCells, upload } from "../study-sources.ts";

const subject = {
  kind: "text" as const,
  name: "argument",
  names: studyCells().map(({ name }) => name),
  cellsNow: () => [
    ...studyCells().map((cell) =>
      cell.name === "base" ? { ...cell, source: `${cell.source}demographics: [members]\n` } : cell,
    ),
    { id: "t", name: "argument", kind: "text", order: "z", source: "" },
  ],
  uploads: [upload],
  problems: [],
};

/** What is offered where | stands. */
function offered(marked: string): string[] {
  const at = marked.indexOf("|");
  const state = EditorState.create({ doc: marked.replace("|", ""), extensions: editorSubject.of(subject) });
  return completeProse(new CompletionContext(state, at, true))?.options.map(({ label }) => label) ?? [];
}

describe("completion in prose", () => {
  it("offers the cells that have numbers, within open braces only", () => {
    expect(offered("so {|")).toEqual(["survey", "base", "matrix"]);
    expect(offered("so {ba|}")).toContain("base");
    for (const text of ["so |", "{base: rows} |", "\\{|", "`{|`", "$x_{|}$", "{\n\n|"])
      expect(offered(text)).toEqual([]);
  });

  it("offers the numbers of the cell, then its goods, then the parts of an estimate", () => {
    expect(offered("{base: |")).toEqual(expect.arrayContaining(["eta", "gamma", "log likelihood"]));
    expect(offered("{base: |")).not.toContain("committed");
    expect(offered("{matrix: |")).toEqual(expect.arrayContaining(["entry", "rows that hold"]));
    expect(offered("{base: eta, |")).toEqual(["grains", "dairy"]);
    expect(offered("{base: gamma, grains, |")).toEqual(["grains", "dairy"]);
    expect(offered("{base: eta, grains, |")).toEqual(["alone", "error"]);
    expect(offered("{base: demographic, |")).toEqual(["members"]);
    expect(offered("{base: rows, |")).toEqual([]);
    expect(offered("{nobody: |")).toEqual([]);
  });
});

describe("marks on prose", () => {
  it("show quotations as links look, heads and emphasis as they will read, code letter for letter", () => {
    const text = "# Head\n- a **strong** *word* {base: rows} {nobody: rows} `x` $y$";
    const state = EditorState.create({ doc: text, extensions: [editorSubject.of(subject), proseMarks] });
    const marks: string[] = [];
    state.field(proseMarks).between(0, text.length, (from, to, { spec }) => {
      marks.push(`${spec.class.slice(3)} ${text.slice(from, to)}`);
    });
    expect(marks).toEqual([
      "sign #",
      "strong  Head",
      "sign -",
      "sign **",
      "strong strong",
      "sign **",
      "sign *",
      "emphasis word",
      "sign *",
      "reference {base: rows}",
      "verbatim `x`",
      "verbatim $y$",
    ]);
  });
});
