import type { Annotation, Shape } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { printQuantity } from "../../../../shared/tables/numbers.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import { bottomAxis, type Canvas, leftAxis, margin, topLeft } from "./canvas.ts";

/** How much of the weight pays which price; the median a line, the quartiles dotted ones. */
export function drawPrice(
  { good, edges, shares, quartiles }: DrawnOf<"price distribution">,
  canvas: Canvas,
): PlotlyFigure {
  const { colour } = canvas;
  const [first, middle, third] = quartiles;
  const upright = (at: number, dash: "solid" | "dot"): Partial<Shape> => ({
    type: "line",
    yref: "paper",
    x0: at,
    x1: at,
    y0: 0,
    y1: 1,
    line: { color: colour("ink"), width: 1.3, dash },
  });
  return {
    data: [
      {
        type: "bar",
        x: shares.map((_, bin) => (edges[bin] + edges[bin + 1]) / 2),
        y: shares.map((part) => 100 * part),
        width: shares.map((_, bin) => edges[bin + 1] - edges[bin]),
        marker: { color: colour("rule2"), line: { color: colour("recto"), width: 1 } },
        hovertemplate: "%{y:.2f} % of the weight around %{x:,.2f}<extra></extra>",
      },
    ],
    layout: {
      margin: margin(canvas, 20),
      bargap: 0,
      xaxis: bottomAxis(canvas, `Price of ${good}; the axis begins above 0`, {
        range: [edges[0], edges[edges.length - 1]],
      }),
      yaxis: leftAxis(canvas, { range: [0, 106 * Math.max(...shares)] }),
      shapes: [upright(first, "dot"), upright(middle, "solid"), upright(third, "dot")],
      annotations: [topLeft(canvas, "Per cent of the weight"), medianLabel(middle, canvas)],
    },
  };
}

function medianLabel(middle: number, { colour }: Canvas): Partial<Annotation> {
  return {
    text: `median ${printQuantity(middle, "money")}`,
    x: middle,
    y: 1,
    yref: "paper",
    xanchor: "left",
    yanchor: "bottom",
    yshift: 2,
    showarrow: false,
    font: { color: colour("ink"), size: 13 },
  };
}
