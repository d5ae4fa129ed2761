import type { OnePrice } from "../../../../shared/economics/price-change/one-price.ts";
import { printFixed } from "../../../../shared/tables/numbers.ts";
import { Hatch } from "../../../components/chart-hatch.tsx";
import type { Frame } from "./frame.ts";

interface EffectAxisProps {
  readonly frame: Frame;
  readonly one: OnePrice;
  readonly y: number;
  readonly decimals: number;
  readonly hatch: string;
}

/** Below the axis, how far the quantity goes by substitution (solid) and by income (hatched). */
export function EffectAxis({ frame, one: { bundles }, y, decimals, hatch }: EffectAxisProps) {
  const { before, compensated, after } = bundles;
  if (!compensated || !after || before.quantity === after.quantity) return null;
  const parts = [
    { name: "substitution", from: before.quantity, to: compensated.quantity, colour: "var(--n4)", fill: "var(--n4)" },
    { name: "income", from: compensated.quantity, to: after.quantity, colour: "var(--p4)", fill: `url(#${hatch})` },
  ];
  const meet = frame.x.at(compensated.quantity);
  const rightwards = after.quantity > before.quantity;
  return (
    <g>
      <defs>
        <Hatch id={hatch} colour="var(--p4)" />
      </defs>
      {parts.map(({ name, from, to, colour, fill }, at) => {
        const atLeft = rightwards === (at === 0);
        const [start, end] = [frame.x.at(Math.min(from, to)), frame.x.at(Math.max(from, to))];
        return (
          <g key={name}>
            <rect x={start} y={y - 3} width={Math.max(0.5, end - start)} height="6" fill={fill} stroke={colour} />
            <text x={meet + (atLeft ? -6 : 6)} y={y + 19} textAnchor={atLeft ? "end" : "start"} fill="var(--ink)">
              {name} {printFixed(to - from, decimals)}
            </text>
          </g>
        );
      })}
    </g>
  );
}
