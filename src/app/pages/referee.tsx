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

/** The sealed copy behind a link. Whoever has the link may read it; nothing else of the study is asked for. */
export function RefereePage({ token, verify }: { token: string; verify?: Verify }) {
  const { data: copy, error } = useRefereeCopy(token);
  usePageTitle(copy && "Referee copy", copy?.content.study.title);
  if (error instanceof ApiRefusal && error.status !== 0) return <LinkOpensNothing />;
  if (error) return <LinkOpensNothing because={sentenceOf(error)} />;
  if (!copy) return <Waiting />;
  const { slutsky, system } = copy.content;
  return (
    <SealedCopy
      copy={copy}
      verify={verify}
      verdicts={<SealedVerdicts finding={slutsky} />}
      matrix={<SealedMatrix finding={slutsky} />}
      coefficients={<CoefficientView finding={system} />}
    />
  );
}

export default function Referee() {
  const { token = "" } = useParams();
  return <RefereePage token={token} />;
}
