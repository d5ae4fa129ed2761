import { type Action, type Diagnostic, setDiagnostics } from "@codemirror/lint";
import type { EditorState } from "@codemirror/state";
import type { EditorView } from "@codemirror/view";
import type { Problem } from "../../../shared/schemas/problem.ts";
import { editorSubject } from "./editor-subject.ts";

function use(word: string): Action {
  return {
    name: `Use ${word}`,
    apply: (view: EditorView, from: number, to: number) => view.dispatch({ changes: { from, to, insert: word } }),
  };
}

function diagnosticOf(problem: Problem, length: number): Diagnostic[] {
  const { place, nearest, sentence } = problem;
  if (!place || place.from > length) return [];
  const to = Math.min(Math.max(place.to, place.from), length);
  return [
    {
      from: place.from,
      to,
      severity: "error",
      message: sentence,
      ...(nearest !== undefined && { actions: [use(nearest)] }),
    },
  ];
}

/** The cell's problems at their places, each with its nearest word as an action. */
export function diagnosticsOf(state: EditorState): Diagnostic[] {
  const { problems } = state.facet(editorSubject);
  return problems.flatMap((problem) => diagnosticOf(problem, state.doc.length));
}

export const showProblems = (view: EditorView) => view.dispatch(setDiagnostics(view.state, diagnosticsOf(view.state)));
