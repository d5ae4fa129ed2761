import { useId } from "react";
import type { MatrixAtPoint } from "../../../shared/schemas/slutsky.ts";
import { DECIMALS, printFixed, THIN_SPACE } from "../../../shared/tables/numbers.ts";
import { BottomAxis } from "../../components/chart-axis.tsx";
import { Hatch } from "../../components/chart-hatch.tsx";
import { ChartNumbers } from "../../components/chart-numbers.tsx";
import { linearScale, roundTicks } from "../../components/chart-scale.ts";
import { useChartWidth } from "../../components/chart-width.ts";
import { Estimate } from "../../components/number.tsx";
import { eigenvalueRange, type PlacedEigenvalue, placeEigenvalues } from "./eigenvalue-layout.ts";
import { intervalOfEigenvalue } from "./intervals.ts";

const LANE = 36;
const TOP = 22;
const LABEL_WIDTH = 112;

const print = (value: number) => printFixed(value, DECIMALS.entry);

function Interval({
  placed,
  eigenvalue,
}: {
  placed: PlacedEigenvalue;
  eigenvalue: MatrixAtPoint["eigenvalues"][number];
}) {
  const y = TOP + placed.lane * LANE + 26;
  return (
    <g>
      <text x={placed.label} y={y - 12} textAnchor="middle" fill="var(--ink)">
        <tspan fontWeight="600">{print(eigenvalue.value)}</tspan> ({print(eigenvalue.standardError)})
      </text>
      <path
        d={`M${placed.from} ${y}H${placed.to}M${placed.from} ${y - 4}v8M${placed.to} ${y - 4}v8`}
        stroke="var(--ink)"
        strokeWidth="1.4"
      />
      <circle cx={placed.x} cy={y} r="4" fill="var(--ink)" />
    </g>
  );
}

/** The eigenvalues with their intervals, and the side of nought on which negativity would break. */
export function EigenvalueAxis({ eigenvalues }: Pick<MatrixAtPoint, "eigenvalues">) {
  const hatch = useId();
  const [ref, width] = useChartWidth<HTMLDivElement>(735);
  const scale = linearScale(...eigenvalueRange(eigenvalues), 0, width);
  const placed = placeEigenvalues(eigenvalues, scale.at, LABEL_WIDTH, width);
  const lanes = Math.max(1, ...placed.map((eigenvalue) => eigenvalue.lane + 1));
  const bottom = TOP + lanes * LANE + 10;
  const nought = scale.at(0);
  const { ticks, decimals } = roundTicks(scale.from, scale.to, width < 500 ? 4 : 7);
  const roomy = width >= 560;
  return (
    <div ref={ref}>
      <svg
        role="img"
        aria-label={`${eigenvalues.length} eigenvalues with 95 per cent intervals; their numbers are in the table that follows`}
        width="100%"
        height={bottom + 26}
        className="block overflow-visible font-sans text-[0.8125rem] tabular-nums"
      >
        <defs>
          <Hatch id={hatch} />
        </defs>
        <rect x={nought} y={TOP} width={Math.max(0, width - nought)} height={bottom - TOP} fill={`url(#${hatch})`} />
        <path d={`M${nought} ${TOP - 8}V${bottom}`} stroke="var(--ink)" strokeWidth="1.3" />
        <text x={nought - 8} y={TOP - 8} textAnchor="end" fill="var(--ink2)">
          {roomy ? "all prices together, always 0" : "all prices, 0"}
        </text>
        <text x={width} y={TOP - 8} textAnchor="end" fill="var(--ink2)">
          {roomy ? "would break it" : "breaks"}
        </text>
        <circle cx={nought} cy={bottom - 20} r="4.2" fill="var(--recto)" stroke="var(--ink)" strokeWidth="1.4" />
        {placed.map((one) => (
          <Interval key={one.index} placed={one} eigenvalue={eigenvalues[one.index]} />
        ))}
        <BottomAxis scale={scale} y={bottom} ticks={ticks} print={(tick) => printFixed(tick, decimals)} />
      </svg>
      <EigenvalueNumbers eigenvalues={eigenvalues} />
    </div>
  );
}

function EigenvalueNumbers({ eigenvalues }: Pick<MatrixAtPoint, "eigenvalues">) {
  return (
    <ChartNumbers
      caption={`Eigenvalues, share form, over (standard error), 95${THIN_SPACE}% intervals`}
      heads={[
        { key: "direction", content: "Direction of prices" },
        { key: "value", content: "Eigenvalue" },
        { key: "interval", content: "Interval" },
      ]}
      lines={eigenvalues.map((eigenvalue, index) => ({
        key: String(index),
        head: eigenvalue.direction,
        cells: [
          <Estimate key="value" value={print(eigenvalue.value)} error={print(eigenvalue.standardError)} />,
          intervalOfEigenvalue(eigenvalue).map(print).join(" to "),
        ],
      }))}
    />
  );
}
