import { lazy, type ReactNode, Suspense } from "react";
import { useParams } from "react-router-dom";
import { capital } from "../../../shared/study/words.ts";
import { StateWords } from "../../components/state-shape.tsx";
import { aboutInWords, durationInWords, whenInWords } from "../../lib/dates.ts";
import type { Standing } from "./standing.ts";

/** Since when, why, or how far: what stands after the state's word. */
export function stateDetail({ state, because, last, aboutMs, kind }: Standing): string {
  if (state === "current" && last) {
    const took = kind === "data" ? "" : `, took ${durationInWords(last.tookMs)}`;
    return `since ${whenInWords(last.at)}${took}`;
  }
  if (state === "draft") {
    const never = kind === "system" ? "never estimated" : "";
    const about = aboutMs === undefined ? "" : aboutInWords(aboutMs);
    return [never, because, about].filter(Boolean).join("; ");
  }
  return because ?? "";
}

const WhoAndWhen = lazy(() => import("./who-and-when.tsx"));

interface StateLineProps {
  readonly standing: Standing;
  /** Who is typing here, where the page has no room for it beside the source. */
  readonly beside?: ReactNode;
  readonly actions?: ReactNode;
  /** Said in the place of since when or why. */
  readonly detail?: string;
}

/** Shape, word, since when or why; at the right the actions as words. */
export function StateLine({ standing, beside, actions, detail }: StateLineProps) {
  return (
    <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1 pb-3">
      <p className="type-small flex min-w-0 flex-wrap items-baseline gap-x-2.5" aria-live="polite">
        {standing.isUnread ? (
          <span className="text-ink2">Reading the cell</span>
        ) : (
          <>
            <StateWords state={standing.state} words={capital(standing.state)} />
            <span className="text-ink2 tabular-nums">{detail ?? stateDetail(standing)}</span>
            <OutOfDateBy standing={standing} />
          </>
        )}
        {beside}
      </p>
      {actions && <div className="no-print type-small flex flex-wrap items-baseline gap-x-5">{actions}</div>}
    </div>
  );
}

/** Of a finding out of date also who changed what it answers, and when. */
function OutOfDateBy({ standing }: { standing: Standing }) {
  const { studyId } = useParams();
  if (standing.state !== "out of date" || !standing.last || !studyId) return null;
  return (
    <Suspense>
      <WhoAndWhen studyId={studyId} standing={standing} last={standing.last} />
    </Suspense>
  );
}
