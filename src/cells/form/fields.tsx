import { type KeyboardEvent, type ReactNode, useId, useState } from "react";
import { commandOf } from "../../lib/keys.ts";

const CONTROL =
  "min-h-6 w-full min-w-0 border-ctl border-b bg-transparent py-0.5 text-[0.875rem]/[1.25rem] text-ink hover:border-accent max-[599px]:min-h-11";
const MONO = "font-mono text-[0.8125rem]/[1.375rem]";

/** A label and what stands beside it. */
export function FormRow({ label, htmlFor, children }: { label: ReactNode; htmlFor?: string; children: ReactNode }) {
  return (
    <div className="grid grid-cols-[minmax(5.5rem,7.25rem)_minmax(0,1fr)] items-baseline gap-x-3 py-1">
      {htmlFor ? (
        <label htmlFor={htmlFor} className="text-[0.875rem]/[1.25rem] text-ink2">
          {label}
        </label>
      ) : (
        <span className="text-[0.875rem]/[1.25rem] text-ink2">{label}</span>
      )}
      <div className="min-w-0">{children}</div>
    </div>
  );
}

export interface Choice {
  readonly value: string;
  readonly label: string;
  /** How it reads once chosen, when its label says more. */
  readonly chosen?: string;
}

export const asChoices = (words: readonly string[]): Choice[] => words.map((word) => ({ value: word, label: word }));

interface ChoiceProps {
  readonly value: string;
  readonly choices: readonly Choice[];
  readonly onChange: (value: string) => void;
  readonly readOnly: boolean;
  /** What leaving it open means: "none", "the last good". Absent when it must be chosen. */
  readonly none?: string;
  readonly mono?: boolean;
}

/** One of several words. A word that is not among them stays to be seen, and says so. */
export function ChoiceControl({
  value,
  choices,
  onChange,
  readOnly,
  none,
  mono = false,
  ...named
}: ChoiceProps & { id?: string; "aria-label"?: string }) {
  const known = choices.find((choice) => choice.value === value);
  if (readOnly) {
    return (
      <span className={mono && value !== "" ? MONO : "text-[0.875rem]/[1.25rem]"}>
        {known?.chosen ?? known?.label ?? (value || none || "not chosen")}
      </span>
    );
  }
  return (
    <select
      {...named}
      value={value}
      onChange={(event) => onChange(event.target.value)}
      className={`${CONTROL} cursor-pointer ${mono ? MONO : ""} ${value === "" ? "font-serif text-ink2 italic" : ""}`}
    >
      {(none !== undefined || value === "") && <option value="">{none ?? "choose"}</option>}
      {value !== "" && !known && <option value={value}>{value}, not known here</option>}
      {choices.map((choice) => (
        <option key={choice.value} value={choice.value}>
          {choice.value === value ? (choice.chosen ?? choice.label) : choice.label}
        </option>
      ))}
    </select>
  );
}

export function ChoiceField({ label, ...choice }: ChoiceProps & { label: string }) {
  const id = useId();
  return (
    <FormRow label={label} htmlFor={choice.readOnly ? undefined : id}>
      <ChoiceControl id={id} {...choice} />
    </FormRow>
  );
}

interface TextProps {
  readonly value: string;
  readonly onCommit: (value: string) => void;
  readonly readOnly: boolean;
  readonly mono?: boolean;
  readonly numeric?: boolean;
}

/** Words of one's own: written when the field is left or Enter pressed, given up with Escape. */
export function TextControl({
  value,
  onCommit,
  readOnly,
  mono = false,
  numeric = false,
  ...named
}: TextProps & { id?: string; "aria-label"?: string }) {
  const [draft, setDraft] = useState<string | undefined>();
  if (readOnly) return <span className={mono ? MONO : "text-[0.875rem]/[1.25rem]"}>{value || "none"}</span>;
  const commit = () => {
    if (draft !== undefined && draft.trim() !== value) onCommit(draft.trim());
    setDraft(undefined);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    const command = commandOf("field", event);
    if (command === "write") commit();
    if (command !== "giveUp" || draft === undefined) return;
    // The first Escape gives up what was typed; only the next one leaves the form.
    event.stopPropagation();
    setDraft(undefined);
  };
  return (
    <input
      {...named}
      type="text"
      inputMode={numeric ? "decimal" : undefined}
      value={draft ?? value}
      spellCheck={false}
      autoComplete="off"
      onChange={(event) => setDraft(event.target.value)}
      onBlur={commit}
      onKeyDown={onKeyDown}
      className={`${CONTROL} ${mono ? MONO : ""}`}
    />
  );
}

export function TextField({ label, ...text }: TextProps & { label: string }) {
  const id = useId();
  return (
    <FormRow label={label} htmlFor={text.readOnly ? undefined : id}>
      <TextControl id={id} {...text} />
    </FormRow>
  );
}

/** Says that a form cannot speak for a text that cannot be read. */
export function Unreadable() {
  return (
    <p className="text-[0.875rem]/[1.25rem] text-fail">
      The text cannot be read as it stands, so the form cannot show it. Mend it under Text.
    </p>
  );
}
