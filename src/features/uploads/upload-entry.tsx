import type { ReactNode } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import { versionChange } from "../../../shared/study/uploads.ts";
import { Word } from "../../components/button.tsx";
import { originInWords, shapeInWords } from "./upload-words.ts";

interface UploadEntryProps {
  /** The latest first. */
  readonly versions: readonly Upload[];
  readonly busy: boolean;
  readonly onLook: (upload: Upload) => void;
  /** Absent, with the next two, for those who only read. */
  readonly onRemove?: (upload: Upload) => void;
  readonly onSheet?: (upload: Upload, sheet: string) => void;
  readonly onReplace?: () => void;
  readonly children?: ReactNode;
}

/** An upload with its versions: when, by whom, what each changed; sheets of the workbook that were not read. */
export function UploadEntry({ versions, busy, onLook, onRemove, onSheet, onReplace, children }: UploadEntryProps) {
  const [latest] = versions;
  const others = latest.sheets?.filter((sheet) => sheet !== latest.sheet) ?? [];
  return (
    <li className="border-rule border-t py-2.5">
      <div className="flex flex-wrap items-baseline justify-between gap-x-6">
        <p className="min-w-0 break-words font-semibold">{latest.name}</p>
        {onReplace && (
          <Word onClick={onReplace} disabled={busy}>
            Replace by a new version <span className="sr-only">of {latest.name}</span>
          </Word>
        )}
      </div>
      {children}
      <ol className="space-y-1">
        {versions.map((upload, place) => (
          <Version
            key={upload.id}
            upload={upload}
            only={versions.length === 1}
            before={versions[place + 1]}
            busy={busy}
            onLook={onLook}
            onRemove={onRemove}
          />
        ))}
      </ol>
      {onSheet && others.length > 0 && (
        <p className="type-small flex flex-wrap gap-x-3 pt-1 text-ink2">
          Other sheets of the workbook:
          {others.map((sheet) => (
            <Word key={sheet} disabled={busy} onClick={() => onSheet(latest, sheet)}>
              Read {sheet}
            </Word>
          ))}
        </p>
      )}
    </li>
  );
}

interface VersionProps extends Pick<UploadEntryProps, "busy" | "onLook" | "onRemove"> {
  readonly upload: Upload;
  readonly only: boolean;
  readonly before: Upload | undefined;
}

function Version({ upload, only, before, busy, onLook, onRemove }: VersionProps) {
  const called = only ? upload.name : `version ${upload.version} of ${upload.name}`;
  return (
    <li className="flex flex-wrap items-baseline justify-between gap-x-6">
      <p className="type-small min-w-0 max-w-[27rem] text-ink2">
        {!only && <span className="text-ink">Version {upload.version}: </span>}
        {shapeInWords(upload)}; {originInWords(upload)}
        {before && (
          <>
            . Against version {before.version}: {versionChange(before, upload)}
          </>
        )}
        <span className="type-source block text-[0.75rem]/[1.125rem] text-ink3">
          <span className="sr-only">Fingerprint </span>
          {inFours(upload.sha256)}
        </span>
      </p>
      <p className="flex gap-x-4">
        <Word onClick={() => onLook(upload)}>
          Look at the rows <span className="sr-only">of {called}</span>
        </Word>
        {onRemove && (
          <Word onClick={() => onRemove(upload)} disabled={busy}>
            Remove <span className="sr-only">{called}</span>
          </Word>
        )}
      </p>
    </li>
  );
}

const inFours = (sha256: string) => (sha256.slice(0, 16).match(/.{4}/g) ?? []).join(" ");
