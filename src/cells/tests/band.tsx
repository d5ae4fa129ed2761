import { testsNote } from "../../../shared/tables/tests-note.ts";
import { testsSentence } from "../../../shared/tables/tests-sentence.ts";
import { Headline } from "../headline.tsx";
import type { BandProps } from "../types.ts";
import { HypothesisTable } from "./hypothesis-table.tsx";
import { RevealedTable } from "./revealed.tsx";

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
