import { lazy, Suspense, useState } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import { latestUploads, versionsOf } from "../../../shared/study/uploads.ts";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useAddSheet } from "./api/add-sheet.ts";
import { useUploads } from "./api/list-uploads.ts";
import { useRemoveUpload } from "./api/remove-upload.ts";
import { FileDrop } from "./file-drop.tsx";
import { UploadEntry } from "./upload-entry.tsx";

const UploadRows = lazy(() => import("./upload-rows.tsx"));

interface UploadsDialogProps {
  readonly studyId: string;
  readonly onClose: () => void;
  readonly readOnly: boolean;
}

/** The files of the study: what is there in which versions, another one, and away with what no cell reads. */
export default function UploadsDialog({ studyId, onClose, readOnly }: UploadsDialogProps) {
  const { data: uploads = [], error, isPending, refetch } = useUploads(studyId);
  const remove = useRemoveUpload(studyId);
  const addSheet = useAddSheet(studyId);
  const [looking, setLooking] = useState<Upload>();
  const [replacing, setReplacing] = useState<string>();
  const busy = remove.isPending || addSheet.isPending;
  return (
    <Dialog onClose={onClose} title="Uploads" lede="Rows stay on this installation, with those entitled to them.">
      {error && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
      {isPending && (
        <p role="status" className="pb-4 text-ink2">
          Fetching the uploads
        </p>
      )}
      {!error && !isPending && uploads.length === 0 && <p className="pb-4 text-ink2">Nothing has been uploaded yet.</p>}
      <ul className="border-rule border-b">
        {latestUploads(uploads).map(({ name }) => (
          <UploadEntry
            key={name}
            versions={versionsOf(uploads, name)}
            busy={busy}
            onLook={setLooking}
            {...(!readOnly && {
              onRemove: (upload: Upload) => remove.mutate(upload.id),
              onSheet: (upload: Upload, sheet: string) => addSheet.mutate({ uploadId: upload.id, sheet }),
              onReplace: () => setReplacing(replacing === name ? undefined : name),
            })}
          >
            {replacing === name && (
              <div className="pt-2">
                <FileDrop
                  studyId={studyId}
                  replaces={name}
                  words={`Choose the next version of ${name}`}
                  onAdded={() => setReplacing(undefined)}
                />
              </div>
            )}
          </UploadEntry>
        ))}
      </ul>
      {addSheet.isPending && <p role="status">Reading sheet {addSheet.variables.sheet}</p>}
      {[remove, addSheet].map(
        ({ isError, error: fault }, place) => isError && <Fault key={place}>{sentenceOf(fault)}</Fault>,
      )}
      {!readOnly && (
        <div className="pt-5">
          <FileDrop studyId={studyId} onAdded={() => {}} />
        </div>
      )}
      <Suspense>
        {looking && <UploadRows studyId={studyId} upload={looking} onClose={() => setLooking(undefined)} />}
      </Suspense>
    </Dialog>
  );
}
