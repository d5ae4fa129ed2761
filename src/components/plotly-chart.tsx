import type { Config, Data, Layout } from "plotly.js-dist-min";
import { useEffect, useRef, useState } from "react";
import { Word } from "./button.tsx";
import { useChartWidth } from "./chart-width.ts";

/** A token of the palette as the page has it now: "ink" → "#1D1B20". */
export type TokenColour = (name: string) => string;

export interface PlotlyFigure {
  readonly data: Data[];
  readonly layout: Partial<Layout>;
}

/** The room a figure is drawn for. */
export interface FigureRoom {
  /** Too little for what else stands side by side. */
  readonly narrow: boolean;
  readonly height: number;
}

interface PlotlyChartProps {
  /** What the figure shows, for those who do not see it; its numbers stand beside it as a table. */
  readonly label: string;
  readonly fileName: string;
  /** In pixels, where it is narrow another one if need be. */
  readonly height: number | ((narrow: boolean) => number);
  readonly figure: (colour: TokenColour, room: FigureRoom) => PlotlyFigure;
}

type Plotly = typeof import("plotly.js-dist-min");

const CONFIG: Partial<Config> = { displayModeBar: false, displaylogo: false, showTips: false };
const FACE = "'Source Sans 3 Variable', sans-serif";

/** Below this many pixels a figure is narrow. */
const NARROW = 520;
const nothing = () => {};
const PICTURE = { width: 960, height: 560 };

const colourOnPage: TokenColour = (name) =>
  getComputedStyle(document.documentElement).getPropertyValue(`--${name}`).trim();

/** In the light palette, whatever the page's theme, on white: what is downloaded goes into a paper. */
function onPaper<T>(draw: (colour: TokenColour) => T): T {
  const probe = document.createElement("span");
  probe.dataset.theme = "light";
  document.body.append(probe);
  const light = getComputedStyle(probe);
  const picture = draw((name) => (name === "recto" ? "white" : light.getPropertyValue(`--${name}`).trim()));
  probe.remove();
  return picture;
}

/** What every figure shares: the page's own face and paper, no frame, nothing of the library's furniture. */
function layoutOn(colour: TokenColour, own: Partial<Layout>, size: { width: number; height: number }): Partial<Layout> {
  return {
    ...size,
    autosize: false,
    showlegend: false,
    paper_bgcolor: colour("recto"),
    plot_bgcolor: colour("recto"),
    font: { family: FACE, size: 13, color: colour("ink2") },
    hoverlabel: {
      bgcolor: colour("recto"),
      bordercolor: colour("ink"),
      font: { family: FACE, size: 13, color: colour("ink") },
    },
    ...own,
  };
}

/** A figure drawn by Plotly, which is fetched when the figure comes near the window and not before. */
export function PlotlyChart({ label, fileName, height: heightOf, figure }: PlotlyChartProps) {
  const [frame, width] = useChartWidth<HTMLDivElement>(PICTURE.width);
  const narrow = width < NARROW;
  const heightWhere = (isNarrow: boolean) => (typeof heightOf === "number" ? heightOf : heightOf(isNarrow));
  const height = heightWhere(narrow);
  const [plotly, setPlotly] = useState<Plotly>();
  const [failed, setFailed] = useState(false);
  const drawing = useRef<Promise<void>>(Promise.resolve());

  useEffect(() => {
    const element = frame.current;
    if (element === null) return;
    const fetchLibrary = () =>
      void import("plotly.js-dist-min").then(
        (library) => setPlotly(library.default as unknown as Plotly),
        () => setFailed(true),
      );
    if (typeof IntersectionObserver === "undefined") return fetchLibrary();
    const observer = new IntersectionObserver(
      ([entry]) => {
        if (!entry.isIntersecting) return;
        observer.disconnect();
        fetchLibrary();
      },
      { rootMargin: "200px" },
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, [frame]);

  useEffect(() => {
    const element = frame.current;
    if (element === null || plotly === undefined) return;
    const draw = () => {
      const { data, layout } = figure(colourOnPage, { narrow, height });
      // One after the other: the library goes on drawing for a while after it was asked.
      drawing.current = drawing.current
        .then(() => plotly.react(element, data, layoutOn(colourOnPage, layout, { width, height }), CONFIG))
        .then(nothing);
    };
    draw();
    const theme = new MutationObserver(draw);
    theme.observe(document.documentElement, { attributes: true, attributeFilter: ["data-theme"] });
    return () => theme.disconnect();
  }, [plotly, figure, width, height, narrow, frame]);

  useEffect(() => {
    const element = frame.current;
    if (element === null || plotly === undefined) return;
    return () => void drawing.current.then(() => plotly.purge(element));
  }, [plotly, frame]);

  const download = (format: "svg" | "png") => {
    const tall = Math.max(PICTURE.height, heightWhere(false));
    const picture = onPaper((colour) => {
      const { data, layout } = figure(colour, { narrow: false, height: tall });
      return { data, layout: layoutOn(colour, layout, { width: PICTURE.width, height: tall }), config: CONFIG };
    });
    void plotly?.downloadImage(picture, { format, filename: fileName, width: PICTURE.width, height: tall });
  };
  return (
    <div>
      <div ref={frame} role="img" aria-label={label} style={{ minHeight: height }}>
        {failed && <p className="type-small text-ink2">The drawing could not be fetched. Its numbers stand below.</p>}
      </div>
      <p className="type-small flex gap-4 print:hidden">
        <span className="text-ink3">Download as</span>
        <Word onClick={() => download("svg")} disabled={plotly === undefined}>
          SVG
        </Word>
        <Word onClick={() => download("png")} disabled={plotly === undefined}>
          PNG
        </Word>
      </p>
    </div>
  );
}
