import { type KeyboardEvent, useState } from "react";
import { Fault } from "../../components/field.tsx";
import { commandOf } from "../../lib/keys.ts";

interface InPlaceProps {
  readonly label: string;
  readonly value: string;
  readonly className: string;
  readonly longest: number;
  readonly placeholder?: string;
  /** What an empty text would be refused with; without it, empty is allowed. */
  readonly needed?: string;
  readonly onCommit: (value: string) => void;
}

/** Words that are written where they stand: committed on leaving or with Enter, given up with Escape. */
export function InPlace({ label, value, className, longest, placeholder, needed, onCommit }: InPlaceProps) {
  const [draft, setDraft] = useState<string>();
  const words = (draft ?? value).replace(/\s*\n\s*/g, " ");
  const fault = needed !== undefined && draft !== undefined && words.trim() === "" ? needed : undefined;
  const commit = () => {
    if (!fault && draft !== undefined && words.trim() !== value) onCommit(words.trim());
    setDraft(undefined);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLTextAreaElement>) => {
    const command = commandOf("field", event);
    if (command === "giveUp") setDraft(undefined);
    if (command !== "write") return;
    event.preventDefault();
    event.currentTarget.blur();
  };
  return (
    <>
      <div className={`in-place ${className}`} data-words={words || placeholder}>
        <textarea
          aria-label={label}
          rows={1}
          maxLength={longest}
          placeholder={placeholder}
          value={words}
          onChange={(event) => setDraft(event.target.value)}
          onBlur={commit}
          onKeyDown={onKeyDown}
        />
      </div>
      {fault && <Fault>{fault}</Fault>}
    </>
  );
}
