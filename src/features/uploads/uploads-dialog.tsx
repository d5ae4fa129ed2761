import type { Upload } from "../../../shared/schemas/resources.ts";
import { Word } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useUploads } from "./api/list-uploads.ts";
import { useRemoveUpload } from "./api/remove-upload.ts";
import { FileDrop } from "./file-drop.tsx";
import { originInWords, shapeInWords } from "./upload-words.ts";

interface UploadsDialogProps {
  readonly studyId: string;
  readonly onClose: () => void;
  readonly readOnly: boolean;
}

/** The files of the study: what is there, another one, and away with one that no cell names. */
export default function UploadsDialog({ studyId, onClose, readOnly }: UploadsDialogProps) {
  const { data: uploads = [], error } = useUploads(studyId);
  const remove = useRemoveUpload(studyId);
  return (
    <Dialog onClose={onClose} title="Uploads" lede="Rows stay on this installation, with those entitled to them.">
      {error && <Fault>{sentenceOf(error)}</Fault>}
      {uploads.length === 0 && <p className="pb-4 text-ink2">Nothing has been uploaded yet.</p>}
      <ul>
        {uploads.map((upload) => (
          <UploadEntry
            key={upload.id}
            upload={upload}
            onRemove={readOnly ? undefined : () => remove.mutate(upload.id)}
            busy={remove.isPending}
          />
        ))}
      </ul>
      {remove.isError && <Fault>{sentenceOf(remove.error)}</Fault>}
      {!readOnly && (
        <div className="pt-5">
          <FileDrop studyId={studyId} onAdded={() => {}} />
        </div>
      )}
    </Dialog>
  );
}

function UploadEntry({ upload, onRemove, busy }: { upload: Upload; onRemove?: () => void; busy: boolean }) {
  return (
    <li className="flex flex-wrap items-baseline justify-between gap-x-6 border-rule border-t py-2.5 last:border-b">
      <div className="min-w-0">
        <p className="break-words font-semibold">{upload.name}</p>
        <p className="type-small text-ink2">
          {shapeInWords(upload)}; {originInWords(upload)}
        </p>
      </div>
      {onRemove && (
        <Word onClick={onRemove} disabled={busy}>
          Remove <span className="sr-only">{upload.name}</span>
        </Word>
      )}
    </li>
  );
}
