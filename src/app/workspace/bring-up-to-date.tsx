import { counted } from "../../../shared/study/words.ts";
import { Button } from "../../components/button.tsx";
import { useBringUpToDate } from "../../features/estimation/api/bring-up-to-date.ts";
import { aboutInWords } from "../../lib/dates.ts";
import { type Standing, waitingToBeAsked } from "./standing.ts";

interface BringUpToDateProps {
  readonly studyId: string;
  readonly standings: readonly Standing[];
  readonly className?: string;
}

/** *Bring up to date: 1 cell, about 20 s*; nothing while nothing waits to be asked. */
export function BringUpToDate({ studyId, standings, className }: BringUpToDateProps) {
  const bring = useBringUpToDate(studyId);
  const { count, aboutMs } = waitingToBeAsked(standings);
  if (count === 0) return null;
  return (
    <Button filled className={className} disabled={bring.isPending} onClick={() => bring.mutate()}>
      Bring up to date: {counted(count, "cell")}, {aboutInWords(aboutMs)}
    </Button>
  );
}
