import { counted } from "../../../shared/study/words.ts";
import { Word } from "../../components/button.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useRemarks } from "./api/list-remarks.ts";

/** How many remarks of the study are open, which leads to all of them. */
export function OpenRemarks({ studyId, onRemarks }: { studyId: string; onRemarks: () => void }) {
  const { data, error, refetch } = useRemarks(studyId);
  if (error && !data) {
    return (
      <span>
        Remarks are not here: {sentenceOf(error)}{" "}
        <Word className="type-small" onClick={() => void refetch()}>
          Ask again
        </Word>
      </span>
    );
  }
  if (!data || data.length === 0) return null;
  const open = data.filter(({ settled }) => !settled).length;
  return (
    <button type="button" className="reference" onClick={onRemarks}>
      {open === 0 ? "no remark open" : `${counted(open, "remark")} open`}
    </button>
  );
}
