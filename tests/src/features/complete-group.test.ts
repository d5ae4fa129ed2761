import { CompletionContext } from "@codemirror/autocomplete";
import { EditorState } from "@codemirror/state";
import { expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { completeSource } from "../../../src/features/editor/completion.ts";
import { editorSubject } from "../../../src/features/editor/editor-subject.ts";
import { TREE_GOODS } from "../../support/utility-tree-csv.ts";

const cells: CellSource[] = (
  [
    ["plates", "data", `upload: tree.csv\n${TREE_GOODS.food}`],
    ["purse", "data", `upload: tree.csv\n${TREE_GOODS.budget}`],
    ["food", "system", "data: plates\nform: les\n"],
    ["budget", "system", "data: purse\nform: les\n"],
    ["stages", "elasticities", "system: food\n"],
  ] as const
).map(([name, kind, source], i) => ({ id: name, name, kind, source, order: String.fromCharCode(97 + i) }));

function offered(marked: string): string[] {
  const subject = {
    kind: "elasticities" as const,
    name: "stages",
    names: cells.map(({ name }) => name),
    cellsNow: () => cells,
    uploads: [],
    problems: [],
  };
  const state = EditorState.create({ doc: marked.replace("|", ""), extensions: [editorSubject.of(subject)] });
  return (
    completeSource(new CompletionContext(state, marked.indexOf("|"), true))?.options.map(({ label }) => label) ?? []
  );
}

it("offers systems to stand within, and the goods of that system to stand as", () => {
  expect(offered("system: food\nwithin: |\n")).toEqual(["food", "budget"]);
  expect(offered("system: food\nwithin: budget\nas: |\n")).toEqual(["food", "rent", "travel"]);
  expect(offered("system: food\nwithin: budget\nas: food\nunconditional: |\n")).toEqual([
    "carpentier guyomard",
    "edgerton",
  ]);
});
