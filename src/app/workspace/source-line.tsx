import type { CellSource } from "../../../shared/study/cell-source.ts";
import { sourceInALine } from "./cell-words.ts";

/** A source in one line. */
export default function SourceLine({ cell: { kind, source } }: { cell: CellSource }) {
  return sourceInALine(kind, source);
}
