import { printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { ChartNumbers } from "../../components/chart-numbers.tsx";
import { linearScale, roundTicks } from "../../components/chart-scale.ts";
import { useChartWidth } from "../../components/chart-width.ts";

const HEIGHT = 150;
const BOTTOM = 122;
const TOP = 14;

/** Where the axis begins: a round figure below the worst tenth, and never so close that noise looks like news. */
export function axisFloor(byTenth: readonly number[]): number {
  const worst = Math.min(...byTenth);
  const room = Math.max(0.02, (1 - worst) * 1.3);
  const step = room > 0.4 ? 0.1 : room > 0.1 ? 0.02 : 0.01;
  return Math.max(0, Math.round(Math.floor((1 - room) / step) * step * 100) / 100);
}

/** By tenth of total expenditure: the share of rows where negativity holds. */
export function Tenths({ byTenth }: { byTenth: readonly number[] }) {
  const [ref, width] = useChartWidth<HTMLDivElement>(450);
  const floor = axisFloor(byTenth);
  const across = linearScale(1, byTenth.length, 12, width - 62);
  const up = linearScale(floor, 1, BOTTOM, TOP);
  const { ticks } = roundTicks(floor, 1, 3);
  const worst = byTenth.indexOf(Math.min(...byTenth));
  return (
    <div ref={ref}>
      <svg
        role="img"
        aria-label={`Share of rows where negativity holds, by tenth of expenditure; lowest in tenth ${worst + 1}, ${printPercent(byTenth[worst])}`}
        width="100%"
        height={HEIGHT}
        className="block font-sans text-[0.8125rem] tabular-nums"
      >
        {ticks.map((tick) => (
          <g key={tick}>
            <path d={`M0 ${up.at(tick)}H${width - 52}`} stroke="var(--rule)" />
            <text x={width} y={up.at(tick) + 4} textAnchor="end" fill="var(--ink2)">
              {printPercent(tick, 0)}
            </text>
          </g>
        ))}
        <path d={`M0 ${BOTTOM}H${width - 52}`} stroke="var(--ctl)" />
        {byTenth.map((share, index) => {
          const x = across.at(index + 1);
          return (
            <g key={index}>
              <path d={`M${x} ${up.at(1)}V${up.at(share)}`} stroke="var(--p4)" strokeWidth="2" />
              <circle cx={x} cy={up.at(share)} r="4" fill="var(--ink)" />
              {index === worst && share < 0.995 && (
                <text x={x - 10} y={up.at(share) + 4} textAnchor="end" fontWeight="600" fill="var(--ink)">
                  {printPercent(share)}
                </text>
              )}
              <text x={x} y={BOTTOM + 18} textAnchor="middle" fill="var(--ink2)">
                {index + 1}
              </text>
            </g>
          );
        })}
      </svg>
      <ChartNumbers
        caption="Share of rows where negativity holds, by tenth of expenditure"
        heads={[
          { key: "tenth", content: "Tenth, poorest first" },
          { key: "share", content: "Holds" },
        ]}
        lines={byTenth.map((share, index) => ({
          key: String(index),
          head: printFixed(index + 1, 0),
          cells: [printPercent(share)],
        }))}
      />
    </div>
  );
}
