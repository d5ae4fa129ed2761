import { capital } from "../../../shared/study/words.ts";
import type { ComparedEstimate, ComparedRow } from "../../../shared/tables/compared.ts";
import { printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { BottomAxis } from "../../components/chart-axis.tsx";
import { linearScale, roundTicks } from "../../components/chart-scale.ts";
import { useChartWidth } from "../../components/chart-width.ts";

interface FigureProps {
  readonly row: ComparedRow;
  readonly goods: readonly string[];
  readonly names: readonly [string, string];
  /** The value that parts goods, and what they are on its either side. */
  readonly bound: { readonly at: number; readonly below: string; readonly above: string };
}

/** A normal interval of 95 per cent. */
const WIDTH = 1.959963984540054;
const TOP = 24;
const TALL = 44;
const LANE = 14;

const ends = ({ value, error }: ComparedEstimate) => [value - WIDTH * error, value + WIDTH * error] as const;

/** One elasticity of every good in both systems with its intervals: a disc for the left one, an open square for the right. */
export function ComparedFigure({ row, goods, names, bound }: FigureProps) {
  const [ref, width] = useChartWidth<HTMLDivElement>(735);
  const all = row.pairs.flatMap(({ left, right }) => [left, right]).filter((one) => one !== undefined);
  const [low, high] = [Math.min(...all.map((one) => ends(one)[0])), Math.max(...all.map((one) => ends(one)[1]))];
  const span = high - low || 1;
  const isNear = bound.at > low - span / 2 && bound.at < high + span / 2;
  const from = Math.min(low, ...(isNear ? [bound.at] : [])) - 0.06 * span;
  const to = Math.max(high, ...(isNear ? [bound.at] : [])) + 0.06 * span;
  const scale = linearScale(from, to, width < 500 ? 92 : 116, width - 12);
  const { ticks, decimals } = roundTicks(from, to, width < 500 ? 4 : 8);
  const bottom = TOP + goods.length * TALL;
  const label = `${row.label} elasticities of ${names[0]} and ${names[1]} with ${printPercent(0.95, 0)} intervals; their numbers are in the table`;
  return (
    <figure ref={ref}>
      <svg
        role="img"
        aria-label={label}
        width="100%"
        height={bottom + 28}
        className="block overflow-visible font-sans text-[0.8125rem] tabular-nums"
      >
        {isNear && (
          <g>
            <path d={`M${scale.at(bound.at)} ${TOP - 6}V${bottom}`} stroke="var(--ink)" strokeWidth="1.3" />
            <text x={scale.at(bound.at) - 7} y={TOP - 10} textAnchor="end" fill="var(--ink2)">
              {bound.below}
            </text>
            <text x={scale.at(bound.at) + 7} y={TOP - 10} fill="var(--ink2)">
              {bound.above}
            </text>
          </g>
        )}
        {goods.map((good, i) => {
          const middle = TOP + i * TALL + TALL / 2;
          const { left, right } = row.pairs[i];
          return (
            <g key={good}>
              {i > 0 && <path d={`M0 ${TOP + i * TALL}H${width}`} stroke="var(--rule)" />}
              <text x="0" y={middle + 4.5} fill="var(--ink)">
                {capital(good)}
              </text>
              {left && (
                <g stroke="var(--s1)" strokeWidth="1.4">
                  <path d={bar(scale.at(ends(left)[0]), scale.at(ends(left)[1]), middle - LANE / 2)} />
                  <circle cx={scale.at(left.value)} cy={middle - LANE / 2} r="3.6" fill="var(--s1)" />
                </g>
              )}
              {right && (
                <g stroke="var(--s2)" strokeWidth="1.4">
                  <path
                    d={bar(scale.at(ends(right)[0]), scale.at(ends(right)[1]), middle + LANE / 2)}
                    strokeDasharray="4 2.5"
                  />
                  <rect
                    x={scale.at(right.value) - 3.4}
                    y={middle + LANE / 2 - 3.4}
                    width="6.8"
                    height="6.8"
                    fill="var(--recto)"
                  />
                </g>
              )}
            </g>
          );
        })}
        <BottomAxis scale={scale} y={bottom} ticks={ticks} print={(tick) => printFixed(tick, decimals)} />
      </svg>
      <figcaption className="type-small mt-1 text-ink2">
        Upper, disc and whole line: {names[0]}. Lower, open square and dashed line: {names[1]}. {printPercent(0.95, 0)}{" "}
        intervals, normal.{from > 0 || to < 0 ? " The axis does not begin at 0." : ""}
      </figcaption>
    </figure>
  );
}

/** A line with its two ends. */
const bar = (low: number, high: number, y: number) => `M${low} ${y}H${high}M${low} ${y - 4}v8M${high} ${y - 4}v8`;
