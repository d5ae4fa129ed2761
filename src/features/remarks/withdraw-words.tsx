import { useState } from "react";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useWithdraw } from "./api/change-remarks.ts";

interface WithdrawWordsProps {
  readonly studyId: string;
  readonly remarkId: string;
  readonly replyId?: string;
  readonly of: string;
  readonly className?: string;
}

/** *Withdraw*, asked once more, for the words are gone then. */
export function WithdrawWords({ studyId, remarkId, replyId, of, className = "" }: WithdrawWordsProps) {
  const [isAsking, setAsking] = useState(false);
  const withdraw = useWithdraw(studyId, remarkId, replyId);
  if (!isAsking) {
    return (
      <Word quiet className={`type-small ${className}`} onClick={() => setAsking(true)}>
        Withdraw <span className="sr-only">{of}</span>
      </Word>
    );
  }
  return (
    <span className="block basis-full">
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
