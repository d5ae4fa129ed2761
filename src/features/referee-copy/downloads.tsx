import { useMemo, useState } from "react";
import type { RefereeCopy } from "../../../shared/schemas/referee-copy.ts";
import { Fault } from "../../components/field.tsx";
import { writeNumber } from "../../lib/formats.ts";
import { saveFile } from "../../lib/save-file.ts";
import { type SealedFile, sealedFiles } from "./sealed-files.ts";

const save = ({ text, type, name }: SealedFile) => saveFile(name, new Blob([text], { type }));

/** Packed when it is first asked for, by what is loaded then. */
async function saveBundle(copy: RefereeCopy): Promise<void> {
  const { sealedBundle } = await import("./bundle.ts");
  const zip = new Blob([sealedBundle(copy).slice()], { type: "application/zip" });
  saveFile(`referee-copy-${copy.fingerprint.slice(0, 8)}-replication.zip`, zip);
}

const size = (file: SealedFile) =>
  `${file.format}, ${writeNumber(Math.max(1, Math.round(new Blob([file.text]).size / 1000)))} kB`;

/** The numbers to take away: made here from what is on the page. */
export function Downloads({ copy }: { copy: RefereeCopy }) {
  const files = useMemo(() => sealedFiles(copy), [copy]);
  const [fault, setFault] = useState<string>();
  return (
    <section aria-labelledby="downloads" className="print:hidden">
      <h2 id="downloads" className="type-section mb-1.5 text-[1.3125rem]">
        Downloads
      </h2>
      <ul className="border-rule2 border-t">
        {files.map((file) => (
          <li key={file.label} className="flex items-baseline justify-between gap-3 border-rule2 border-b py-1.5">
            <button type="button" className="word text-left" onClick={() => save(file)}>
              {file.label}
            </button>
            <span className="type-small shrink-0 text-ink2">{size(file)}</span>
          </li>
        ))}
        <li className="flex items-baseline justify-between gap-3 border-rule2 border-b py-1.5">
          <button
            type="button"
            className="word text-left"
            onClick={() =>
              void saveBundle(copy).catch(() =>
                setFault(
                  "The bundle could not be made: the part of this page that packs it did not arrive. Try again.",
                ),
              )
            }
          >
            Replication bundle, without the data
          </button>
          <span className="type-small shrink-0 text-ink2">ZIP</span>
        </li>
      </ul>
      {fault && <Fault>{fault}</Fault>}
      <p className="type-small mt-4 text-ink2">
        The JSON is the very text whose SHA-256 is the fingerprint; any program can check it.
      </p>
    </section>
  );
}
