import { useId } from "react";
import type { ChiSquareStatistic, TestsFinding } from "../../../shared/schemas/tests.ts";
import { capital } from "../../../shared/study/words.ts";
import { printCount, printProbability, printQuantity } from "../../../shared/tables/numbers.ts";
import { hypothesisText, isMade } from "../../../shared/tables/tests.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { Table } from "../../components/table.tsx";

/** A statistic over its probability. */
function Stacked({ value, p }: { value: string; p: string }) {
  return (
    <span className="inline-block text-right tabular-nums">
      <span className="block">{value}</span>
      <span className="block text-[0.78125rem]/[0.9375rem] text-ink2">p {p}</span>
    </span>
  );
}

function Statistic({ of }: { of: ChiSquareStatistic }) {
  if ("absent" in of) return "none";
  return <Stacked value={printQuantity(of.statistic, "fit")} p={printProbability(of.pValue)} />;
}

/** Every statistic of every hypothesis that was tested. */
export function StatisticsTable({ finding }: { finding: TestsFinding }) {
  const id = useId();
  const tests = finding.tests.filter(isMade);
  if (tests.length === 0) return null;
  const withLaitinen = tests.some(({ laitinen }) => laitinen && !("absent" in laitinen));
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <h2 id={id} className="type-section mb-2">
        All statistics
      </h2>
      <Table
        caption="Wald, likelihood ratio, score and their small-sample companions"
        heads={[
          { key: "hypothesis", content: "Hypothesis" },
          { key: "df", content: "d.f.", label: "degrees of freedom" },
          { key: "wald", content: "Wald" },
          { key: "lr", content: "LR" },
          { key: "lm", content: "LM" },
          { key: "corrected", content: "Corrected LR" },
          ...(withLaitinen
            ? [
                { key: "t2", content: "Laitinen’s T²" },
                { key: "f", content: "its F" },
              ]
            : []),
        ]}
        lines={tests.map((test, place) => {
          const { laitinen } = test;
          const name = capital(hypothesisText(test));
          const exact = laitinen && !("absent" in laitinen) ? laitinen : undefined;
          const f = exact && (
            <Stacked
              key="f"
              value={`F(${printCount(exact.numerator)}, ${printCount(exact.denominator)}) ${printQuantity(exact.f, "fit")}`}
              p={printProbability(exact.pValue)}
            />
          );
          return {
            key: String(place),
            head: (
              <>
                {name}
                <AnchorMark of={`row ${name}`} />
              </>
            ),
            cells: [
              printCount(test.degreesOfFreedom),
              <Statistic key="wald" of={test.wald} />,
              <Statistic key="lr" of={test.likelihoodRatio} />,
              <Statistic key="lm" of={test.score} />,
              <Statistic key="corrected" of={test.corrected} />,
              ...(withLaitinen ? [exact ? printQuantity(exact.tSquared, "fit") : "", f ?? ""] : []),
            ],
          };
        })}
      />
    </section>
  );
}
