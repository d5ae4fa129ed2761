import { autocompletion } from "@codemirror/autocomplete";
import { EditorState, type Extension } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import { completeProse } from "./complete-prose.ts";
import { proseMarks } from "./prose-marks.ts";

/** The type a text is read in, with its signs kept quiet. */
const asRead = EditorView.theme({
  ".cm-scroller": {
    fontFamily: '"Literata Variable", "Tangency Math", serif',
    fontSize: "1.03125rem",
    lineHeight: "1.6875rem",
  },
});

const marks = EditorView.theme({
  ".cm-strong": { fontWeight: "600" },
  ".cm-emphasis": { fontStyle: "italic" },
  ".cm-sign": { color: "var(--ink3)" },
  ".cm-verbatim": { fontFamily: '"Source Code Pro Variable", "Tangency Math", monospace', fontSize: "0.8125rem" },
});

/** An editor of prose: braces close themselves and offer what may be quoted, words are checked by the browser. */
export const proseEditing = (face: "source" | "prose"): Extension => [
  EditorState.languageData.of(() => [{ closeBrackets: { brackets: ["{"] } }]),
  autocompletion({ override: [completeProse], icons: false }),
  EditorView.contentAttributes.of({ spellcheck: "true", autocapitalize: "sentences" }),
  proseMarks,
  marks,
  face === "prose" ? asRead : [],
];
