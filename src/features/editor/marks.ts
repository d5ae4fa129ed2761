import { type EditorState, RangeSetBuilder, StateField } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView, WidgetType } from "@codemirror/view";
import { readDocument } from "../../../shared/study/document.ts";
import { LIKE, REFERENCES } from "../../../shared/study/vocabulary.ts";
import { editorSubject } from "./editor-subject.ts";

/** An old value, struck out before the one that has taken its place. */
class Struck extends WidgetType {
  readonly value: string;

  constructor(value: string) {
    super();
    this.value = value;
  }

  override eq(other: Struck): boolean {
    return other.value === this.value;
  }

  override toDOM(): HTMLElement {
    const element = document.createElement("del");
    element.className = "cm-struck";
    element.textContent = this.value;
    return element;
  }
}

interface Mark {
  readonly from: number;
  readonly to: number;
  readonly decoration: Decoration;
}

const REFERENCE = Decoration.mark({ class: "cm-reference" });
const CHANGED = Decoration.mark({ class: "cm-changed" });

/** Names of other cells, as links look. */
function references(state: EditorState): Mark[] {
  const { kind, names } = state.facet(editorSubject);
  if (!kind) return [];
  const { places, value } = readDocument(state.doc.toString());
  const keys = [...Object.keys(REFERENCES[kind]), ...(kind === "system" ? [LIKE] : [])];
  return keys.flatMap((key) => {
    const name = (value as Record<string, unknown> | null | undefined)?.[key];
    const place = places.value([key]);
    if (!place || place.to <= place.from || !names.includes(String(name))) return [];
    return [{ from: place.from, to: place.to, decoration: REFERENCE }];
  });
}

const LONGEST_STRUCK = 60;

/** Values that differ from those of the last finding's source. */
function changes(state: EditorState): Mark[] {
  const { lastSource } = state.facet(editorSubject);
  const text = state.doc.toString();
  if (lastSource === undefined || lastSource === text) return [];
  const [before, now] = [readDocument(lastSource), readDocument(text)];
  const keys = Object.keys((now.value as object | null | undefined) ?? {});
  return keys.flatMap((key) => {
    const [old, fresh] = [before.places.value([key]), now.places.value([key])];
    if (!fresh || fresh.to <= fresh.from) return [];
    const was = old ? lastSource.slice(old.from, old.to).trimEnd() : "";
    const is = text.slice(fresh.from, fresh.to).trimEnd();
    if (was === is) return [];
    const marks: Mark[] = [{ from: fresh.from, to: fresh.from + is.length, decoration: CHANGED }];
    if (was && was.length <= LONGEST_STRUCK && !was.includes("\n")) {
      const widget = Decoration.widget({ widget: new Struck(was), side: -1 });
      marks.unshift({ from: fresh.from, to: fresh.from, decoration: widget });
    }
    return marks;
  });
}

function marksOf(state: EditorState): DecorationSet {
  const builder = new RangeSetBuilder<Decoration>();
  const marks = [...references(state), ...changes(state)];
  const sorted = marks.toSorted(
    (a, b) => a.from - b.from || a.decoration.startSide - b.decoration.startSide || a.to - b.to,
  );
  for (const { from, to, decoration } of sorted) builder.add(from, to, decoration);
  return builder.finish();
}

/** What is drawn over the text beside its own colours. */
export const sourceMarks = StateField.define<DecorationSet>({
  create: marksOf,
  update: (marks, transaction) => {
    const subjectChanged = transaction.state.facet(editorSubject) !== transaction.startState.facet(editorSubject);
    return transaction.docChanged || subjectChanged ? marksOf(transaction.state) : marks;
  },
  provide: (field) => EditorView.decorations.from(field),
});
