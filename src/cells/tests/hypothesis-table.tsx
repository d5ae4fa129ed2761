import type { TestsFinding } from "../../../shared/schemas/tests.ts";
import { capital } from "../../../shared/study/words.ts";
import { printCount, printProbability, printQuantity } from "../../../shared/tables/numbers.ts";
import {
  type AnyTest,
  hypothesisText,
  isMade,
  isRobust,
  laitinenText,
  levelText,
  testVerdict,
} from "../../../shared/tables/tests.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { Table } from "../../components/table.tsx";
import { usePhone } from "../../components/use-media.ts";
import { VerdictWord } from "./verdict.tsx";

/** The small-sample companion: Laitinen's F, else the corrected likelihood ratio. */
function companion(test: AnyTest): string {
  if (!isMade(test)) return "";
  const exact = laitinenText(test);
  if (exact) return exact;
  if ("absent" in test.corrected) return "none";
  const { statistic, pValue } = test.corrected;
  return `LR ${printQuantity(statistic, "statistic")}, p ${printProbability(pValue)}`;
}

/** Each hypothesis with its main statistic, its small-sample companion and what follows. */
export function HypothesisTable({ finding }: { finding: TestsFinding }) {
  const phone = usePhone();
  // Wald's leads where it alone is valid, and where it alone was made.
  const robust = isRobust(finding) || finding.tests.filter(isMade).every((test) => "absent" in test.likelihoodRatio);
  // What there is nothing to test of is left to the note.
  const told = finding.tests.filter((test) => isMade(test) || test.because !== "nothing to test");
  const verdict = (test: AnyTest) => <VerdictWord {...testVerdict(test, finding)} />;
  return (
    <Table
      caption="Hypotheses and their tests"
      heads={[
        { key: "hypothesis", content: "Hypothesis" },
        { key: "statistic", content: robust ? "Wald" : "LR" },
        { key: "df", content: "d.f.", label: "degrees of freedom" },
        { key: "p", content: "p" },
        ...(robust ? [] : [{ key: "companion", content: "In small samples" }]),
        ...(phone ? [] : [{ key: "verdict", content: `At ${levelText(finding.level)}`, align: "left" as const }]),
      ]}
      lines={told.map((test, place) => {
        const main = isMade(test) ? (robust ? test.wald : test.likelihoodRatio) : undefined;
        const number = main && !("absent" in main) ? main : undefined;
        const name = capital(hypothesisText(test));
        return {
          key: String(place),
          head: (
            <>
              <span className={phone ? "block" : undefined}>
                {name}
                <AnchorMark of={`row ${name}`} />
              </span>
              {phone && verdict(test)}
            </>
          ),
          cells: [
            number ? printQuantity(number.statistic, "statistic") : "",
            isMade(test) ? printCount(test.degreesOfFreedom) : "",
            number ? printProbability(number.pValue) : "",
            ...(robust ? [] : [companion(test)]),
            ...(phone ? [] : [verdict(test)]),
          ],
        };
      })}
    />
  );
}
