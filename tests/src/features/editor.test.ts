import { CompletionContext } from "@codemirror/autocomplete";
import { EditorState } from "@codemirror/state";
import { afterEach, describe, expect, it, vi } from "vitest";
import { Awareness } from "y-protocols/awareness";
import * as Y from "yjs";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { completeSource } from "../../../src/features/editor/completion.ts";
import { createEditor, type Editor } from "../../../src/features/editor/create-editor.ts";
import { type EditorSubject, editorSubject } from "../../../src/features/editor/editor-subject.ts";
import { diagnosticsOf } from "../../../src/features/editor/lint.ts";
import { whereInYaml } from "../../../src/features/editor/where-in-yaml.ts";

// Nothing is laid out here, and the editor asks where its text stands.
Range.prototype.getClientRects = () => [] as unknown as DOMRectList;

const column = (name: string, type: "number" | "text" = "number") => ({ name, type, missing: 0, distinct: 2 });
const upload: Upload = {
  id: "u",
  name: "purchases-2031.csv",
  bytes: 1,
  rows: 4938,
  sha256: "0".repeat(64),
  version: 1,
  format: "csv",
  separator: ",",
  decimalComma: false,
  uploadedAt: "2031-03-02T10:00:00.000Z",
  uploadedBy: "Ilse Marchetti",
  columns: [column("p_grains"), column("e_grains"), column("urban"), column("region name", "text")],
};
const survey =
  "upload: purchases-2031.csv\ngoods:\n  grains: {price: p_grains, expenditure: e_grains}\n  dairy: {price: p_grains, expenditure: e_grains}\nderive:\n  log_size: log(urban)\n";

function cells(base: string): CellSource[] {
  return [
    { id: "s", name: "survey", kind: "data", order: "a", source: survey },
    { id: "b", name: "base", kind: "system", order: "b", source: base },
    { id: "m", name: "matrix", kind: "slutsky", order: "c", source: "system: base\n" },
  ];
}

function subject(kind: EditorSubject["kind"], base = "data: survey\nform: aids\n"): EditorSubject {
  const all = cells(base);
  const own = all.find((cell) => cell.kind === kind)!;
  const problems = resolveCells(all, [upload]).find(({ id }) => id === own.id)!.problems;
  return { kind, name: own.name, names: all.map(({ name }) => name), cellsNow: () => all, uploads: [upload], problems };
}

/** What is offered where | stands. */
function offered(kind: EditorSubject["kind"], marked: string): string[] {
  const pos = marked.indexOf("|");
  const state = EditorState.create({
    doc: marked.replace("|", ""),
    extensions: [editorSubject.of(subject(kind))],
  });
  return completeSource(new CompletionContext(state, pos, true))?.options.map(({ label }) => label) ?? [];
}

describe("completion", () => {
  it("offers the keys of the kind that are not given yet", () => {
    const keys = offered("system", "data: survey\n|");
    expect(keys).toContain("form");
    expect(keys).toContain("standard errors");
    expect(keys).not.toContain("data");
  });

  it("offers the words a key may have, in a list too", () => {
    expect(offered("system", "form: |")).toEqual(expect.arrayContaining(["la-aids", "aids", "les"]));
    expect(offered("system", "impose: [homogeneity, |")).toEqual(["homogeneity", "symmetry"]);
    expect(offered("system", "standard errors: |")).toEqual([
      "conventional",
      "heteroskedastic",
      "{cluster: }",
      "{bootstrap: }",
    ]);
    expect(offered("system", "season: |")).toEqual(["{period: }"]);
  });

  it("offers names of cells of the right kind, uploads and columns", () => {
    expect(offered("system", "data: |")).toEqual(["survey"]);
    expect(offered("slutsky", "system: |")).toEqual(["base"]);
    expect(offered("data", "upload: pur|")).toEqual(["purchases-2031.csv"]);
    expect(offered("system", "data: survey\nform: aids\ndemographics: [|")).toEqual([
      "log_size",
      "p_grains",
      "e_grains",
      "urban",
    ]);
    expect(offered("data", "upload: purchases-2031.csv\ncluster: |")).toContain("region name");
    expect(offered("system", "data: survey\ndropped: |")).toEqual(["grains", "dairy"]);
  });

  it("offers the keys of a good, in block and in braces", () => {
    expect(offered("data", "goods:\n  grains:\n    |")).toEqual(["price", "quantity", "expenditure"]);
    expect(offered("data", "goods:\n  grains: {price: p_grains, |")).toEqual(["quantity", "expenditure"]);
    expect(offered("data", "upload: purchases-2031.csv\ngoods:\n  grains: {price: |")).toContain("p_grains");
  });

  it("knows where the caret stands", () => {
    const text = "at:\n  prices:\n    grains: 1\n  x: ";
    expect(whereInYaml(text, text.length)).toEqual({ path: ["at"], key: "x", from: text.length, given: [] });
    expect(whereInYaml("standard errors: conv", 21)).toMatchObject({ path: [], key: "standard errors", from: 17 });
  });
});

describe("the editor", () => {
  let editor: Editor | undefined;
  afterEach(() => {
    editor?.destroy();
    document.body.replaceChildren();
  });

  function edit(readOnly = false, base = "data: survey\nform: aids\n") {
    const doc = new Y.Doc();
    const text = doc.getText("source");
    text.insert(0, base);
    const parent = document.body.appendChild(document.createElement("div"));
    const awareness = new Awareness(doc);
    editor = createEditor({
      parent,
      text,
      awareness,
      label: "Source of base",
      readOnly,
      subject: subject("system", base),
      onLeave: vi.fn(),
    });
    return { text, parent, awareness };
  }

  it("shows the live text, with references as links look", () => {
    const { text, parent } = edit();
    expect(parent.querySelector(".cm-reference")).toHaveTextContent("survey");
    text.insert(text.length, "alpha0: 2\n");
    expect(parent.querySelector(".cm-content")).toHaveTextContent("alpha0: 2");
    expect(parent.querySelector(".cm-content")).toHaveAccessibleName("Source of base");
  });

  it("cannot be written in by a reader", () => {
    expect(edit(true).parent.querySelector(".cm-content")).toHaveAttribute("contenteditable", "false");
  });

  it("marks a mistake at its place and offers the nearest word", () => {
    const base = "data: survey\nform: aidz\n";
    const { parent } = edit(false, base);
    expect(parent.querySelector(".cm-lintRange-error")).toHaveTextContent("aidz");
    const state = EditorState.create({ doc: base, extensions: [editorSubject.of(subject("system", base))] });
    const [diagnostic] = diagnosticsOf(state);
    expect(diagnostic).toMatchObject({ from: 19, to: 23, actions: [{ name: "Use aids" }] });
  });

  it("strikes out what a finding was asked with and is not any more", () => {
    const { parent } = edit(false, "data: survey\nform: les\n");
    editor!.setSubject({ ...subject("system"), lastSource: "data: survey\nform: aids\n" });
    expect(parent.querySelector("del")).toHaveTextContent("aids");
    expect(parent.querySelector(".cm-changed")).toHaveTextContent("les");
    editor!.setSubject(subject("system"));
    expect(parent.querySelector("del")).toBeNull();
  });

  it("flags another's caret with a first name in their colour", () => {
    const { text, parent, awareness } = edit();
    const place = Y.relativePositionToJSON(Y.createRelativePositionFromTypeIndex(text, 4));
    const user = { id: "t", name: "Tomás Adeyemi", color: "var(--who-b)" };
    awareness.states.set(77, { user, cursor: { anchor: place, head: place } });
    awareness.emit("change", [{ added: [77], updated: [], removed: [] }, "test"]);
    expect(parent.querySelector(".cm-ySelectionInfo")).toHaveTextContent(/^Tomás$/);
    expect(parent.querySelector(".cm-ySelectionCaret")?.getAttribute("style")).toContain("--who-b");
  });
});
