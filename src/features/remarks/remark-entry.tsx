import { type ReactNode, useId, useRef, useState } from "react";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { counted } from "../../../shared/study/words.ts";
import { letterId, saidId } from "../../components/anchor-mark.tsx";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { whenInWords } from "../../lib/dates.ts";
import { useReply, useReword, useSettle } from "./api/change-remarks.ts";
import { AuthorLine } from "./author-line.tsx";
import { anchorInWords } from "./letters.ts";
import { OwnWords } from "./own-words.tsx";
import { RemarkForm } from "./remark-form.tsx";
import type { RemarkSetting } from "./remark-setting.ts";
import { RemarkText } from "./remark-text.tsx";
import { ReplyEntry } from "./reply-entry.tsx";
import { WithdrawWords } from "./withdraw-words.tsx";

interface RemarkEntryProps {
  readonly setting: RemarkSetting;
  readonly remark: Remark;
  /** The letter both places carry. */
  readonly letter?: string;
  /** To the place spoken of; absent where it is not on the page. */
  readonly onLetter?: () => void;
  /** What stands above it in a list of several cells. */
  readonly above?: ReactNode;
}

/** One remark with its replies and what can be done with it. */
export function RemarkEntry({ setting, remark, letter, onLetter, above }: RemarkEntryProps) {
  const id = useId();
  const [isEditing, setEditing] = useState(false);
  const reword = useReword(setting.studyId, remark.id);
  const { author, settled, reopened } = remark;
  const isFull = above !== undefined;
  return (
    <li id={isFull ? undefined : saidId(remark.id)} data-remark={remark.id} tabIndex={-1} className="remark">
      {above}
      <AuthorLine {...remark} colour={setting.colourOf(author.id)} full={isFull}>
        {letter && onLetter && <Letter letter={letter} remark={remark} onFollow={onLetter} />}
      </AuthorLine>
      {remark.anchor && !onLetter && !isFull && <p className="text-ink2">on {anchorInWords(remark.anchor)}</p>}
      {isEditing ? (
        <RemarkForm
          setting={setting}
          label="Your remark"
          of={`edit/${remark.id}`}
          before={remark.text}
          word="Keep the change"
          beside={<WithdrawWords studyId={setting.studyId} remarkId={remark.id} of={`the remark by ${author.name}`} />}
          send={({ text }) => reword.mutateAsync(text)}
          onDone={() => setEditing(false)}
        />
      ) : remark.withdrawnAt ? (
        <p className="text-ink3 italic">withdrawn</p>
      ) : (
        <RemarkText key={remark.text} text={remark.text} />
      )}
      {remark.replies.length > 0 && <Replies id={id} setting={setting} remark={remark} full={isFull} />}
      {settled && (
        <p className="text-ink2">
          Settled by {settled.by.name}, {whenInWords(settled.at)}
        </p>
      )}
      {reopened && !settled && (
        <p className="text-ink3">
          Opened again by {reopened.by.name}, {whenInWords(reopened.at)}
        </p>
      )}
      {!isEditing && <Acts setting={setting} remark={remark} onEdit={() => setEditing(true)} />}
    </li>
  );
}

/** The letter of a remark, which leads to what it speaks of. */
function Letter({ letter, remark, onFollow }: { letter: string; remark: Remark; onFollow: () => void }) {
  return (
    <>
      <a
        href={`#${letterId(remark.id)}`}
        aria-label={`${letter}, to ${anchorInWords(remark.anchor ?? "")}`}
        className="remark-letter"
        onClick={(event) => {
          event.preventDefault();
          onFollow();
        }}
      >
        {letter}
      </a>{" "}
    </>
  );
}

/** On a narrow page replies wait behind their number. */
function Replies({
  id,
  setting,
  remark,
  full,
}: { id: string; full: boolean } & Pick<RemarkEntryProps, "setting" | "remark">) {
  const [isOpen, setOpen] = useState(false);
  return (
    <>
      <Word
        className="type-small remark-replies-word"
        aria-expanded={isOpen}
        aria-controls={id}
        onClick={() => setOpen(!isOpen)}
      >
        {isOpen ? "Fold the replies" : counted(remark.replies.length, "reply", "replies")}
      </Word>
      <ul id={id} className="remark-replies" data-open={isOpen || full || undefined}>
        {remark.replies.map((reply) => (
          <ReplyEntry key={reply.id} setting={setting} remarkId={remark.id} reply={reply} full={full} />
        ))}
      </ul>
    </>
  );
}

interface ActsProps extends Pick<RemarkEntryProps, "setting" | "remark"> {
  readonly onEdit: () => void;
}

/** *Reply*, *Settle*, and for one's own remarks *Edit* and *Withdraw*. */
function Acts({ setting, remark, onEdit }: ActsProps) {
  const [isReplying, setReplying] = useState(false);
  const [alone, setAlone] = useState(false);
  const word = useRef<HTMLButtonElement>(null);
  const reply = useReply(setting.studyId, remark.id);
  const settle = useSettle(setting.studyId, remark.id);
  const of = `the remark by ${remark.author.name}`;
  const toggle = (settled: boolean) => {
    setAlone(setting.isAlone);
    if (!setting.isAlone) settle.mutate(settled);
  };
  if (isReplying && !remark.settled) {
    return (
      <RemarkForm
        setting={setting}
        label={`Reply to ${remark.author.name}`}
        of={`reply/${remark.id}`}
        word="Reply"
        send={({ text }) => reply.mutateAsync(text)}
        onDone={() => {
          setReplying(false);
          // Once the word is there again.
          setTimeout(() => word.current?.focus(), 0);
        }}
      />
    );
  }
  return (
    <div className="remark-words">
      {!remark.settled && (
        <Word ref={word} className="type-small" onClick={() => setReplying(true)}>
          Reply <span className="sr-only">to {of}</span>
        </Word>
      )}
      {remark.may.settle && (
        <Word className="type-small" disabled={settle.isPending} onClick={() => toggle(!remark.settled)}>
          {remark.settled ? "Open again" : "Settle"} <span className="sr-only">{of}</span>
        </Word>
      )}
      {!remark.settled && (
        <OwnWords studyId={setting.studyId} remarkId={remark.id} may={remark.may} of={of} onEdit={onEdit} />
      )}
      {settle.isError && <Fault>{sentenceOf(settle.error)}</Fault>}
      {alone && setting.isAlone && <Fault>Not done: there is no connection.</Fault>}
    </div>
  );
}
