import { lazy, Suspense, useState } from "react";
import { useParams } from "react-router-dom";
import { SealedMatrix } from "../../cells/slutsky/sealed-matrix.tsx";
import { SealedVerdicts } from "../../cells/slutsky/sealed-verdicts.tsx";
import { CoefficientView } from "../../cells/system/coefficient-view.tsx";
import { useRefereeCopy } from "../../features/referee-copy/api/get-referee-copy.ts";
import { LinkOpensNothing } from "../../features/referee-copy/link-opens-nothing.tsx";
import { SealedCopy } from "../../features/referee-copy/sealed-copy.tsx";
import type { Verify } from "../../features/referee-copy/use-verification.ts";
import { ApiRefusal, sentenceOf } from "../../lib/api.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { Waiting } from "../waiting.tsx";

const AlsoSealed = lazy(async () => ({ default: (await import("./also-sealed.tsx")).AlsoSealed }));

/** The sealed copy behind a link. Whoever has the link may read it; nothing else of the study is asked for. */
export function RefereePage({ token, verify }: { token: string; verify?: Verify }) {
  const [newest, setNewest] = useState(false);
  const { data: copy, error, refetch } = useRefereeCopy(token, newest);
  usePageTitle(copy && "Referee copy", copy?.content.study.title);
  const isAnswer = error instanceof ApiRefusal && (error.status === 400 || error.status === 404);
  if (error)
    return <LinkOpensNothing {...(!isAnswer && { because: sentenceOf(error), onAgain: () => void refetch() })} />;
  if (!copy) return <Waiting />;
  const { slutsky, system, also, methods } = copy.content;
  return (
    <SealedCopy
      key={copy.fingerprint}
      copy={copy}
      verify={verify}
      verdicts={<SealedVerdicts finding={slutsky} />}
      matrix={<SealedMatrix finding={slutsky} />}
      coefficients={<CoefficientView finding={system} />}
      also={
        (also || methods) && (
          <Suspense>
            <AlsoSealed also={also ?? []} methods={methods ?? []} />
          </Suspense>
        )
      }
      onNewer={() => setNewest(true)}
    />
  );
}

export default function Referee() {
  const { token = "" } = useParams();
  return <RefereePage token={token} />;
}
