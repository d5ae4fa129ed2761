import type { Data } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { capital } from "../../../../shared/study/words.ts";
import { dashOf, seriesOf, ticksBetween } from "../../../components/plot-series.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import { band, bottomAxis, type Canvas, endLabels, leftAxis, literal, margin, rangeFrom0, topLeft } from "./canvas.ts";

/** Predicted shares against the logarithm of expenditure, each good's interval a band below its line. */
export function drawEngel({ totals, curves }: DrawnOf<"engel curves">, canvas: Canvas, height: number): PlotlyFigure {
  const { colour } = canvas;
  const last = totals[totals.length - 1];
  const range = rangeFrom0(curves.flatMap(({ low, high }) => [...low, ...high]));
  const bands = curves.map((curve) => band(totals, curve, { fillcolor: colour("accent-wash") }));
  const lines = curves.map(
    ({ good, values, low, high }, i): Data => ({
      type: "scatter",
      mode: "lines",
      name: capital(good),
      x: totals,
      y: values,
      customdata: low.map((end, t) => [end, high[t]]),
      line: { color: colour(seriesOf(i)), width: 2.2, dash: dashOf(i) },
      hovertemplate: `${literal(capital(good))}: %{y:.4f} (%{customdata[0]:.4f} to %{customdata[1]:.4f}) at %{x:,.2f}<extra></extra>`,
    }),
  );
  const labels = curves.map(({ good, values }, i) => ({
    name: capital(good),
    y: values[values.length - 1],
    colour: colour(seriesOf(i)),
  }));
  return {
    data: [...bands, ...lines],
    layout: {
      margin: margin(canvas),
      xaxis: logAxis(canvas, totals),
      yaxis: leftAxis(canvas, { range }),
      annotations: [
        topLeft(canvas, "Predicted share"),
        // On a logarithmic axis an annotation is placed by the logarithm.
        ...endLabels(canvas, labels, { x: Math.log10(last), span: range[1] - range[0], height }),
      ],
    },
  };
}

/** Total expenditure, marked at numbers that begin with 1, 2 or 5. */
export function logAxis(canvas: Canvas, totals: readonly number[]) {
  const last = totals[totals.length - 1];
  return bottomAxis(canvas, "Total expenditure, logarithmic scale", {
    type: "log",
    range: [Math.log10(totals[0]), Math.log10(last)],
    tickvals: ticksBetween(totals[0], last, canvas.narrow ? 2 : 4),
    tickformat: ",",
  });
}
