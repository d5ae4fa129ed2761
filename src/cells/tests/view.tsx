import { testsTable } from "../../../shared/tables/tests.ts";
import { testsNote } from "../../../shared/tables/tests-note.ts";
import { testsSentence } from "../../../shared/tables/tests-sentence.ts";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { Equations } from "./equations.tsx";
import { Meanings } from "./meanings.tsx";
import { Revealed } from "./revealed.tsx";
import { StatisticsTable } from "./statistics-table.tsx";

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
