import { Link } from "react-router-dom";
import type { StudySummary } from "../../../shared/schemas/resources.ts";
import { StateWords } from "../../components/state-shape.tsx";
import { ThreadAside } from "../../components/thread-aside.tsx";
import { agoInWords } from "../../lib/dates.ts";
import { pages } from "../../lib/paths.ts";
import { PutAwayWord } from "./put-away-word.tsx";
import { belongingInWords, shownState, stateCounts } from "./study-words.ts";

/** A study in the list: what it asks, how its cells stand, what they read, whose it is. */
export function StudyEntry({ study, you }: { study: StudySummary; you: string }) {
  const states = study.cells.map(({ state }) => shownState(state));
  const stops = study.cells.map(({ name, reads, state }) => ({ id: name, name, reads, state: shownState(state) }));
  return (
    <li className="study-entry">
      <div className="min-w-0">
        <h2 className="type-cell-name font-normal!">
          <Link to={pages.study(study.id)} className="text-ink no-underline hover:text-accent hover:underline">
            {study.title}
          </Link>
        </h2>
        {study.lede && (
          <p className="mt-1 line-clamp-3 max-w-[34rem] font-serif text-[1.03125rem]/[1.4375rem] text-ink2">
            {study.lede}
          </p>
        )}
        <p className="type-small flex flex-wrap gap-x-5 gap-y-1 pt-1.5">
          {stateCounts(states).map(({ state, words }) => (
            <StateWords key={state} state={state} words={words} />
          ))}
          {states.length === 0 && <span className="text-ink3">No cell yet</span>}
        </p>
      </div>
      <div className="study-entry-thread">
        <ThreadAside stops={stops} />
      </div>
      <div className="type-small text-ink2">
        <p className="text-ink">Changed {agoInWords(study.changedAt)}</p>
        <p>{belongingInWords(study, you)}</p>
        {study.sealedAt && <p>Last sealed {agoInWords(study.sealedAt)}</p>}
        <p>
          <PutAwayWord study={study} />
        </p>
      </div>
    </li>
  );
}
