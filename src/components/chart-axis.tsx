import type { Scale } from "./chart-scale.ts";

interface AxisProps {
  readonly scale: Scale;
  readonly y: number;
  readonly ticks: readonly number[];
  readonly print: (value: number) => string;
}

/** A horizontal axis with ticks below it. */
export function BottomAxis({ scale, y, ticks, print }: AxisProps) {
  return (
    <g>
      <path d={`M${scale.at(scale.from)} ${y}H${scale.at(scale.to)}`} stroke="var(--ctl)" />
      {ticks.map((tick) => (
        <g key={tick}>
          <path d={`M${scale.at(tick)} ${y}v4`} stroke="var(--ctl)" />
          <text x={scale.at(tick)} y={y + 18} textAnchor="middle" fill="var(--ink2)">
            {print(tick)}
          </text>
        </g>
      ))}
    </g>
  );
}
