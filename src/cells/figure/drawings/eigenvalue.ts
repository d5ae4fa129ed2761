import type { Data } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import { band, type Canvas, leftAxis, margin, topLeft } from "./canvas.ts";
import { logAxis } from "./engel.ts";

/** The largest eigenvalue against expenditure; above nought, where negativity breaks, the ground is hatched. */
export function drawEigenvalue({ totals, eigenvalue }: DrawnOf<"largest eigenvalue">, canvas: Canvas): PlotlyFigure {
  const { colour } = canvas;
  const last = totals[totals.length - 1];
  const lowest = Math.min(0, ...eigenvalue.low);
  const highest = Math.max(...eigenvalue.high);
  // Some of the ground above nought is always to be seen.
  const top = Math.max(highest * 1.08, 0.18 * (highest - lowest));
  const bottom = lowest * 1.08;
  const broken: Data = {
    type: "scatter",
    mode: "lines",
    x: [totals[0], last, last, totals[0]],
    y: [0, 0, top, top],
    fill: "toself",
    fillpattern: { shape: "/", fgcolor: colour("rule2"), bgcolor: colour("recto"), size: 8, solidity: 0.12 },
    line: { width: 0 },
    hoverinfo: "skip",
  } as Data;
  return {
    data: [
      broken,
      band(totals, eigenvalue, { fillcolor: colour("accent-wash") }),
      {
        type: "scatter",
        mode: "lines",
        x: [totals[0], last],
        y: [0, 0],
        line: { color: colour("ink"), width: 1.3 },
        hoverinfo: "skip",
      },
      {
        type: "scatter",
        mode: "lines",
        x: totals,
        y: eigenvalue.values,
        line: { color: colour("s1"), width: 2.2 },
        hovertemplate: "%{y:.4f} at %{x:,.2f}<extra></extra>",
      },
    ],
    layout: {
      margin: margin(canvas, 20),
      xaxis: logAxis(canvas, totals),
      yaxis: leftAxis(canvas, { range: [bottom, top] }),
      annotations: [
        topLeft(canvas, "Largest eigenvalue, share form"),
        {
          text: "negativity breaks up here",
          x: Math.log10(last),
          y: top,
          xanchor: "right",
          yanchor: "top",
          xshift: -4,
          yshift: -4,
          showarrow: false,
          bgcolor: colour("recto"),
          font: { color: colour("ink2"), size: 13 },
        },
      ],
    },
  };
}
