import type { StudySummary } from "../../../shared/schemas/resources.ts";
import { Word } from "../../components/button.tsx";
import { usePutAway } from "./api/put-away.ts";

/** Out of one's own list, and back into it; the study and everyone else's list stay as they are. */
export function PutAwayWord({ study }: { study: Pick<StudySummary, "id" | "title" | "isPutAway"> }) {
  const putAway = usePutAway();
  const away = study.isPutAway === true;
  return (
    <Word disabled={putAway.isPending} onClick={() => putAway.mutate({ studyId: study.id, away: !away })}>
      {away ? "Bring back" : "Put away"} <span className="sr-only">{study.title}</span>
    </Word>
  );
}
