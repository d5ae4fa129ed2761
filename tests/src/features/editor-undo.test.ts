import { afterEach, describe, expect, it } from "vitest";
import { Awareness } from "y-protocols/awareness";
import * as Y from "yjs";
import { createEditor, type Editor } from "../../../src/features/editor/create-editor.ts";
import { OwnEdits } from "../../../src/sync/own-edits.ts";

// Nothing is laid out here, and the editor asks where its text stands.
Range.prototype.getClientRects = () => [] as unknown as DOMRectList;

let editor: Editor | undefined;
afterEach(() => editor?.destroy());

function cell(doc: Y.Doc, id: string, words: string): Y.Text {
  const entry = new Y.Map<unknown>();
  const source = new Y.Text(words);
  entry.set("source", source);
  doc.getMap("cells").set(id, entry);
  return source;
}

describe("Ctrl and Z in the editor", () => {
  it("undoes what was typed in this text, as a step of the study, and leaves steps in other cells", () => {
    const doc = new Y.Doc();
    const [base, other] = [cell(doc, "base", "form: aids\n"), cell(doc, "other", "")];
    const own = new OwnEdits(doc, "page");
    const parent = document.body.appendChild(document.createElement("div"));
    editor = createEditor({
      parent,
      text: base,
      awareness: new Awareness(doc),
      label: "Source of base",
      readOnly: false,
      subject: { kind: "system", name: "base", names: ["base"], cellsNow: () => [], uploads: [], problems: [] },
      onLeave: () => {},
      steps: { manager: own.manager, undo: () => own.undo("base"), redo: () => own.redo("base") },
    });
    const content = parent.querySelector<HTMLElement>(".cm-content")!;
    const press = (key: string) =>
      content.dispatchEvent(new KeyboardEvent("keydown", { key, ctrlKey: true, bubbles: true, cancelable: true }));
    editor.setSubject({ kind: "system", name: "base", names: ["base"], cellsNow: () => [], uploads: [], problems: [] });
    // As typing arrives: the editor writes it into the shared text.
    const line = content.querySelector(".cm-line")!;
    line.textContent = "form: quaids";
    return new Promise((resolve) => setTimeout(resolve, 50)).then(() => {
      expect(base.toString()).toBe("form: quaids\n");
      own.step("changing", () => other.insert(0, "data: base\n"));
      press("z");
      expect([base.toString(), other.toString()]).toEqual(["form: aids\n", "data: base\n"]);
      press("y");
      expect(base.toString()).toBe("form: quaids\n");
      expect(own.undo().sentence).toMatch(/^Undone: typing in/);
      expect(own.undo().sentence).toMatch(/^Undone: changing/);
    });
  });
});
