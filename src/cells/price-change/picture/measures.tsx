import { printFixed } from "../../../../shared/tables/numbers.ts";
import { Hatch } from "../../../components/chart-hatch.tsx";
import type { Frame } from "./frame.ts";
import { CLEAR } from "./lines.tsx";
import type { Compensation, OnePrice } from "./one-price.ts";

interface MeasuresProps {
  readonly frame: Frame;
  readonly one: OnePrice;
  readonly by: Compensation;
  readonly bottom: number;
  readonly decimals: number;
  readonly hatch: string;
}

const END = 4;

/** What the compensation costs, as the height between the budgets after and compensated, near the left edge. */
export function CompensationBar({
  frame,
  one: { budgets, compensation },
  by,
}: Pick<MeasuresProps, "frame" | "one" | "by">) {
  if (!budgets.compensated || compensation === undefined || compensation === 0) return null;
  const quantity = frame.x.from + 0.055 * (frame.x.to - frame.x.from);
  const x = frame.x.at(quantity);
  const inside = (rest: number) => Math.min(frame.y.to, Math.max(frame.y.from, rest));
  const ends = [budgets.after, budgets.compensated].map(({ price, total }) =>
    frame.y.at(inside(total - price * quantity)),
  );
  const [high, low] = [Math.min(...ends), Math.max(...ends)];
  if (low - high < 2) return null;
  return (
    <g>
      <path
        d={`M${x - END} ${high}h${2 * END}M${x} ${high}V${low}M${x - END} ${low}h${2 * END}`}
        stroke="var(--ink)"
        strokeWidth="1.4"
      />
      <text x={x - END} y={low + 18} fontWeight="600" fill="var(--ink)" {...CLEAR}>
        {by === "hicks" ? "CV" : "kept"} {printFixed(compensation, 2)}
      </text>
    </g>
  );
}

/** Below the axis, how far the quantity goes by substitution and by income. */
export function EffectBars({ frame, one: { bundles }, bottom, decimals, hatch }: Omit<MeasuresProps, "by">) {
  const { before, compensated, after } = bundles;
  if (!compensated || !after) return null;
  const parts = [
    { name: "substitution", from: before.quantity, to: compensated.quantity, colour: "var(--n4)", y: bottom + 33 },
    { name: "income", from: compensated.quantity, to: after.quantity, colour: "var(--p4)", y: bottom + 33 },
  ];
  const rightwards = after.quantity > before.quantity;
  return (
    <g>
      <defs>
        <Hatch id={hatch} colour="var(--p4)" />
      </defs>
      {parts.map(({ name, from, to, colour, y }, at) => {
        const [start, end] = [frame.x.at(Math.min(from, to)), frame.x.at(Math.max(from, to))];
        const atLeft = rightwards ? at === 0 : at === 1;
        return (
          <g key={name}>
            <rect
              x={start}
              y={y - 2.5}
              width={Math.max(0.5, end - start)}
              height="5"
              fill={at === 0 ? colour : `url(#${hatch})`}
              stroke={colour}
            />
            <text x={atLeft ? end : start} y={y + 20} textAnchor={atLeft ? "end" : "start"} fill="var(--ink)">
              {name} {printFixed(to - from, decimals)}
            </text>
          </g>
        );
      })}
    </g>
  );
}
