import { Unfetched } from "../../components/unfetched.tsx";
import { useFinding } from "../../features/findings/api/get-finding.ts";
import { sentenceOf } from "../../lib/api.ts";
import { whenInWords } from "../../lib/dates.ts";
import { FindingBand, OnItsWay } from "./finding-view.tsx";
import type { Standing } from "./standing.ts";

interface KeptFindingProps {
  readonly studyId: string;
  readonly last: NonNullable<Standing["last"]>;
}

/** A finding that no longer answers its cell, together with the source it does answer. */
export function KeptFinding({ studyId, last }: KeptFindingProps) {
  const { data, error, refetch } = useFinding(studyId, last.fingerprint);
  return (
    <section aria-label="The last finding, under its own specification" className="kept arrives">
      <p className="type-small pb-2 text-stale">
        <b>Not this specification's.</b> Found {whenInWords(last.at)} under:
      </p>
      <pre className="type-source whitespace-pre-wrap pb-4 text-ink2">{last.source.trimEnd()}</pre>
      {error && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
      {!data && !error && <OnItsWay />}
      {data && <FindingBand finding={data.finding} />}
    </section>
  );
}
