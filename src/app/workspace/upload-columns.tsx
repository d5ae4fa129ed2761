import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { uploadRead } from "../../../shared/study/uploads.ts";
import { ColumnList } from "./column-list.tsx";
import { demographicsOn } from "./column-uses.ts";

interface UploadColumnsProps {
  readonly cell: CellSource;
  readonly cells: readonly CellSource[];
  readonly uploads: readonly Upload[];
}

/** The columns of the upload a data cell names, and what the cell and the systems on it use them for. */
export default function UploadColumns({ cell, cells, uploads }: UploadColumnsProps) {
  const upload = uploadRead(uploads, parseCell("data", cell.source).written);
  return upload ? (
    <ColumnList upload={upload} source={cell.source} demographics={demographicsOn(cell.name, cells)} />
  ) : null;
}
