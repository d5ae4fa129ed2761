import { useState } from "react";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useWithdraw } from "./api/change-remarks.ts";

interface OwnWordsProps {
  readonly studyId: string;
  readonly remarkId: string;
  readonly replyId?: string;
  readonly may: { readonly edit: boolean; readonly withdraw: boolean };
  /** Read with each word: "remark by Tomás". */
  readonly of: string;
  readonly onEdit: () => void;
}

/** *Edit* and *Withdraw*, for those who may; withdrawing is asked once more, for the words are gone then. */
export function OwnWords({ studyId, remarkId, replyId, may, of, onEdit }: OwnWordsProps) {
  const [isAsking, setAsking] = useState(false);
  const withdraw = useWithdraw(studyId, remarkId, replyId);
  if (isAsking) {
    return (
      <span className="basis-full">
        <span className="text-ink2">Its words are gone then. </span>
        <Word className="type-small mr-3" disabled={withdraw.isPending} onClick={() => withdraw.mutate()}>
          Withdraw it
        </Word>
        <Word autoFocus quiet className="type-small" onClick={() => setAsking(false)}>
          Keep it
        </Word>
        {withdraw.isError && <Fault>{sentenceOf(withdraw.error)}</Fault>}
      </span>
    );
  }
  return (
    <>
      {may.edit && (
        <Word quiet className="type-small remark-own" onClick={onEdit}>
          Edit <span className="sr-only">{of}</span>
        </Word>
      )}
      {may.withdraw && (
        <Word quiet className="type-small remark-own" onClick={() => setAsking(true)}>
          Withdraw <span className="sr-only">{of}</span>
        </Word>
      )}
    </>
  );
}
