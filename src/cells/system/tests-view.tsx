import { useId } from "react";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import { DECIMALS, printCount, printFixed, printProbability } from "../../../shared/tables/numbers.ts";
import { LIKELIHOOD_RATIOS_ASSUME } from "../../../shared/tables/standard-errors.ts";
import { decides, isRejected } from "../../../shared/tables/verdicts.ts";
import { Table } from "../../components/table.tsx";

type Test = SystemFinding["tests"][number];

const statistic = (value: number) => printFixed(value, DECIMALS.statistic);

/** What a test of a restriction says: the same as its verdict. */
function meaning(test: Test): string {
  if (!decides(test)) return "no verdict: it assumes conventional errors";
  return isRejected(test) ? "rejected at 5 per cent" : "not rejected at 5 per cent";
}

function exactInWords(test: Test): string {
  const { exact } = test;
  if (!exact) return "none";
  const approximate = exact.approximate ? ", approximate here" : "";
  return `F(${printCount(exact.numerator)}, ${printCount(exact.denominator)}) ${printFixed(exact.f, DECIMALS.fit)}, p ${printProbability(exact.pValue)}${approximate}`;
}

/** Tests of the restrictions of theory, asymptotic and corrected for small samples. */
export function TestsView({
  tests,
  untested = [],
  standardErrors,
}: Pick<SystemFinding, "tests" | "untested" | "standardErrors">) {
  const id = useId();
  const hasQuadratic = tests.some(({ restriction }) => restriction === "quadratic terms zero");
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <h2 id={id} className="type-section mb-2">
        Tests of the theory
      </h2>
      {tests.length === 0 && untested.length === 0 && (
        <p className="type-small text-ink2">The functional form leaves no restriction to test.</p>
      )}
      {tests.length > 0 && (
        <>
          <Table
            caption={`Likelihood-ratio tests of ${hasQuadratic ? "homogeneity, symmetry and quadratic terms" : "homogeneity and symmetry"}`}
            heads={[
              { key: "restriction", content: "Restriction" },
              { key: "lr", content: "LR" },
              { key: "df", content: "Degrees of freedom" },
              { key: "p", content: "p" },
              { key: "corrected", content: "Corrected LR" },
              { key: "cp", content: "p" },
              { key: "exact", content: "Laitinen’s test" },
              { key: "means", content: "So it is", align: "left" },
            ]}
            lines={tests.map((test) => ({
              key: test.restriction,
              head: capital(test.restriction),
              cells: [
                statistic(test.statistic),
                printCount(test.degreesOfFreedom),
                printProbability(test.pValue),
                statistic(test.corrected.statistic),
                printProbability(test.corrected.pValue),
                exactInWords(test),
                meaning(test),
              ],
            }))}
          />
          <p className="type-small mt-2 text-ink2">
            LR against χ²; the corrected ratio is Italianer’s (1985), since asymptotic tests reject too often in small
            samples. Laitinen’s (1978) is exact for homogeneity where the price index holds no current shares.
            {standardErrors !== "conventional" && ` ${LIKELIHOOD_RATIOS_ASSUME}`}
          </p>
        </>
      )}
      {untested.map(({ restriction, reason }) => (
        <p key={restriction} className="type-small mt-2 max-w-[62ch] text-ink2">
          {capital(restriction)} is not tested. {reason}
        </p>
      ))}
    </section>
  );
}
