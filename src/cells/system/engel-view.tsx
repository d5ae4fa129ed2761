import { useCallback, useId } from "react";
import { capital } from "../../../shared/study/words.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { ChartNumbers } from "../../components/chart-numbers.tsx";
import { PlotlyChart, type TokenColour } from "../../components/plotly-chart.tsx";
import { type EngelCurves, engelFigure } from "./engel-figure.ts";

const HEIGHT = 380;

/** Engel curves of all goods, large enough to read, with their numbers as a table. */
export function EngelView({ finding }: { finding: EngelCurves & { readonly conditionalOn?: string } }) {
  const id = useId();
  const { engel, fitted } = finding;
  const figure = useCallback((colour: TokenColour) => engelFigure(finding, colour), [finding]);
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <h2 id={id} className="type-section">
        Engel curves
      </h2>
      <p className="type-small mb-2 text-ink2">
        Predicted shares against {finding.conditionalOn ?? "total"} expenditure in units of estimation, its 1st to 99th
        percentile; prices and demographics at the sample mean
      </p>
      <PlotlyChart
        label={`Predicted shares of ${fitted.goods.length} goods against total expenditure`}
        fileName="engel-curves"
        height={HEIGHT}
        figure={figure}
      />
      <ChartNumbers
        caption="Predicted shares against total expenditure"
        heads={[
          { key: "total", content: "Expenditure" },
          ...fitted.goods.map((name) => ({ key: name, content: capital(name) })),
        ]}
        lines={engel.logTotal.map((logTotal, t) => ({
          key: String(t),
          head: printFixed(Math.exp(logTotal), DECIMALS.elasticity),
          cells: engel.shares.map((shares) => printFixed(shares[t], DECIMALS.share)),
        }))}
      />
    </section>
  );
}
