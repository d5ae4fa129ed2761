import {
  autocompletion,
  closeBrackets,
  closeBracketsKeymap,
  completionKeymap,
  startCompletion,
} from "@codemirror/autocomplete";
import { defaultKeymap } from "@codemirror/commands";
import { yaml } from "@codemirror/lang-yaml";
import { bracketMatching, indentUnit } from "@codemirror/language";
import { lintKeymap } from "@codemirror/lint";
import { Compartment, EditorState, type Extension } from "@codemirror/state";
import { drawSelection, EditorView, keymap } from "@codemirror/view";
import { yCollab, yUndoManagerKeymap } from "y-codemirror.next";
import type { Awareness } from "y-protocols/awareness";
import type * as Y from "yjs";
import { KEYS } from "../../lib/keys.ts";
import { completeSource } from "./completion.ts";
import { type EditorSubject, editorSubject } from "./editor-subject.ts";
import { editorTheme } from "./editor-theme.ts";
import { withFirstNames } from "./first-names.ts";
import { showProblems } from "./lint.ts";
import { sourceMarks } from "./marks.ts";
import { proseEditing } from "./prose/prose-editing.ts";

export interface EditorNeeds {
  readonly parent: HTMLElement;
  readonly text: Y.Text;
  readonly awareness: Awareness;
  /** The person's steps, of which the editor undoes and redoes those in this text; without it, it keeps steps of its own. */
  readonly steps?: EditorSteps;
  readonly label: string;
  readonly readOnly: boolean;
  /** Of prose: whether it is written in the type it is read in; letter for letter unless said otherwise. */
  readonly face?: "source" | "prose";
  readonly subject: EditorSubject;
  /** Escape, once nothing else in the editor wants it. */
  readonly onLeave: () => void;
}

export interface EditorSteps {
  readonly manager: Y.UndoManager;
  readonly undo: () => void;
  readonly redo: () => void;
}

export interface Editor {
  readonly setSubject: (subject: EditorSubject) => void;
  /** Begins a quotation at the caret, and offers what may be quoted. */
  readonly quote: () => void;
  readonly destroy: () => void;
}

function reading(readOnly: boolean): Extension {
  return readOnly ? [EditorState.readOnly.of(true), EditorView.editable.of(false)] : [];
}

/** An editor of keys and values. */
const yamlEditing: Extension = [
  EditorView.contentAttributes.of({ spellcheck: "false", autocapitalize: "off" }),
  bracketMatching(),
  indentUnit.of("  "),
  yaml(),
  autocompletion({ override: [completeSource], icons: false }),
  sourceMarks,
];

/** The manager as the editor's keys reach it: typing becomes a step of the study's, its way back stays within the text. */
function within({ manager, undo, redo }: EditorSteps): Y.UndoManager {
  return Object.assign(Object.create(manager) as Y.UndoManager, { undo, redo });
}

/** An editor on a live text: one for as long as the cell's text is shown. */
export function createEditor(needs: EditorNeeds): Editor {
  const { parent, text, awareness, label, readOnly, face = "source", subject, onLeave, steps } = needs;
  const told = new Compartment();
  const leave = {
    key: KEYS.source.commands.leave.strokes[0],
    run: () => {
      onLeave();
      return true;
    },
  };
  const view = new EditorView({
    parent,
    state: EditorState.create({
      doc: text.toString(),
      extensions: [
        told.of(editorSubject.of(subject)),
        EditorView.contentAttributes.of({ "aria-label": label }),
        EditorView.lineWrapping,
        drawSelection(),
        closeBrackets(),
        subject.kind === "text" ? proseEditing(face) : yamlEditing,
        keymap.of([
          ...completionKeymap,
          ...closeBracketsKeymap,
          ...yUndoManagerKeymap,
          ...lintKeymap,
          leave,
          ...defaultKeymap,
        ]),
        editorTheme,
        reading(readOnly),
        yCollab(text, withFirstNames(awareness), steps && { undoManager: within(steps) }),
        EditorView.focusChangeEffect.of((_, focusing) => {
          if (!focusing && awareness.getLocalState()) awareness.setLocalStateField("cursor", null);
          return null;
        }),
      ],
    }),
  });
  showProblems(view);
  return {
    setSubject: (next) => {
      view.dispatch({ effects: told.reconfigure(editorSubject.of(next)) });
      showProblems(view);
    },
    quote: () => {
      const { from, to } = view.state.selection.main;
      view.focus();
      view.dispatch({ changes: { from, to, insert: "{}" }, selection: { anchor: from + 1 }, userEvent: "input" });
      startCompletion(view);
    },
    destroy: () => view.destroy(),
  };
}
