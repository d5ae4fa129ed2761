import type { ReactNode } from "react";
import { useId } from "react";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import { conditionally } from "../../../shared/tables/conditional.ts";
import { curvatureFact } from "../../../shared/tables/curvature-words.ts";
import { DECIMALS, printCount, printFixed, printSize } from "../../../shared/tables/numbers.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";
import { Estimate, Printed } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";

function Fact({ label, children }: { label: string; children: ReactNode }) {
  return (
    <div className="flex justify-between gap-4 py-0.5">
      <dt className="text-ink2">{label}</dt>
      <dd className="tabular-nums">{children}</dd>
    </div>
  );
}

/** Fit and convergence, and what the coefficients say of each good at the point of the checks. */
export function FitView({ finding }: { finding: SystemFinding }) {
  const [goodsId, fitId] = [useId(), useId()];
  const { convergence, durbinWatson, fitted } = finding;
  const number = (value: number) => printFixed(value, DECIMALS.statistic);
  return (
    <div className="grid gap-x-14 gap-y-6 border-line border-t pt-4 min-[1100px]:grid-cols-2">
      <section aria-labelledby={goodsId}>
        <h2 id={goodsId} className="type-section mb-2">
          By good
          {conditionally(finding)}
        </h2>
        <Table
          caption={`Expenditure elasticity at ${withArticle(finding.checks.pointName)}${conditionally(finding)}; fit of the equation`}
          heads={[
            { key: "good", content: "Good" },
            { key: "eta", content: "Expenditure elasticity" },
            { key: "r", content: "R²" },
            ...(durbinWatson ? [{ key: "dw", content: "Durbin–Watson" }] : []),
          ]}
          lines={fitted.goods.map((good, i) => {
            const elasticity = finding.expenditureElasticities[i];
            return {
              key: good,
              head: capital(good),
              cells: [
                <Estimate
                  key="eta"
                  value={printFixed(elasticity.estimate, DECIMALS.elasticity)}
                  error={printFixed(elasticity.standardError, DECIMALS.elasticity)}
                />,
                printFixed(finding.rSquared[i], DECIMALS.fit),
                ...(durbinWatson ? [printFixed(durbinWatson[i], DECIMALS.fit)] : []),
              ],
            };
          })}
        />
      </section>
      <section aria-labelledby={fitId}>
        <h2 id={fitId} className="type-section mb-2">
          Fit and convergence
        </h2>
        <dl className="type-table">
          <Fact label={finding.aic === undefined ? "Log-likelihood at these estimates" : "Log-likelihood"}>
            {number(finding.logLikelihood)}
          </Fact>
          {finding.aic !== undefined && finding.bic !== undefined && (
            <Fact label="AIC, BIC">
              {number(finding.aic)}, {number(finding.bic)}
            </Fact>
          )}
          {finding.implicit && (
            <Fact label="Real expenditure y">
              {finding.implicit.realExpenditure === "exact" ? "implicit utility" : "by mean shares"}
            </Fact>
          )}
          <Fact label="System R², McElroy">{printFixed(finding.systemRSquared, DECIMALS.fit)}</Fact>
          <Fact label="Free coefficients">{printCount(finding.freeCoefficients)}</Fact>
          <Fact label="Rows">{printCount(finding.rows)}</Fact>
          {finding.effectiveRows !== undefined && (
            <Fact label="Rows of one weight that tell as much">{printFixed(finding.effectiveRows, 0)}</Fact>
          )}
          <Fact label="Standard errors">{capital(standardErrorsPhrase(finding))}</Fact>
          {finding.curvature && <Fact label="Negativity imposed">{capital(curvatureFact(finding.curvature))}</Fact>}
          <Fact label="Equation dropped">{finding.dropped}</Fact>
          <Fact label="Iterations">{printCount(convergence.iterations)}</Fact>
          <Fact label="Gradient">
            <Printed text={printSize(convergence.gradient)} />
          </Fact>
          <Fact label="Largest step">
            <Printed text={printSize(convergence.largestStep)} />
          </Fact>
          <Fact label="Condition number">{printSize(convergence.condition)}</Fact>
        </dl>
      </section>
    </div>
  );
}
