import { useState } from "react";
import { Word } from "../../components/button.tsx";
import { type StudyConnection, useStudyPart } from "../../sync/index.ts";
import { savedInWords } from "./saved-words.ts";

interface SavedStateProps {
  readonly study: StudyConnection;
  /** When the study was last changed, as far as the server had said. */
  readonly changedAt: string;
}

/** Whether what is written is stored. Alone is not an error: edits are kept, and join when the line is back. */
export function SavedState({ study, changedAt }: SavedStateProps) {
  const connection = useStudyPart(study, "connection");
  const stored = useStudyPart(study, "stored");
  const readOnly = useStudyPart(study, "readOnly");
  const [savedAt, setSavedAt] = useState<number | string>(changedAt);
  const [waiting, setWaiting] = useState(false);
  if (waiting !== stored.unstored > 0) {
    setWaiting(!waiting);
    if (waiting) setSavedAt(Date.now());
  }
  const alone = connection.state === "working alone";
  return (
    <span role="status" className={`saved type-small ${alone ? "font-semibold text-ink" : "text-ink2"}`}>
      {alone && <span aria-hidden="true">… </span>}
      {savedInWords(connection, stored, savedAt, readOnly)}
      {connection.state === "refused" && (
        <Word className="ml-3" onClick={() => study.retry()}>
          Try again
        </Word>
      )}
    </span>
  );
}
