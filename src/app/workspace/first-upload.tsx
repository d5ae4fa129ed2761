import type { Upload } from "../../../shared/schemas/resources.ts";
import { suggestData } from "../../../shared/study/suggest.ts";
import { latestUploads } from "../../../shared/study/uploads.ts";
import { Word } from "../../components/button.tsx";
import { FileDrop } from "../../features/uploads/file-drop.tsx";
import { shapeInWords } from "../../features/uploads/upload-words.ts";

interface FirstUploadProps {
  readonly studyId: string;
  readonly uploads: readonly Upload[];
  readonly onChange: (nextSource: string) => void;
}

/** A data cell without an upload: a file is chosen, and what its columns may mean is written down as a beginning. */
export default function FirstUpload({ studyId, uploads, onChange }: FirstUploadProps) {
  const take = (upload: Upload) => onChange(suggestData(upload.name, upload.columns));
  return (
    <div>
      <FileDrop studyId={studyId} onAdded={take} />
      {uploads.length > 0 && (
        <>
          <p className="type-small pt-3 text-ink2">Or take one that is here already:</p>
          <ul>
            {latestUploads(uploads).map((upload) => (
              <li key={upload.id} className="py-0.5">
                <Word onClick={() => take(upload)}>{upload.name}</Word>{" "}
                <span className="type-small text-ink3">{shapeInWords(upload)}</span>
              </li>
            ))}
          </ul>
        </>
      )}
    </div>
  );
}
