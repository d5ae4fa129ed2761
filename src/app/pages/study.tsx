import { lazy, Suspense } from "react";
import { useParams } from "react-router-dom";
import { Button, LinkWord } from "../../components/button.tsx";
import { useMe } from "../../features/accounts/api/get-me.ts";
import { useStudy } from "../../features/studies/api/get-study.ts";
import { sentenceOf } from "../../lib/api.ts";
import { pages } from "../../lib/paths.ts";
import { PlainPage } from "../plain-page.tsx";
import { Waiting } from "../waiting.tsx";
import { afterFirstFinding } from "../workspace/first-finding.ts";
import { FirstLook } from "../workspace/first-look.tsx";

const KeptWords = lazy(() => import("../../features/presence/kept-words.tsx"));
const Connected = lazy(() => afterFirstFinding(() => import("../workspace/connected.tsx")));

/** A study: its findings first, as the server tells of them, then the live document. */
export default function StudyPage() {
  const { studyId = "" } = useParams();
  const { data: me } = useMe();
  const { data: study, error, refetch } = useStudy(studyId);
  if (error && !study) {
    return (
      <PlainPage title="This study cannot be opened">
        <p className="type-prose">
          {sentenceOf(error)} Yours are among the <LinkWord to={pages.studies}>studies</LinkWord>.
        </p>
        <Button className="mt-5" onClick={() => void refetch()}>
          Try again
        </Button>
        {me && (
          <Suspense>
            <KeptWords
              accountId={me.id}
              studyId={studyId}
              because="You are no longer in this study, so the last you wrote could not be stored."
            />
          </Suspense>
        )}
      </PlainPage>
    );
  }
  if (!me || !study) return <Waiting />;
  return (
    <Suspense fallback={<FirstLook study={study} />}>
      <Connected key={studyId} study={study} me={me} />
    </Suspense>
  );
}
