import { type DragEvent, useId, useRef, useState } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import { Word } from "../../components/button.tsx";
import { useAddUpload } from "./api/add-upload.ts";
import { UploadFault } from "./upload-fault.tsx";

interface FileDropProps {
  readonly studyId: string;
  readonly onAdded: (upload: Upload) => void;
  /** "Choose a file or drop it here", or something shorter beside a list. */
  readonly words?: string;
}

/** A place for a file: chosen or dropped, with how far it is, and what is wrong with it at its row and column. */
export function FileDrop({ studyId, onAdded, words = "Choose a CSV file" }: FileDropProps) {
  const id = useId();
  const add = useAddUpload(studyId);
  const [over, setOver] = useState(false);
  const [sending, setSending] = useState<{ name: string; fraction: number }>();
  const stop = useRef<AbortController>(undefined);
  const send = (file: File | undefined) => {
    if (!file || add.isPending) return;
    stop.current = new AbortController();
    setSending({ name: file.name, fraction: 0 });
    const onProgress = (fraction: number) => setSending({ name: file.name, fraction });
    add.mutate({ file, onProgress, signal: stop.current.signal }, { onSuccess: onAdded });
  };
  const onDrop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    send(event.dataTransfer.files[0]);
  };
  return (
    <fieldset
      aria-label="Upload a file"
      className={`file-drop ${over ? "file-drop-over" : ""}`}
      onDragOver={(event) => {
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={onDrop}
    >
      <input
        id={id}
        type="file"
        accept=".csv,.tsv,.txt,text/csv"
        className="peer sr-only"
        disabled={add.isPending}
        onChange={(event) => {
          send(event.target.files?.[0]);
          event.target.value = "";
        }}
      />
      {add.isPending && sending ? (
        <Sent {...sending} onStop={() => stop.current?.abort()} />
      ) : (
        <p>
          <label htmlFor={id} className="word cursor-pointer">
            {words}
          </label>{" "}
          <span className="text-ink2">or drop it here.</span>
          <span className="type-small block pt-1 text-ink3">Comma, semicolon or tab; a header line; up to 100 MB.</span>
        </p>
      )}
      {add.isError && add.error.name !== "AbortError" && <UploadFault error={add.error} name={sending?.name ?? ""} />}
    </fieldset>
  );
}

function Sent({ name, fraction, onStop }: { name: string; fraction: number; onStop: () => void }) {
  const words = fraction < 1 ? `Sending ${name}, ${Math.floor(fraction * 100)}\u2009%` : `Reading ${name}`;
  return (
    <div>
      <p className="flex flex-wrap items-baseline justify-between gap-x-4">
        <span role="status">{words}</span>
        <Word onClick={onStop}>Cancel</Word>
      </p>
      <progress aria-label={words} className="progress mt-1" max={1} value={fraction < 1 ? fraction : undefined} />
    </div>
  );
}
