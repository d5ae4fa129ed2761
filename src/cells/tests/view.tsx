import { testsTable } from "../../../shared/tables/tests.ts";
import { testsNote } from "../../../shared/tables/tests-note.ts";
import { testsSentence } from "../../../shared/tables/tests-sentence.ts";
import { CopyTable } from "../copy-table.tsx";
import { Headline, OpenHead } from "../headline.tsx";
import type { BandProps, OpenProps } from "../types.ts";
import { Equations } from "./equations.tsx";
import { HypothesisTable } from "./hypothesis-table.tsx";
import { Meanings } from "./meanings.tsx";
import { Revealed, RevealedTable } from "./revealed.tsx";
import { StatisticsTable } from "./statistics-table.tsx";

/** Tests in their band: sentence, the hypotheses with what follows for each, note. */
export function TestsBand({ finding }: BandProps<"tests">) {
  return (
    <div className="space-y-3">
      <Headline sentence={testsSentence(finding)} />
      {finding.tests.length > 0 ? <HypothesisTable finding={finding} /> : <RevealedTable finding={finding} />}
      {finding.tests.length > 0 && (
        <p className="type-small max-w-[62ch] text-pretty text-ink2">{testsNote(finding).join(" ")}</p>
      )}
    </div>
  );
}

/** Tests in full: what each means, every statistic, homogeneity equation by equation, revealed preference. */
export function TestsOpen({ finding }: OpenProps<"tests">) {
  return (
    <div className="space-y-6">
      <OpenHead sentence={testsSentence(finding)}>
        {finding.tests.length > 0 && <CopyTable table={testsTable(finding)} />}
      </OpenHead>
      <Meanings finding={finding} />
      <StatisticsTable finding={finding} />
      {finding.tests.length > 0 && (
        <p className="type-small max-w-[70ch] text-pretty text-ink2">{testsNote(finding, true).join(" ")}</p>
      )}
      <Equations finding={finding} />
      <Revealed finding={finding} />
    </div>
  );
}
