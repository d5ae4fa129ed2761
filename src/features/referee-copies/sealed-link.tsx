import { useRef, useState } from "react";
import { Button, Word } from "../../components/button.tsx";
import { pages } from "../../lib/paths.ts";

/** A link as it is told, this once. */
export interface Told {
  readonly token: string;
  readonly cellName: string;
  /** Where it is sent; empty where nowhere. */
  readonly sentTo: string;
}

interface SealedLinkProps extends Told {
  readonly onAnother: () => void;
}

/** The link of a copy just sealed. It is told once: only a hash of it is kept. */
export function SealedLink({ token, cellName, sentTo, onAnother }: SealedLinkProps) {
  const field = useRef<HTMLInputElement>(null);
  const [said, setSaid] = useState("");
  const link = new URL(pages.referee(token), location.origin).href;
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(link);
      setSaid("Copied.");
    } catch {
      field.current?.select();
      setSaid("The browser does not let this page copy; the link is marked, copy it from there.");
    }
  };
  return (
    <div>
      <p className="type-finding pb-4">
        {cellName} is sealed. Whoever has this link reads the copy without an account. It is shown this once.
        {sentTo && ` It is on its way to ${sentTo}.`}
      </p>
      <div className="flex flex-wrap items-stretch gap-3">
        <input
          ref={field}
          readOnly
          aria-label="Link to the referee copy"
          className="field type-source min-w-0 flex-1 basis-72 text-[0.8125rem]"
          value={link}
          onFocus={(event) => event.target.select()}
        />
        <Button filled onClick={() => void copy()} className="min-h-[2.625rem]">
          Copy the link
        </Button>
      </div>
      <p role="status" className="type-small min-h-[1.5rem] pt-1.5 text-ink2">
        {said}
      </p>
      <p className="flex gap-5">
        <a href={link} target="_blank" rel="noreferrer" className="word">
          Open it as the referee will
        </a>
        <Word quiet onClick={onAnother}>
          Seal another
        </Word>
      </p>
    </div>
  );
}
