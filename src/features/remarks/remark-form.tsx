import { type FormEvent, type KeyboardEvent, type ReactNode, useId, useState } from "react";
import { LONGEST_REMARK } from "../../../shared/schemas/remarks.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { writeNumber } from "../../lib/formats.ts";
import { commandOf } from "../../lib/keys.ts";
import { AboutChoice } from "./about-choice.tsx";
import { type Draft, useDraft } from "./drafts.ts";
import type { RemarkSetting } from "./remark-setting.ts";

interface RemarkFormProps {
  readonly setting: RemarkSetting;
  readonly label: string;
  /** What the draft is kept under. */
  readonly of: string;
  /** What is there to be changed. */
  readonly before?: string;
  /** The word on the button. */
  readonly word: string;
  /** Places that may be spoken of; without it there is no choice. */
  readonly places?: readonly string[];
  /** Stands at the end of the form. */
  readonly beside?: ReactNode;
  readonly send: (draft: Draft) => Promise<unknown>;
  /** The field has gone: sent, or put away with its words kept. */
  readonly onDone: () => void;
}

/** A field for a remark or a reply. What is written is kept until it has been sent, whatever happens. */
export function RemarkForm({ setting, label, of, before = "", word, places, beside, send, onDone }: RemarkFormProps) {
  const id = useId();
  const { draft, write, forget } = useDraft(setting.me.id, `${setting.studyId}/${of}`, { text: before });
  const [isSending, setSending] = useState(false);
  const [fault, setFault] = useState<string>();
  const over = draft.text.trim().length - LONGEST_REMARK;
  const submit = async () => {
    if (isSending) return;
    if (draft.text.trim() === "") return setFault("A remark needs words.");
    if (setting.isAlone) return setFault("Not sent: there is no connection. Your words are kept here until there is.");
    setSending(true);
    setFault(undefined);
    try {
      await send(draft);
      forget();
      onDone();
    } catch (error) {
      setFault(`Not sent, and your words are kept here. ${sentenceOf(error)}`);
      setSending(false);
    }
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const command = commandOf("remark", event);
    if (command === "giveUp") {
      event.preventDefault();
      event.stopPropagation();
      onDone();
    }
    if (command === "write") {
      event.preventDefault();
      void submit();
    }
  };
  return (
    <form
      className="remark-form"
      noValidate
      onKeyDown={onKeyDown}
      onSubmit={(event: FormEvent) => {
        event.preventDefault();
        void submit();
      }}
    >
      <label htmlFor={id} className="type-small block pb-1 text-ink2">
        {label}
      </label>
      <textarea
        id={id}
        // biome-ignore lint/a11y/noAutofocus: the person has just asked to write here
        autoFocus
        rows={Math.min(12, Math.max(3, draft.text.split("\n").length + Math.floor(draft.text.length / 60)))}
        className="field remark-field"
        value={draft.text}
        aria-invalid={fault !== undefined || over > 0 ? true : undefined}
        aria-describedby={`${id}-told`}
        onChange={(event) => write({ ...draft, text: event.target.value })}
      />
      {places && (
        <AboutChoice places={places} value={draft.anchor} onChange={(anchor) => write({ text: draft.text, anchor })} />
      )}
      <div id={`${id}-told`}>
        {over > 0 && (
          <Fault>
            {writeNumber(over + LONGEST_REMARK)} characters; at most {writeNumber(LONGEST_REMARK)} are kept.
          </Fault>
        )}
        {fault && <Fault>{fault}</Fault>}
      </div>
      <div className="flex flex-wrap items-baseline gap-x-4 gap-y-1 pt-2">
        <Button type="submit" disabled={isSending || over > 0}>
          {isSending ? "Sending" : word}
        </Button>
        <Word quiet className="type-small" onClick={onDone}>
          Put away
        </Word>
        {beside}
      </div>
    </form>
  );
}
