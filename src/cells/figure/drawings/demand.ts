import type { Annotation, Data } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { printQuantity } from "../../../../shared/tables/numbers.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import { band, bottomAxis, type Canvas, endLabels, leftAxis, margin, rangeFrom0, topLeft } from "./canvas.ts";

/** Both demand curves of a good through the point, the compensated one dashed. */
export function drawDemand(drawn: DrawnOf<"demand curve">, canvas: Canvas, height: number): PlotlyFigure {
  const { good, prices, uncompensated, compensated, here } = drawn;
  const { colour } = canvas;
  const last = prices[prices.length - 1];
  const curves = [
    { name: "uncompensated", of: uncompensated, line: { color: colour("s1"), width: 2.2 } },
    ...(compensated
      ? [{ name: "compensated", of: compensated, line: { color: colour("s2"), width: 2.2, dash: "6px,4px" } }]
      : []),
  ];
  const range = rangeFrom0(curves.flatMap(({ of }) => [...of.low, ...of.high]));
  const lines = curves.map(
    ({ name, of, line }): Data => ({
      type: "scatter",
      mode: "lines",
      name,
      x: prices,
      y: of.values,
      line: line as { color: string; width: number },
      hovertemplate: `${name}: %{y:,.3f} at %{x:,.2f}<extra></extra>`,
    }),
  );
  const labels = curves.map(({ name, of, line }) => ({ name, y: of.values[of.values.length - 1], colour: line.color }));
  return {
    data: [
      band(prices, uncompensated, { fillcolor: colour("accent-wash") }),
      // Hatched, so that one band is seen through the other.
      ...(compensated
        ? [
            band(prices, compensated, {
              fillcolor: "transparent",
              fillpattern: { shape: "/", fgcolor: colour("rule2"), bgcolor: "transparent", size: 7, solidity: 0.12 },
            } as Partial<Data>),
          ]
        : []),
      ...lines,
      {
        type: "scatter",
        mode: "markers",
        x: [here.price],
        y: [here.quantity],
        marker: { color: colour("ink"), size: 9 },
        hovertemplate: "the point: %{y:,.3f} at %{x:,.2f}<extra></extra>",
      },
    ],
    layout: {
      margin: margin(canvas, canvas.narrow ? 104 : 126),
      xaxis: bottomAxis(canvas, `Price of ${good}; the axis begins above 0`, { range: [prices[0], last] }),
      yaxis: leftAxis(canvas, { range }),
      annotations: [
        topLeft(canvas, "Quantity"),
        ...endLabels(canvas, labels, { x: last, span: range[1] - range[0], height }),
        pointLabel(here, colour("ink")),
      ],
    },
  };
}

function pointLabel({ price, quantity }: DrawnOf<"demand curve">["here"], color: string): Partial<Annotation> {
  return {
    text: `${printQuantity(quantity, "money")} at ${printQuantity(price, "money")}`,
    x: price,
    y: quantity,
    xanchor: "left",
    yanchor: "bottom",
    xshift: 6,
    yshift: 4,
    showarrow: false,
    font: { color, size: 13 },
  };
}
