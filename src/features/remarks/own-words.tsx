import { Word } from "../../components/button.tsx";
import { WithdrawWords } from "./withdraw-words.tsx";

interface OwnWordsProps {
  readonly studyId: string;
  readonly remarkId: string;
  readonly replyId?: string;
  readonly may: { readonly edit: boolean; readonly withdraw: boolean };
  /** Read with the word: "the remark by Tomás Adeyemi". */
  readonly of: string;
  readonly onEdit: () => void;
}

/** *Edit* on one's own words, where they may be withdrawn too; *Withdraw* on others', for an owner. */
export function OwnWords({ studyId, remarkId, replyId, may, of, onEdit }: OwnWordsProps) {
  if (may.edit) {
    return (
      <Word quiet className="type-small remark-own" onClick={onEdit}>
        Edit <span className="sr-only">{of}</span>
      </Word>
    );
  }
  if (!may.withdraw) return null;
  return <WithdrawWords studyId={studyId} remarkId={remarkId} replyId={replyId} of={of} className="remark-own" />;
}
