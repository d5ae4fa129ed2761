import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import { curvatureNotes } from "../../../shared/tables/curvature-words.ts";
import { equationsNotes } from "../../../shared/tables/equations-sentence.ts";
import { fewRowsNotes } from "../../../shared/tables/few-rows.ts";
import { DECIMALS, printCount, printFixed } from "../../../shared/tables/numbers.ts";
import { countedRows } from "../../../shared/tables/phrases.ts";
import { standardErrorsNotes, standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";

/** What the parentheses are, by which estimator, whether it converged, and how well it fits. */
export function SystemNote({ finding }: { finding: SystemFinding }) {
  const { convergence, rows, weighted } = finding;
  const iterations = convergence.iterations === 1 ? "1 iteration" : `${printCount(convergence.iterations)} iterations`;
  const rSquared = finding.rSquared.map((value) => printFixed(value, DECIMALS.fit)).join(", ");
  return (
    <p className="type-small mt-2 text-ink2">
      Estimate over (standard error), {standardErrorsPhrase(finding)}; {countedRows(rows)}
      {weighted ? ", weighted" : ""}. {capital(finding.implicit?.method ?? finding.estimator)}, {iterations}, converged.{" "}
      {finding.aic === undefined ? "Log-likelihood at these estimates" : "Log-likelihood"}{" "}
      {printFixed(finding.logLikelihood, DECIMALS.statistic)}; <i className="font-serif">R</i>² by equation {rSquared}.
      Prices and expenditure in units of estimation.{" "}
      {[
        ...equationsNotes(finding),
        ...fewRowsNotes(finding),
        ...standardErrorsNotes(finding),
        ...curvatureNotes(finding),
      ].join(" ")}
    </p>
  );
}
