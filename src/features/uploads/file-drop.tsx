import { useQueryClient } from "@tanstack/react-query";
import { type DragEvent, useId, useRef, useState } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import { versionsOf } from "../../../shared/study/uploads.ts";
import { Word } from "../../components/button.tsx";
import { writePercent } from "../../lib/formats.ts";
import { type Sending, useAddUpload } from "./api/add-upload.ts";
import { SameName } from "./same-name.tsx";
import { UploadFault } from "./upload-fault.tsx";

interface FileDropProps {
  readonly studyId: string;
  readonly onAdded: (upload: Upload) => void;
  /** "Choose a file or drop it here", or something shorter beside a list. */
  readonly words?: string;
  /** The name of the upload whose next version the file is. */
  readonly replaces?: string;
}

/** A place for a file: chosen or dropped, with how far it is, and what is wrong with it at its row and column. */
export function FileDrop({ studyId, onAdded, words = "Choose a file", replaces }: FileDropProps) {
  const id = useId();
  const add = useAddUpload(studyId);
  const client = useQueryClient();
  const [over, setOver] = useState(false);
  const [sending, setSending] = useState<{ name: string; fraction: number }>();
  const [asking, setAsking] = useState<{ file: File; versions: readonly Upload[] }>();
  const stop = useRef<AbortController>(undefined);
  const send = (file: File, how: Pick<Sending, "replaces" | "beside">) => {
    stop.current = new AbortController();
    setAsking(undefined);
    setSending({ name: file.name, fraction: 0 });
    const onProgress = (fraction: number) => setSending({ name: file.name, fraction });
    add.mutate({ file, onProgress, signal: stop.current.signal, ...how }, { onSuccess: onAdded });
  };
  const take = (file: File | undefined) => {
    if (!file || add.isPending) return;
    if (replaces !== undefined) return send(file, { replaces });
    const versions = versionsOf(client.getQueryData<Upload[]>(["uploads", studyId]) ?? [], file.name);
    if (versions.length > 0) {
      add.reset();
      return setAsking({ file, versions });
    }
    send(file, {});
  };
  const onDrop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    take(event.dataTransfer.files[0]);
  };
  return (
    <fieldset
      aria-label={replaces === undefined ? "Upload a file" : `A new version of ${replaces}`}
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
        accept=".csv,.tsv,.txt,.parquet,.xlsx,text/csv"
        className="peer sr-only"
        disabled={add.isPending}
        onChange={(event) => {
          take(event.target.files?.[0]);
          event.target.value = "";
        }}
      />
      {add.isPending && sending ? (
        <Sent {...sending} onStop={() => stop.current?.abort()} />
      ) : asking ? (
        <SameName
          {...asking}
          onVersion={() => send(asking.file, { replaces: asking.file.name })}
          onBeside={() => send(asking.file, { beside: true })}
          onCancel={() => setAsking(undefined)}
        />
      ) : (
        <p>
          <label htmlFor={id} className="word cursor-pointer">
            {words}
          </label>{" "}
          <span className="text-ink2">or drop it here.</span>
          <span className="type-small block pt-1 text-ink3">CSV, Parquet or XLSX, with a header; up to 100 MB.</span>
        </p>
      )}
      {add.isError && add.error.name !== "AbortError" && <UploadFault error={add.error} name={sending?.name ?? ""} />}
    </fieldset>
  );
}

function Sent({ name, fraction, onStop }: { name: string; fraction: number; onStop: () => void }) {
  const words = fraction < 1 ? `Sending ${name}, ${writePercent(fraction)}` : `Reading ${name}`;
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
