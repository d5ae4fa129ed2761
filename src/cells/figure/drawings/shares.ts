import type { Data } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { capital } from "../../../../shared/study/words.ts";
import { dashOf, seriesOf } from "../../../components/plot-series.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import {
  type Canvas,
  endLabels,
  errorBars,
  leftAxis,
  literal,
  margin,
  rangeFrom0,
  symbolOf,
  topLeft,
} from "./canvas.ts";
import { groupAxis } from "./incidence.ts";

/** Observed mean shares of each group with intervals; of quantiles, which have an order, joined by lines. */
export function drawShares(
  { goods, groups, groupedBy }: DrawnOf<"shares by group">,
  canvas: Canvas,
  height: number,
): PlotlyFigure {
  const { colour } = canvas;
  const range = rangeFrom0(groups.flatMap(({ shares }) => [...shares.low, ...shares.high]));
  const data = goods.map((good, i): Data => {
    const of = (which: "values" | "errors" | "low" | "high") => groups.map(({ shares }) => shares[which][i]);
    const curve = { values: of("values"), errors: of("errors"), low: of("low"), high: of("high") };
    return {
      type: "scatter",
      mode: groupedBy.quantiles === undefined ? "markers" : "lines+markers",
      name: capital(good),
      x: groups.map((_, g) => g),
      y: curve.values,
      error_y: errorBars(curve, colour(seriesOf(i))),
      line: { color: colour(seriesOf(i)), width: 1.6, dash: dashOf(i) },
      marker: { color: colour(seriesOf(i)), size: 7, symbol: symbolOf(i) },
      text: groups.map(({ name }) => literal(name)),
      hovertemplate: `${literal(capital(good))}, %{text}: %{y:.4f}<extra></extra>`,
    };
  });
  const labels = goods.map((good, i) => ({
    name: capital(good),
    y: groups[groups.length - 1].shares.values[i],
    colour: colour(seriesOf(i)),
  }));
  return {
    data,
    layout: {
      margin: { ...margin(canvas), b: 64 },
      xaxis: groupAxis(canvas, groups, groupedBy.of),
      yaxis: leftAxis(canvas, { range }),
      annotations: [
        topLeft(canvas, "Mean share"),
        ...endLabels(canvas, labels, { x: groups.length - 0.5, span: range[1] - range[0], height }),
      ],
    },
  };
}
