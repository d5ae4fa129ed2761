import { useEffect, useState } from "react";
import { counted } from "../../../shared/study/words.ts";
import { Button } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { useBringUpToDate } from "../../features/estimation/api/bring-up-to-date.ts";
import { useCancelEstimation } from "../../features/estimation/api/cancel-estimation.ts";
import { sentenceOf } from "../../lib/api.ts";
import { aboutInWords } from "../../lib/dates.ts";
import { type Asked, type GoingThrough, goingThrough } from "./going-through.ts";
import { type Standing, waitingToBeAsked } from "./standing.ts";

interface BringUpToDateProps {
  readonly studyId: string;
  readonly standings: readonly Standing[];
}

/**
 * *Bring up to date: 3 cells, about 20 s*; nothing while nothing waits to be asked. Once asked, one progress over all
 * of them, in the order they read each other, with a way out at any moment. What is light follows by itself.
 */
export function BringUpToDate({ studyId, standings }: BringUpToDateProps) {
  const bring = useBringUpToDate(studyId);
  const cancel = useCancelEstimation(studyId);
  const { asked, begin } = useAsked(standings, bring.isPending);
  const { waiting, count, aboutMs } = waitingToBeAsked(standings);
  const fault = bring.error ?? cancel.error;
  const told = fault && <Fault>{sentenceOf(fault)}</Fault>;
  if (asked) {
    const going = goingThrough(asked, standings);
    // The last first, so that none begins for an end to the one before it.
    const stop = async () => {
      for (const cellId of going.left.toReversed()) await cancel.mutateAsync(cellId);
    };
    return (
      <>
        <Going going={going} isStopping={cancel.isPending} onCancel={() => void stop().catch(() => {})} />
        {told}
      </>
    );
  }
  if (count === 0) return told;
  const ask = () => {
    cancel.reset();
    begin(waiting);
    bring.mutate();
  };
  return (
    <>
      <Button filled disabled={bring.isPending} onClick={ask}>
        Bring up to date: {counted(count, "cell")}, {aboutInWords(aboutMs)}
      </Button>
      {told}
    </>
  );
}

interface GoingProps {
  readonly going: GoingThrough;
  readonly isStopping: boolean;
  readonly onCancel: () => void;
}

function Going({ going: { done, of, now, fraction }, isStopping, onCancel }: GoingProps) {
  const which = Math.min(of, done + 1);
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
      <span role="status" className="type-small whitespace-nowrap">
        {now ? `Estimating ${now}` : "Bringing up to date"}, {which} of {of}
      </span>
      <progress aria-label="Bringing up to date" className="progress w-28!" max={1} value={fraction} />
      <Button disabled={isStopping} onClick={onCancel}>
        {isStopping ? "Cancelling" : "Cancel"}
      </Button>
    </div>
  );
}

/** What this person asked for together, until all of it is settled. */
function useAsked(standings: readonly Standing[], isAsking: boolean) {
  const [asked, setAsked] = useState<readonly Asked[]>();
  const [hasBegun, setHasBegun] = useState(false);
  const states = (asked ?? []).map(({ cellId }) => standings.find(({ cell }) => cell.id === cellId)?.state);
  const isGoing = states.includes("estimating");
  // Between the answer and the first word of the socket nothing seems to be going on yet.
  const isStill = !isGoing && (hasBegun || states.every((state) => state === "current" || state === "failed"));
  useEffect(() => {
    if (isGoing) setHasBegun(true);
  }, [isGoing]);
  useEffect(() => {
    if (asked && !isAsking && isStill) setAsked(undefined);
  }, [asked, isAsking, isStill]);
  useEffect(() => {
    if (!asked || hasBegun || isAsking) return;
    // Asked for and refused one by one, nothing ever begins.
    const patience = setTimeout(setHasBegun, PATIENCE_MS, true);
    return () => clearTimeout(patience);
  }, [asked, hasBegun, isAsking]);
  return {
    asked,
    begin: (cells: readonly Asked[]) => {
      setHasBegun(false);
      setAsked(cells);
    },
  };
}

const PATIENCE_MS = 3_000;
