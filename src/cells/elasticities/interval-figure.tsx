import type { ElasticitiesFinding } from "../../../shared/schemas/elasticities.ts";
import { capital } from "../../../shared/study/words.ts";
import { conditionally, isUnconditional, titled } from "../../../shared/tables/conditional.ts";
import type { ByGood } from "../../../shared/tables/elasticities.ts";
import { printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { BottomAxis } from "../../components/chart-axis.tsx";
import { linearScale, roundTicks } from "../../components/chart-scale.ts";
import { useChartWidth } from "../../components/chart-width.ts";
import { intervalLayout } from "./interval-layout.ts";

interface FigureProps {
  readonly finding: ElasticitiesFinding;
  readonly which: ByGood;
  readonly chosen: number;
}

/** Where a bound divides goods, and what they are on its either side. */
const BOUNDS: Readonly<Record<ByGood, { at: number; below: string; above: string }>> = {
  expenditure: { at: 1, below: "necessities", above: "luxuries" },
  "own price": { at: -1, below: "elastic", above: "inelastic" },
  "own price, compensated": { at: -1, below: "elastic", above: "inelastic" },
};

const SAYS: Readonly<Record<ByGood, string>> = {
  expenditure: "Expenditure elasticities",
  "own price": "Own-price elasticities",
  "own price, compensated": "Compensated own-price elasticities",
};

const TOP = 24;

/** Estimates with their intervals, good by good, the groups of each in their order; the chosen one is filled. */
export function IntervalFigure({ finding, which, chosen }: FigureProps) {
  const [ref, width] = useChartWidth<HTMLDivElement>(735);
  const { lines, rows, height, from, to } = intervalLayout(finding, which, chosen, BOUNDS[which].at);
  const gutter = width < 500 ? 92 : 116;
  const scale = linearScale(from, to, gutter, width - 12);
  const { ticks, decimals } = roundTicks(from, to, width < 500 ? 4 : 8);
  const bound = BOUNDS[which];
  const x = scale.at(bound.at);
  const bottom = TOP + height;
  const several = finding.groups.length > 1;
  return (
    <figure ref={ref}>
      <svg
        role="img"
        aria-label={`${titled(finding, SAYS[which].toLowerCase())}${conditionally(finding)}, with ${printPercent(finding.level, 0)} intervals; their numbers are in the tables`}
        width="100%"
        height={bottom + 28}
        className="block overflow-visible font-sans text-[0.8125rem] tabular-nums"
      >
        {bound.at >= from && bound.at <= to && (
          <g>
            <path d={`M${x} ${TOP - 6}V${bottom}`} stroke="var(--ink)" strokeWidth="1.3" />
            <text x={x - 7} y={TOP - 10} textAnchor="end" fill="var(--ink2)">
              {bound.below}
            </text>
            <text x={x + 7} y={TOP - 10} fill="var(--ink2)">
              {bound.above}
            </text>
          </g>
        )}
        {0 > from && 0 < to && <path d={`M${scale.at(0)} ${TOP - 6}V${bottom}`} stroke="var(--rule2)" />}
        {rows.map(({ good, y, top }, i) => (
          <g key={good}>
            {i > 0 && <path d={`M0 ${TOP + top}H${width}`} stroke="var(--rule)" />}
            <text x="0" y={TOP + y + 4.5} fill="var(--ink)">
              {capital(good)}
            </text>
          </g>
        ))}
        {lines.map(({ key, y, one, isChosen }) => (
          <g key={key} stroke="var(--ink)" strokeWidth="1.4">
            <path
              d={`M${scale.at(one.low)} ${TOP + y}H${scale.at(one.high)}M${scale.at(one.low)} ${TOP + y - 4}v8M${scale.at(one.high)} ${TOP + y - 4}v8`}
            />
            <circle cx={scale.at(one.value)} cy={TOP + y} r="3.4" fill={isChosen ? "var(--ink)" : "var(--recto)"} />
          </g>
        ))}
        <BottomAxis scale={scale} y={bottom} ticks={ticks} print={(tick) => printFixed(tick, decimals)} />
      </svg>
      <figcaption className="type-small mt-1 text-ink2">
        {printPercent(finding.level, 0)} intervals
        {isUnconditional(finding) ? ", unconditional" : conditionally(finding)}.
        {several && ` From top to bottom in the order of the groups; filled: ${finding.groups[chosen].name}.`}
      </figcaption>
    </figure>
  );
}
