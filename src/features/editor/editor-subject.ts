import { Facet } from "@codemirror/state";
import type { CellKind } from "../../../shared/schemas/cell.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";

/** What the text is about: everything beside the text itself that the editor draws or offers. */
export interface EditorSubject {
  readonly kind: CellKind | null;
  readonly name: string;
  /** Names of all cells: what a reference may lead to. */
  readonly names: readonly string[];
  /** The cells as they are when something is to be completed. */
  readonly cellsNow: () => readonly CellSource[];
  readonly uploads: readonly Upload[];
  readonly problems: readonly Problem[];
  /** The source of the last finding, while it is not this one's. */
  readonly lastSource?: string;
}

const NOTHING: EditorSubject = { kind: null, name: "", names: [], cellsNow: () => [], uploads: [], problems: [] };

/** Extensions read the subject from the state, so that one editor serves a cell for as long as it is shown. */
export const editorSubject = Facet.define<EditorSubject, EditorSubject>({
  combine: (subjects) => subjects[0] ?? NOTHING,
});
