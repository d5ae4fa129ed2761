import { type EditorState, RangeSetBuilder, StateField } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView } from "@codemirror/view";
import { proseSpans } from "../../../../shared/study/prose-spans.ts";
import { quotationsOf } from "../../../../shared/study/quotations.ts";
import { editorSubject } from "../editor-subject.ts";

interface Mark {
  readonly from: number;
  readonly to: number;
  readonly decoration: Decoration;
}

const mark = (className: string) => Decoration.mark({ class: className });
const REFERENCE = mark("cm-reference");
const VERBATIM = mark("cm-verbatim");
const SIGN = mark("cm-sign");
const STRONG = mark("cm-strong");
const EMPHASIS = mark("cm-emphasis");

/** Quotations of cells there are, as links look; code and formulae in the type of sources. */
function marksOf(state: EditorState): DecorationSet {
  const text = state.doc.toString();
  const { names } = state.facet(editorSubject);
  const { code, mathematics } = proseSpans(text);
  const quoted = quotationsOf(text)
    .quotations.filter(({ cell }) => names.includes(cell.word))
    .map(({ from, to }) => ({ from, to, decoration: REFERENCE }));
  const verbatim = [...code, ...mathematics].map(({ from, to }) => ({ from, to, decoration: VERBATIM }));
  return built([...quoted, ...verbatim, ...markdownMarks(state, [...quoted, ...verbatim])]);
}

const LINE_SIGNS = /^ {0,3}(#{1,6}(?= )|>|[-*+](?= )|\d{1,9}[.)](?= ))/;
const EMPHASISED = /(\*\*|__)(?=\S)(.+?)(?<=\S)\1|(\*|_)(?=\S)([^*_]+?)(?<=\S)\3/g;

/** Heads, emphasis and the signs of lists look like what they say, line by line; the text keeps every sign. */
function markdownMarks(state: EditorState, taken: readonly Mark[]): Mark[] {
  const marks: Mark[] = [];
  const isFree = (from: number, to: number) => !taken.some((one) => from < one.to && one.from < to);
  const add = (from: number, to: number, decoration: Decoration) => {
    if (to > from && isFree(from, to)) marks.push({ from, to, decoration });
  };
  for (let number = 1; number <= state.doc.lines; number++) {
    const { from, text } = state.doc.line(number);
    const sign = LINE_SIGNS.exec(text);
    if (sign) add(from, from + sign[0].length, SIGN);
    if (sign?.[1].startsWith("#")) add(from + sign[0].length, from + text.length, STRONG);
    for (const { 0: whole, 1: double, index } of text.matchAll(EMPHASISED)) {
      const [start, end, width] = [from + index, from + index + whole.length, double ? 2 : 1];
      if (!isFree(start, end)) continue;
      add(start, start + width, SIGN);
      add(start + width, end - width, double ? STRONG : EMPHASIS);
      add(end - width, end, SIGN);
    }
  }
  return marks;
}

function built(marks: readonly Mark[]): DecorationSet {
  const builder = new RangeSetBuilder<Decoration>();
  const sorted = marks.toSorted((a, b) => a.from - b.from || b.to - a.to);
  for (const { from, to, decoration } of sorted) builder.add(from, to, decoration);
  return builder.finish();
}

/** What is drawn over prose. */
export const proseMarks = StateField.define<DecorationSet>({
  create: marksOf,
  update: (marks, transaction) => {
    const subjectChanged = transaction.state.facet(editorSubject) !== transaction.startState.facet(editorSubject);
    return transaction.docChanged || subjectChanged ? marksOf(transaction.state) : marks;
  },
  provide: (field) => EditorView.decorations.from(field),
});
