import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { capital } from "../../../../shared/study/words.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import { bottomAxis, type Canvas, errorBars, leftAxis, literal, margin, rangeFrom0, topLeft } from "./canvas.ts";

/** What each group loses of its expenditure, with its interval, and all together as a line. */
export function drawIncidence({ groups, all, groupedBy }: DrawnOf<"incidence">, canvas: Canvas): PlotlyFigure {
  const { colour } = canvas;
  const inPercent = (of: "value" | "error" | "low" | "high") => groups.map(({ share }) => 100 * share[of]);
  const curve = {
    values: inPercent("value"),
    errors: inPercent("error"),
    low: inPercent("low"),
    high: inPercent("high"),
  };
  const whole = 100 * all.share.value;
  return {
    data: [
      {
        type: "scatter",
        mode: "markers",
        x: groups.map((_, i) => i),
        y: curve.values,
        error_y: errorBars(curve, colour("ink")),
        marker: { color: colour("ink"), size: 9 },
        text: groups.map(({ name }) => literal(capital(name))),
        hovertemplate: "%{text}: %{y:.2f} %<extra></extra>",
      },
    ],
    layout: {
      margin: { ...margin(canvas, canvas.narrow ? 60 : 90), b: 64 },
      xaxis: groupAxis(canvas, groups, groupedBy?.of),
      yaxis: leftAxis(canvas, { range: rangeFrom0([...curve.low, ...curve.high, whole]) }),
      shapes: [
        {
          type: "line",
          xref: "paper",
          x0: 0,
          x1: 1,
          y0: whole,
          y1: whole,
          layer: "below",
          line: { color: colour("ink2"), width: 1.3, dash: "dot" },
        },
      ],
      annotations: [
        topLeft(canvas, "Loss, per cent of expenditure"),
        {
          text: "all rows",
          xref: "paper",
          x: 1,
          y: whole,
          xanchor: "left",
          xshift: 6,
          showarrow: false,
          font: { color: colour("ink2"), size: 13 },
        },
      ],
    },
  };
}

/** Groups in their order, their names on two lines. */
export function groupAxis(
  canvas: Canvas,
  groups: readonly { readonly name: string }[],
  of: string | undefined,
): ReturnType<typeof bottomAxis> {
  const crowded = groups.length > (canvas.narrow ? 5 : 10);
  return bottomAxis(canvas, of === undefined ? "" : capital(of), {
    range: [-0.5, groups.length - 0.5],
    tickvals: groups.map((_, i) => i).filter((i) => !crowded || i === 0 || i === groups.length - 1),
    ticktext: groups
      .filter((_, i) => !crowded || i === 0 || i === groups.length - 1)
      .map(({ name }) => literal(name).replace(" ", "<br>")),
  });
}
