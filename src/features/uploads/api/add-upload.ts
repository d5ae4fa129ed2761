import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type Upload, upload } from "../../../../shared/schemas/resources.ts";
import { ApiRefusal, refusalOf, unreachable } from "../../../lib/api.ts";
import { writeNumber } from "../../../lib/formats.ts";
import { api } from "../../../lib/paths.ts";

const LARGEST = 100 * 1024 * 1024;

export interface Sending {
  readonly file: File;
  /** How much of the file has gone out, 0 to 1; at 1 the installation is reading it. */
  readonly onProgress: (fraction: number) => void;
  readonly signal: AbortSignal;
  /** The upload whose next version the file is; that of its own name, unless said. */
  readonly replaces?: string;
  /** An upload of its own although one of its name is there. */
  readonly beside?: boolean;
}

/** Sends a file. `fetch` does not tell how much has gone out, so this asks the older way. */
export function sendUpload(studyId: string, { file, onProgress, signal, replaces, beside }: Sending): Promise<Upload> {
  if (file.size > LARGEST) return Promise.reject(tooLarge(file));
  const form = new FormData();
  form.append("file", file);
  const how = new URLSearchParams({ ...(replaces && { replaces }), ...(beside && { beside: "1" }) });
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open("POST", `${api.uploads(studyId)}${how.size > 0 ? `?${how}` : ""}`);
    request.setRequestHeader("accept", "application/json");
    request.upload.onprogress = ({ loaded, total }) => onProgress(total > 0 ? loaded / total : 0);
    request.upload.onload = () => onProgress(1);
    request.onerror = () => reject(unreachable());
    request.onabort = () => reject(new DOMException("Given up", "AbortError"));
    request.onload = () => {
      if (request.status < 200 || request.status >= 300) return reject(refusalOf(request.status, request.responseText));
      const read = upload.safeParse(JSON.parse(request.responseText));
      if (read.success) resolve(read.data);
      else reject(read.error);
    };
    signal.addEventListener("abort", () => request.abort(), { once: true });
    request.send(form);
  });
}

function tooLarge(file: File): ApiRefusal {
  const size = `${writeNumber(file.size / 1024 / 1024, 1)} MB`;
  return new ApiRefusal(413, "too large", `${file.name} has ${size}; an upload may have 100 MB.`);
}

export function useAddUpload(studyId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (sending: Sending) => sendUpload(studyId, sending),
    onSuccess: (added) => {
      client.setQueryData<Upload[]>(["uploads", studyId], (uploads = []) => [...uploads, added]);
    },
  });
}
