import type { Upload } from "../../../shared/schemas/resources.ts";
import { columnInWords } from "./column-words.ts";
import RowsDialog from "./rows-dialog.tsx";
import { originInWords, shapeInWords } from "./upload-words.ts";

interface UploadRowsProps {
  readonly studyId: string;
  readonly upload: Upload;
  readonly onClose: () => void;
}

/** An upload as it stands: its rows, and how each column lies. */
export default function UploadRows({ studyId, upload, onClose }: UploadRowsProps) {
  const columns = new Map(upload.columns.map((column) => [column.name, column]));
  const version = upload.version > 1 ? `, version ${upload.version}` : "";
  return (
    <RowsDialog
      studyId={studyId}
      of={{ uploadId: upload.id }}
      title={`${upload.name}${version}`}
      lede={`${shapeInWords(upload)}; ${originInWords(upload)}.`}
      about={(name) => {
        const column = columns.get(name);
        return column && columnInWords(column, upload.rows);
      }}
      onClose={onClose}
    />
  );
}
