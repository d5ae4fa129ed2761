import type { Annotation, Data, Layout, Shape } from "plotly.js-dist-min";
import type { DrawnOf } from "../../../../shared/schemas/figure.ts";
import { capital } from "../../../../shared/study/words.ts";
import type { PlotlyFigure } from "../../../components/plotly-chart.tsx";
import { bottomAxis, type Canvas, errorBars, literal, panelHead } from "./canvas.ts";

type Drawn = DrawnOf<"elasticities">;

/** The three kinds, with the value that divides goods and what they are on its either side. */
const PANELS = [
  { of: "expenditure", title: "Expenditure", bound: 1 },
  { of: "own", title: "Own price", bound: -1 },
  { of: "ownCompensated", title: "Own price, compensated", bound: -1 },
] as const;
type Panel = (typeof PANELS)[number];

/** Between panels side by side, as a part of the picture; one below the other, in pixels. */
const GAP = { wide: 0.045, narrow: 76 };
const AROUND = { l: 112, r: 12, t: 34, b: 44 };

/** Estimates with their intervals, good by good in three panels; groups of rows from top to bottom in their order. */
export function drawElasticities(drawn: Drawn, canvas: Canvas, height: number): PlotlyFigure {
  const { goods, groups } = drawn;
  const layout: Record<string, unknown> = {
    margin: AROUND,
    annotations: [],
    shapes: [],
  };
  const data: Data[] = [];
  PANELS.forEach((panel, place) => {
    const key = place === 0 ? "" : String(place + 1);
    const { x, y } = domainOf(place, canvas.narrow ? height : undefined);
    layout[`xaxis${key}`] = bottomAxis(canvas, "", {
      domain: x,
      anchor: `y${key}` as "y",
      nticks: canvas.narrow ? 7 : 5,
    });
    layout[`yaxis${key}`] = goodsAxis(goods, canvas, {
      domain: y,
      anchor: `x${key}`,
      named: place === 0 || canvas.narrow,
    });
    (layout.annotations as Partial<Annotation>[]).push(panelHead(canvas, panel.title, x[0], y[1]));
    (layout.shapes as Partial<Shape>[]).push(...bounds(panel, drawn, key, canvas));
    data.push(...groups.map((_, g) => marks(panel, drawn, g, key, canvas)));
  });
  return { data, layout: layout as Partial<Layout> };
}

/** Side by side, or one below the other in a picture so high. */
function domainOf(place: number, height: number | undefined): { x: [number, number]; y: [number, number] } {
  const gap = height === undefined ? GAP.wide : GAP.narrow / (height - AROUND.t - AROUND.b);
  const size = (1 - 2 * gap) / 3;
  const from = place * (size + gap);
  if (height === undefined) return { x: [from, from + size], y: [0, 1] };
  // From the top down.
  return { x: [0, 1], y: [Math.max(0, 1 - from - size), 1 - from] };
}

function goodsAxis(
  goods: Drawn["goods"],
  { colour, narrow }: Canvas,
  { domain, anchor, named }: { domain: [number, number]; anchor: string; named: boolean },
) {
  return {
    domain,
    anchor,
    range: [goods.length - 0.5, -0.5],
    tickvals: goods.map((_, i) => i),
    ticktext: goods.map((good) => literal(capital(good))),
    showticklabels: named,
    showgrid: false,
    zeroline: false,
    fixedrange: true,
    ticks: "",
    tickfont: { size: narrow ? 12 : 13, color: colour("ink") },
  };
}

/** Upright lines at nought and at the bound, where the panel reaches them. */
function bounds({ of, bound }: Panel, { groups }: Drawn, key: string, { colour }: Canvas): Partial<Shape>[] {
  const all = groups.flatMap((group) => [...group[of].low, ...group[of].high]);
  const [low, high] = [Math.min(...all), Math.max(...all)];
  return [0, bound]
    .filter((at) => at >= low && at <= high)
    .map((at) => ({
      type: "line" as const,
      xref: `x${key}` as "x",
      yref: `y${key} domain` as "y",
      x0: at,
      x1: at,
      y0: 0,
      y1: 1,
      layer: "below" as const,
      line: { color: colour(at === 0 ? "rule2" : "ink"), width: at === 0 ? 1 : 1.3, dash: at === 0 ? "solid" : "dot" },
    }));
}

/** One group's marks: the first filled, the last a square, those between open. */
function marks({ of, title }: Panel, { goods, groups }: Drawn, g: number, key: string, { colour }: Canvas): Data {
  const { name, [of]: estimates } = groups[g];
  const step = 0.7 / groups.length;
  const offset = (g - (groups.length - 1) / 2) * step;
  const isLast = g > 0 && g === groups.length - 1;
  const about = groups.length > 1 ? `, ${literal(name)}` : "";
  return {
    type: "scatter",
    mode: "markers",
    name,
    x: estimates.values,
    y: goods.map((_, i) => i + offset),
    text: goods.map((good) => literal(capital(good))),
    error_x: errorBars(estimates, colour("ink")),
    marker: {
      color: colour("ink"),
      size: isLast ? 7 : 8,
      symbol: isLast ? "square" : g === 0 ? "circle" : "circle-open",
    },
    xaxis: `x${key}`,
    yaxis: `y${key}`,
    hovertemplate: `%{text}${about}, ${title.toLowerCase()}: %{x:.3f}<extra></extra>`,
  };
}
