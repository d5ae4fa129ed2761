import { lazy, Suspense, useState } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { uploadRead } from "../../../shared/study/uploads.ts";
import { ColumnList } from "./column-list.tsx";
import { demographicsOn } from "./column-uses.ts";

const UploadRows = lazy(() => import("../../features/uploads/upload-rows.tsx"));

interface UploadColumnsProps {
  readonly studyId: string;
  readonly cell: CellSource;
  readonly cells: readonly CellSource[];
  readonly uploads: readonly Upload[];
}

/** The columns of the upload a data cell reads, and what the cell and the systems on it use them for; and its rows. */
export default function UploadColumns({ studyId, cell, cells, uploads }: UploadColumnsProps) {
  const [looking, setLooking] = useState(false);
  const upload = uploadRead(uploads, parseCell("data", cell.source).written);
  if (!upload) return null;
  return (
    <>
      <ColumnList
        upload={upload}
        source={cell.source}
        demographics={demographicsOn(cell.name, cells)}
        onLook={() => setLooking(true)}
      />
      <Suspense>
        {looking && <UploadRows studyId={studyId} upload={upload} onClose={() => setLooking(false)} />}
      </Suspense>
    </>
  );
}
