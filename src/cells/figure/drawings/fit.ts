import type { Annotation, Data, Layout } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { capital } from "../../../../shared/study/words.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import { bottomAxis, type Canvas, errorBars, leftAxis, literal, MARGIN, panelHead } from "./canvas.ts";

type OfGood = DrawnOf<"fit of shares">["goods"][number];

/** How many panels stand side by side. */
export const fitColumns = (goods: number, narrow: boolean): number => Math.min(goods, narrow ? 2 : 3);

/** Between panels, in pixels, and how wide a picture is about. */
const GAP = { x: 52, y: 66 };
const WIDTH = { wide: 800, narrow: 330 };

/** Observed mean shares against predicted ones, bin by bin, a panel for each good; on its diagonal they are alike. */
export function drawFit({ goods }: DrawnOf<"fit of shares">, canvas: Canvas, height: number): PlotlyFigure {
  const columns = fitColumns(goods.length, canvas.narrow);
  const lines = Math.ceil(goods.length / columns);
  const layout: Record<string, unknown> = { margin: { l: MARGIN.left, r: 16, t: 34, b: MARGIN.bottom } };
  const heads: Partial<Annotation>[] = [];
  const data = goods.flatMap((one, i) => {
    const key = i === 0 ? "" : String(i + 1);
    const x = stretch(i % columns, columns, GAP.x / (canvas.narrow ? WIDTH.narrow : WIDTH.wide));
    const [down, up] = stretch(Math.floor(i / columns), lines, GAP.y / (height - 34 - MARGIN.bottom));
    const y = [1 - up, 1 - down] as [number, number];
    const range = rangeOf(one);
    const isLast = i + columns >= goods.length;
    layout[`xaxis${key}`] = bottomAxis(canvas, isLast ? "Predicted" : "", {
      domain: x,
      anchor: `y${key}` as "y",
      range,
      nticks: 4,
    });
    layout[`yaxis${key}`] = leftAxis(canvas, { domain: y, anchor: `x${key}` as "x", range });
    heads.push(panelHead(canvas, capital(one.good), x[0], y[1]));
    return panel(one, range, key, canvas);
  });
  return { data, layout: { ...(layout as Partial<Layout>), annotations: heads } };
}

/** The place-th of so many stretches of the unit, with gaps between. */
function stretch(place: number, of: number, gap: number): [number, number] {
  const size = (1 - (of - 1) * gap) / of;
  return [place * (size + gap), place * (size + gap) + size];
}

/** One range for both axes, so that the diagonal is one. */
function rangeOf({ bins }: OfGood): [number, number] {
  const all = bins.flatMap(({ predicted, observed }) => [predicted, observed.low, observed.high]);
  const [low, high] = [Math.min(...all), Math.max(...all)];
  const room = 0.08 * (high - low) || 0.01;
  return [low - room, high + room];
}

function panel({ good, bins }: OfGood, range: readonly number[], key: string, { colour }: Canvas): Data[] {
  const axes = { xaxis: `x${key}`, yaxis: `y${key}` };
  const observed = {
    values: bins.map(({ observed: { value } }) => value),
    errors: bins.map(({ observed: { error } }) => error),
    low: bins.map(({ observed: { low } }) => low),
    high: bins.map(({ observed: { high } }) => high),
  };
  return [
    {
      type: "scatter",
      mode: "lines",
      x: [...range],
      y: [...range],
      line: { color: colour("ink2"), width: 1.3, dash: "dot" },
      hoverinfo: "skip",
      ...axes,
    },
    {
      type: "scatter",
      mode: "markers",
      name: capital(good),
      x: bins.map(({ predicted }) => predicted),
      y: observed.values,
      error_y: errorBars(observed, colour("ink")),
      marker: { color: colour("ink"), size: 7 },
      hovertemplate: `${literal(capital(good))}: observed %{y:.4f}, predicted %{x:.4f}<extra></extra>`,
      ...axes,
    },
  ];
}
