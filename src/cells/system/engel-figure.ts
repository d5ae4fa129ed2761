import type { Annotation, Data } from "plotly.js-dist-min";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import type { PlotlyFigure, TokenColour } from "../../components/plotly-chart.tsx";

const SERIES = ["s1", "s2", "s3", "s4", "s5", "s6"];
/** Beyond six goods the colours come again, dashed. */
const DASHES = ["solid", "dash", "dot"] as const;
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
    colour: colour(SERIES[i % SERIES.length]),
    dash: DASHES[Math.floor(i / SERIES.length) % DASHES.length],
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

/** Numbers that begin with 1, 2 or 5, as many as lie between two totals. */
export function ticksBetween(low: number, high: number): number[] {
  const decades = Array.from(
    { length: Math.ceil(Math.log10(high)) - Math.floor(Math.log10(low)) + 1 },
    (_, i) => Math.floor(Math.log10(low)) + i,
  );
  const ticks = decades.flatMap((decade) => [1, 2, 5].map((digit) => Number(`${digit}e${decade}`)));
  return ticks.filter((tick) => tick >= low && tick <= high);
}

/** The values in their order, each moved up as little as keeps it `apart` from the one below. */
export function standApart(values: readonly number[], apart: number): number[] {
  const order = values.map((_, i) => i).sort((one, two) => values[one] - values[two]);
  const placed = [...values];
  order.forEach((i, rank) => {
    if (rank > 0) placed[i] = Math.max(placed[i], placed[order[rank - 1]] + apart);
  });
  return placed;
}
