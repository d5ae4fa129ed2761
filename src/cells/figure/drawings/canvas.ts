import type { Annotation, Data, LayoutAxis } from "plotly.js-dist-min";
import type { Curve } from "../../../../shared/economics/curves/curve.ts";
import { standApart } from "../../../components/plot-series.ts";
import type { TokenColour } from "../../../components/plotly-chart.tsx";

/** What a drawing is made on: the palette of the page or of paper, and whether there is little room. */
export interface Canvas {
  readonly colour: TokenColour;
  readonly narrow: boolean;
}

type Axis = Partial<LayoutAxis>;

/** Signs of Plotly's own markup, as the letters they are in a name. */
export const literal = (name: string): string => name.replaceAll("&", "&amp;").replaceAll("<", "&lt;");

export const MARGIN = { left: 54, top: 30, bottom: 52, right: { wide: 126, narrow: 92 } } as const;

export function margin({ narrow }: Canvas, right: number = narrow ? MARGIN.right.narrow : MARGIN.right.wide) {
  return { l: MARGIN.left, r: right, t: MARGIN.top, b: MARGIN.bottom };
}

/** Ticks outside, no frame and nothing to drag: an axis has only what is said of it. */
function bareAxis({ colour, narrow }: Canvas): Axis {
  return {
    zeroline: false,
    ticks: "outside",
    tickcolor: colour("rule2"),
    linecolor: colour("ink"),
    fixedrange: true,
    nticks: narrow ? 5 : 8,
    tickfont: { size: narrow ? 12 : 13 },
  };
}

/** The axis below: a line, ticks and what it measures. */
export function bottomAxis(canvas: Canvas, title: string, own: Axis = {}): Axis {
  return {
    ...bareAxis(canvas),
    showgrid: false,
    showline: true,
    title: { text: literal(title), font: { size: 13 }, standoff: 10 },
    ...own,
  };
}

/** The axis at the left: three hairlines; what it measures stands above it, upright (`topLeft`). */
export function leftAxis(canvas: Canvas, own: Axis = {}): Axis {
  return { ...bareAxis(canvas), nticks: 4, gridcolor: canvas.colour("rule"), showgrid: true, ...own };
}

/** What the left axis measures, above it. */
export function topLeft({ colour }: Canvas, text: string): Partial<Annotation> {
  return {
    text: literal(text),
    xref: "paper",
    yref: "paper",
    x: 0,
    y: 1,
    xanchor: "left",
    yanchor: "bottom",
    xshift: -MARGIN.left + 6,
    yshift: 8,
    showarrow: false,
    font: { size: 13, color: colour("ink2") },
  };
}

/** What a panel shows, above its upper left corner. */
export function panelHead({ colour }: Canvas, title: string, x: number, y: number): Partial<Annotation> {
  return {
    text: literal(title),
    xref: "paper",
    yref: "paper",
    x,
    y,
    xanchor: "left",
    yanchor: "bottom",
    yshift: 8,
    showarrow: false,
    font: { size: 13, color: colour("ink") },
  };
}

/** A name at the end of each line, moved up as little as keeps them apart. */
export function endLabels(
  { narrow }: Canvas,
  labels: readonly { readonly name: string; readonly y: number; readonly colour: string }[],
  { x, span, height }: { readonly x: number; readonly span: number; readonly height: number },
): Partial<Annotation>[] {
  const apart = (span * 17) / (height - MARGIN.top - MARGIN.bottom);
  const places = standApart(
    labels.map(({ y }) => y),
    apart,
  );
  return labels.map(({ name, colour }, i) => ({
    text: literal(narrow && name.length > 13 ? `${name.slice(0, 12)}…` : name),
    x,
    y: places[i],
    xanchor: "left",
    xshift: 9,
    showarrow: false,
    font: { color: colour, size: narrow ? 12 : 13 },
  }));
}

/** The stretch between the ends of the intervals; it lies below every line. */
export function band(x: readonly number[], { low, high }: Curve, fill: Partial<Data>): Data {
  return {
    type: "scatter",
    mode: "lines",
    x: [...x, ...x.toReversed()],
    y: [...low, ...high.toReversed()],
    fill: "toself",
    line: { width: 0 },
    hoverinfo: "skip",
    ...fill,
  } as Data;
}

/** Bars of 1.4 pixels with ends of eight. */
export function errorBars({ values, low, high }: Curve, color: string) {
  return {
    type: "data" as const,
    symmetric: false,
    array: high.map((end, i) => end - values[i]),
    arrayminus: low.map((end, i) => values[i] - end),
    color,
    thickness: 1.4,
    width: 4,
  };
}

/** From 0, or from below it, to a little above the highest. */
export function rangeFrom0(values: readonly number[]): [number, number] {
  return [Math.min(0, ...values) * 1.06, Math.max(0, ...values) * 1.06];
}

/** Shapes of points, so that series are told apart without their colours. */
const SYMBOLS = ["circle", "diamond-open", "square", "triangle-up-open", "cross", "circle-open"] as const;
export const symbolOf = (i: number) => SYMBOLS[i % SYMBOLS.length];
