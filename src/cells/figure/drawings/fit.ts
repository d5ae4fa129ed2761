import type { Data } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { capital } from "../../../../shared/study/words.ts";
import { seriesOf } from "../../../components/plot-series.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import {
  bottomAxis,
  type Canvas,
  endLabels,
  errorBars,
  leftAxis,
  literal,
  margin,
  symbolOf,
  topLeft,
} from "./canvas.ts";

/** Observed mean shares against predicted ones, bin by bin; on the diagonal they are alike. */
export function drawFit({ goods }: DrawnOf<"fit of shares">, canvas: Canvas, height: number): PlotlyFigure {
  const { colour } = canvas;
  const bins = goods.flatMap(({ bins: own }) => own);
  const top = 1.05 * Math.max(...bins.flatMap(({ predicted, observed }) => [predicted, observed.high]));
  const bottom = Math.min(0, ...bins.flatMap(({ predicted, observed }) => [predicted, observed.low]));
  const diagonal: Data = {
    type: "scatter",
    mode: "lines",
    x: [bottom, top],
    y: [bottom, top],
    line: { color: colour("ink2"), width: 1.3, dash: "dot" },
    hoverinfo: "skip",
  };
  const points = goods.map(({ good, bins: own }, i): Data => {
    const observed = {
      values: own.map(({ observed: { value } }) => value),
      errors: [],
      low: own.map(({ observed: { low } }) => low),
      high: own.map(({ observed: { high } }) => high),
    };
    return {
      type: "scatter",
      mode: "lines+markers",
      name: capital(good),
      x: own.map(({ predicted }) => predicted),
      y: observed.values,
      error_y: errorBars(observed, colour(seriesOf(i))),
      line: { color: colour(seriesOf(i)), width: 1 },
      marker: { color: colour(seriesOf(i)), size: 7, symbol: symbolOf(i) },
      hovertemplate: `${literal(capital(good))}: observed %{y:.4f}, predicted %{x:.4f}<extra></extra>`,
    };
  });
  return {
    data: [diagonal, ...points],
    layout: {
      margin: margin(canvas),
      xaxis: bottomAxis(canvas, "Predicted share, mean of the bin", { range: [bottom, top] }),
      yaxis: leftAxis(canvas, { range: [bottom, top] }),
      annotations: [topLeft(canvas, "Observed share"), ...names(goods, canvas, top, { span: top - bottom, height })],
    },
  };
}

/** Names in the margin, level with the last bin of each good. */
function names(
  goods: DrawnOf<"fit of shares">["goods"],
  canvas: Canvas,
  x: number,
  room: { span: number; height: number },
) {
  const labels = goods.map(({ good, bins }, i) => ({
    name: `${SIGNS[i % SIGNS.length]} ${capital(good)}`,
    y: bins[bins.length - 1].observed.value,
    colour: canvas.colour(seriesOf(i)),
  }));
  return endLabels(canvas, labels, { x, ...room });
}

/** The shapes of `symbolOf`, as letters. */
const SIGNS = ["●", "◇", "■", "△", "✚", "○"];
