import type { Annotation, Data } from "plotly.js-dist-min";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import { dashOf, seriesOf, standApart, ticksBetween } from "../../components/plot-series.ts";
import type { PlotlyFigure, TokenColour } from "../../components/plotly-chart.tsx";

/** Labels at the lines' ends stand at least this part of the axis apart. */
const APART = 0.062;

export type EngelCurves = Pick<SystemFinding, "engel"> & { readonly fitted: Pick<SystemFinding["fitted"], "goods"> };

/** Predicted shares against total expenditure: one line a good, its name at the line's end, no legend. */
export function engelFigure({ engel, fitted }: EngelCurves, colour: TokenColour): PlotlyFigure {
  const totals = engel.logTotal.map(Math.exp);
  const last = totals[totals.length - 1];
  const lines = fitted.goods.map((name, i) => ({
    name: capital(name),
    shares: engel.shares[i],
    colour: colour(seriesOf(i)),
    dash: dashOf(i),
  }));
  const highest = Math.max(0, ...lines.flatMap(({ shares }) => shares)) * 1.08;
  const lowest = Math.min(0, ...lines.flatMap(({ shares }) => shares)) * 1.08;
  const places = standApart(
    lines.map(({ shares }) => shares[shares.length - 1]),
    APART * (highest - lowest),
  );
  const data: Data[] = lines.map(({ name, shares, colour: color, dash }) => ({
    type: "scatter",
    mode: "lines",
    name,
    x: totals,
    y: shares,
    line: { color, width: 2.2, dash },
    hovertemplate: `${name}: %{y:.4f} at %{x:.3f}<extra></extra>`,
  }));
  const annotations: Partial<Annotation>[] = lines.map(({ name, colour: color }, i) => ({
    text: name,
    // On a logarithmic axis an annotation is placed by the logarithm.
    x: Math.log10(last),
    y: places[i],
    xanchor: "left",
    xshift: 8,
    showarrow: false,
    font: { color, size: 13 },
  }));
  const axis = {
    zeroline: false,
    ticks: "outside",
    tickcolor: colour("rule2"),
    linecolor: colour("ink"),
    fixedrange: true,
  };
  return {
    data,
    layout: {
      margin: { l: 48, r: 118, t: 12, b: 52 },
      xaxis: {
        ...axis,
        ticks: "outside",
        type: "log",
        range: [Math.log10(totals[0]), Math.log10(last)],
        tickvals: ticksBetween(totals[0], last),
        showgrid: false,
        showline: true,
        title: { text: "Total expenditure, logarithmic scale", font: { size: 13 } },
      },
      yaxis: { ...axis, ticks: "outside", range: [lowest, highest], nticks: 4, gridcolor: colour("rule") },
      annotations,
    },
  };
}
