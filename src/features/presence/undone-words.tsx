import { useEffect, useState } from "react";
import { Word } from "../../components/button.tsx";
import { type StudyConnection, type Undone, useStudyPart } from "../../sync/index.ts";

const SHOWN_MS = 9_000;

/** What undoing has just done, and the way back from it, for a while. */
export function UndoneWords({ study }: { study: StudyConnection }) {
  const undone = useStudyPart(study, "undone");
  const [over, setOver] = useState<Undone>();
  useEffect(() => {
    if (undone === undefined) return;
    const end = setTimeout(() => setOver(undone), SHOWN_MS);
    return () => clearTimeout(end);
  }, [undone]);
  const shown = undone !== over ? undone : undefined;
  return (
    <span role="status" className={shown ? "type-small undone" : "contents"}>
      {shown && (
        <>
          {shown.sentence}
          {shown.again && (
            <Word className="ml-3" onClick={() => (shown.again === "redo" ? study.redoStep() : study.undoStep())}>
              {shown.again === "redo" ? "Do it again" : "Undo"}
            </Word>
          )}
        </>
      )}
    </span>
  );
}
