import * as Y from "yjs";
import { type CellEdit, isSameCell } from "../../shared/study/cell-edit.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { CELLS, readCell, readCells } from "./document.ts";

/** Follows a document's cells, so that of every change it can be said what it did to which of them. */
export class CellEdits {
  readonly #doc: Y.Doc;
  readonly #cells: Map<string, CellSource>;
  readonly #touched = new Set<string>();

  constructor(doc: Y.Doc) {
    this.#doc = doc;
    this.#cells = new Map(readCells(doc).map((cell) => [cell.id, cell]));
    doc.getMap(CELLS).observeDeep((events) => {
      for (const event of events) {
        if (event.path.length > 0) this.#touched.add(String(event.path[0]));
        else if (event instanceof Y.YMapEvent) for (const id of event.keysChanged) this.#touched.add(id);
      }
    });
  }

  /** What has been done since this was last asked. */
  take(): CellEdit[] {
    const edits: CellEdit[] = [];
    for (const cellId of this.#touched) {
      const [before, after] = [this.#cells.get(cellId), readCell(this.#doc, cellId)];
      if (isSameCell(before, after)) continue;
      if (after === undefined) this.#cells.delete(cellId);
      else this.#cells.set(cellId, after);
      edits.push({ cellId, ...(before && { before }), ...(after && { after }) });
    }
    this.#touched.clear();
    return edits;
  }
}
