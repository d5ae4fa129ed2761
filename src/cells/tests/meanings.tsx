import { useId } from "react";
import type { TestsFinding } from "../../../shared/schemas/tests.ts";
import { capital } from "../../../shared/study/words.ts";
import { printProbability } from "../../../shared/tables/numbers.ts";
import {
  type AnyTest,
  decidingTest,
  hypothesisText,
  isMade,
  reasonsOf,
  testMeaning,
  testVerdict,
} from "../../../shared/tables/tests.ts";
import { VerdictWord } from "./verdict.tsx";

/** The test the verdict goes by, with its probability. */
function Deciding({ test, finding }: { test: AnyTest; finding: TestsFinding }) {
  const deciding = isMade(test) ? decidingTest(test, finding) : undefined;
  if (!deciding) return null;
  return (
    <span className="type-smallest block text-ink2">
      {deciding.by}, p {printProbability(deciding.p)}
    </span>
  );
}

/** What each test means, in words, and why what is missing is missing. */
export function Meanings({ finding }: { finding: TestsFinding }) {
  const id = useId();
  if (finding.tests.length === 0) return null;
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <h2 id={id} className="type-section mb-2">
        What it means
      </h2>
      <dl>
        {finding.tests.map((test, place) => (
          <div
            key={place}
            className="grid gap-x-6 gap-y-0.5 border-rule py-2 not-last:border-b min-[700px]:grid-cols-[13rem_8.5rem_minmax(0,1fr)]"
          >
            <dt className="type-table">{capital(hypothesisText(test))}</dt>
            <dd className="type-table">
              <VerdictWord {...testVerdict(test, finding)} />
              <Deciding test={test} finding={finding} />
            </dd>
            <dd className="type-table max-w-[62ch] text-pretty">
              {testMeaning(test, finding)}
              {isMade(test) &&
                reasonsOf(test).map((reason) => (
                  <span key={reason} className="type-small block text-ink2">
                    {reason}
                  </span>
                ))}
            </dd>
          </div>
        ))}
      </dl>
    </section>
  );
}
