import type { ReactNode } from "react";
import type { StudySummary } from "../../../shared/schemas/resources.ts";
import { counted } from "../../../shared/study/words.ts";
import { Fault } from "../../components/field.tsx";
import { StateWords } from "../../components/state-shape.tsx";
import { useChangeStudy } from "../../features/studies/api/change-study.ts";
import { peopleInWords, stateCounts } from "../../features/studies/study-words.ts";
import { sentenceOf } from "../../lib/api.ts";
import { whenInWords } from "../../lib/dates.ts";
import { InPlace } from "./in-place.tsx";
import type { Standing } from "./standing.ts";

interface HeadBandProps {
  readonly study: StudySummary;
  readonly standings: readonly Standing[];
  readonly readOnly: boolean;
  /** On one column, what the top bar has no room for. */
  readonly action?: ReactNode;
  /** More of how the study stands. */
  readonly children?: ReactNode;
}

/** The study's own band: title and people on the left, what it asks and how it stands on the right. */
export function HeadBand({ study, standings, readOnly, action, children }: HeadBandProps) {
  const change = useChangeStudy(study.id);
  return (
    <div className="band head-band">
      <div className="verso">
        <h1 className={readOnly ? "type-title" : "sr-only"}>{study.title}</h1>
        {!readOnly && (
          <InPlace
            label="Title of the study"
            className="type-title"
            value={study.title}
            longest={200}
            needed="A study needs a title."
            onCommit={(title) => change.mutate({ title })}
          />
        )}
        <p className="type-small pt-2 text-ink2">{peopleInWords(study.people)}</p>
      </div>
      <div className="recto">
        {readOnly ? (
          <p className="lede">{study.lede}</p>
        ) : (
          <InPlace
            label="What the study asks"
            className="lede"
            value={study.lede}
            longest={600}
            placeholder="What does this study ask?"
            onCommit={(lede) => change.mutate({ lede })}
          />
        )}
        {change.isError && <Fault>{sentenceOf(change.error)}</Fault>}
        <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-3 pt-3">
          <p className="type-small flex flex-wrap items-baseline gap-x-5 gap-y-1 text-ink2">
            <span className="wide-only">{counted(standings.length, "cell")}</span>
            {stateCounts(standings.flatMap(({ state, isUnread }) => (isUnread ? [] : [state]))).map(
              ({ state, words }) => (
                <StateWords key={state} state={state} words={words} />
              ),
            )}
            {children}
            {study.sealedAt && <span>Last sealed {whenInWords(study.sealedAt)}</span>}
          </p>
          {action}
        </div>
      </div>
    </div>
  );
}
