import { useId } from "react";
import type { SlutskyFinding } from "../../../shared/schemas/slutsky.ts";
import { printCount, printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { countedRows } from "../../../shared/tables/phrases.ts";
import { BottomAxis } from "../../components/chart-axis.tsx";
import { Hatch } from "../../components/chart-hatch.tsx";
import { ChartNumbers } from "../../components/chart-numbers.tsx";
import { linearScale, roundTicks, type Scale } from "../../components/chart-scale.ts";
import { useChartWidth } from "../../components/chart-width.ts";

type Sample = NonNullable<SlutskyFinding["sample"]>;
type BrokenRows = SlutskyFinding["brokenRows"];

const HEIGHT = 150;
const BOTTOM = 122;
/** Words over hatching keep a clear edge. */
const CLEAR = { paintOrder: "stroke", stroke: "var(--recto)", strokeWidth: 4, strokeLinejoin: "round" } as const;

function Bars({ histogram, scale }: { histogram: Sample["histogram"]; scale: Scale }) {
  const tallest = Math.max(...histogram.shares, Number.MIN_VALUE);
  return histogram.shares.map((share, index) => {
    const from = scale.at(histogram.edges[index]);
    const to = scale.at(histogram.edges[index + 1]);
    const height = (share / tallest) * (BOTTOM - 12);
    return (
      <rect
        key={index}
        x={from + 0.5}
        y={BOTTOM - height}
        width={Math.max(0.5, to - from - 1)}
        height={height}
        fill={histogram.edges[index] < 0 ? "var(--n4)" : "var(--p4)"}
      />
    );
  });
}

/** The rows that break it as single ticks: they are few and they matter. */
function Ticks({ rows, scale }: { rows: BrokenRows; scale: Scale }) {
  const values = rows.flatMap((row) => (row.breaks.includes("negativity") ? [row.largestEigenvalue ?? 0] : []));
  return values.map((value, index) => (
    <path key={index} d={`M${scale.at(value)} ${BOTTOM - 13}V${BOTTOM}`} stroke="var(--p4)" strokeWidth="1.4" />
  ));
}

interface BreakWordsProps {
  readonly sample: Sample;
  readonly listed: number;
  readonly x: number;
  /** How much room there is to the right of nought. */
  readonly room: number;
  readonly holds: number;
}

function BreakWords({ sample, listed, x, room, holds }: BreakWordsProps) {
  const ticks = listed === sample.breaks ? "each a tick" : listed > 0 ? `${printCount(listed)} ticked` : "";
  const rows = `${printCount(sample.breaks)} of ${countedRows(sample.rows)}`;
  const lines = room < 220 ? [rows, ticks] : [[rows, ticks].filter(Boolean).join(", ")];
  if (sample.undefined) lines.push(`${printCount(sample.undefined.rows)} not defined, in no bar`);
  return (
    <g>
      <text x={x - 14} y="58" textAnchor="end" fontWeight="600" fill="var(--ink)">
        {printPercent(holds)} hold
      </text>
      <text x={x + 12} y="58" fontWeight="600" fill="var(--ink)" {...CLEAR}>
        {printPercent(1 - holds - (sample.undefined?.weightedShare ?? 0))} break
      </text>
      {lines.map((line, index) => (
        <text key={line} x={x + 12} y={75 + 16 * index} fill="var(--ink2)" {...CLEAR}>
          {line}
        </text>
      ))}
    </g>
  );
}

interface HistogramProps {
  readonly sample: Sample;
  readonly brokenRows: BrokenRows;
  /** Weighted share of rows where negativity holds. */
  readonly holds: number;
}

/** The largest eigenvalue at each row's own prices and expenditure. */
export function NegativityHistogram({ sample, brokenRows, holds }: HistogramProps) {
  const hatch = useId();
  const [ref, width] = useChartWidth<HTMLDivElement>(470);
  const { edges } = sample.histogram;
  const span = edges[edges.length - 1] - edges[0];
  // Nought needs room on its right for the words, even when no row comes near it.
  const scale = linearScale(edges[0], Math.max(edges[edges.length - 1], 0.45 * span), 0, width);
  const nought = scale.at(0);
  const { ticks, decimals } = roundTicks(scale.from, scale.to, width < 420 ? 4 : 6);
  const listed = brokenRows.filter((row) => row.breaks.includes("negativity")).length;
  const label = `Histogram of the largest eigenvalue over ${countedRows(sample.rows)}: ${printPercent(holds)} hold, ${printCount(sample.breaks)} break${sample.undefined ? `, ${printCount(sample.undefined.rows)} not defined` : ""}`;
  return (
    <div ref={ref}>
      <svg
        role="img"
        aria-label={label}
        width="100%"
        height={HEIGHT}
        className="block font-sans text-[0.8125rem] tabular-nums"
      >
        <defs>
          <Hatch id={hatch} />
        </defs>
        <rect x={nought} y="6" width={Math.max(0, width - nought)} height={BOTTOM - 6} fill={`url(#${hatch})`} />
        <Bars histogram={sample.histogram} scale={scale} />
        <Ticks rows={brokenRows} scale={scale} />
        <path d={`M${nought} 0V${BOTTOM}`} stroke="var(--ink)" strokeWidth="1.3" />
        <BreakWords sample={sample} listed={listed} x={nought} room={width - nought} holds={holds} />
        <BottomAxis scale={scale} y={BOTTOM} ticks={ticks} print={(tick) => printFixed(tick, decimals)} />
      </svg>
      <ChartNumbers
        caption="Histogram of the largest eigenvalue, weighted shares of rows"
        heads={[
          { key: "bin", content: "Largest eigenvalue" },
          { key: "share", content: "Share of rows" },
        ]}
        lines={sample.histogram.shares.map((share, index) => ({
          key: String(index),
          head: `${printFixed(edges[index], 4)} to ${printFixed(edges[index + 1], 4)}`,
          cells: [printPercent(share)],
        }))}
      />
    </div>
  );
}
