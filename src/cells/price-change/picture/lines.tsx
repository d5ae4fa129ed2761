import type { Curve } from "./curve.ts";
import type { Frame } from "./frame.ts";
import type { Budget, OnePrice } from "./one-price.ts";

/** Words over lines keep a clear edge. */
export const CLEAR = { paintOrder: "stroke", stroke: "var(--recto)", strokeWidth: 4, strokeLinejoin: "round" } as const;

const place = ({ x, y }: Frame, quantity: number, rest: number) => `${x.at(quantity)} ${y.at(rest)}`;
const restOn = ({ price, total }: Budget, quantity: number) => total - price * quantity;

function budgetPath(frame: Frame, budget: Budget): string {
  const { from, to } = frame.x;
  return `M${place(frame, from, restOn(budget, from))}L${place(frame, to, restOn(budget, to))}`;
}

function curvePath(frame: Frame, { spots }: Curve): string {
  return spots.map(({ quantity, rest }, at) => `${at === 0 ? "M" : "L"}${place(frame, quantity, rest)}`).join("");
}

interface LinesProps {
  readonly frame: Frame;
  readonly one: OnePrice;
  /** The id of the clip that keeps lines within the window. */
  readonly clip: string;
}

/** Budgets before (ink), compensated (dashed) and after (accent); curves before (thick) and after (lighter, also labelled). */
export function Lines({ frame, one: { budgets, curves }, clip }: LinesProps) {
  return (
    <g clipPath={`url(#${clip})`} fill="none">
      <path d={budgetPath(frame, budgets.before)} stroke="var(--ink)" strokeWidth="1.3" />
      {budgets.compensated && (
        <path
          d={budgetPath(frame, budgets.compensated)}
          stroke="var(--accent)"
          strokeWidth="1.3"
          strokeDasharray="6 4"
        />
      )}
      <path d={budgetPath(frame, budgets.after)} stroke="var(--accent)" strokeWidth="1.6" />
      {curves && (
        <>
          <path d={curvePath(frame, curves.after)} stroke="var(--s6)" strokeWidth="2.2" />
          <path d={curvePath(frame, curves.before)} stroke="var(--ink)" strokeWidth="2.2" />
        </>
      )}
    </g>
  );
}

/** Where a curve leaves the window on its right: its height there, and the pixel. */
function rightEnd(frame: Frame, { spots }: Curve): { x: number; y: number } | undefined {
  const inside = spots
    .map(({ quantity, rest }) => ({ x: frame.x.at(quantity), y: frame.y.at(rest) }))
    .filter(({ x, y }) => x <= frame.x.at(frame.x.to) && y <= frame.y.at(frame.y.from) && y >= frame.y.at(frame.y.to));
  return inside[0];
}

/** The names of the lines, at the lines. */
export function LineNames({ frame, one: { budgets, curves, bundles } }: Omit<LinesProps, "clip">) {
  const { x, y } = frame;
  const gains = bundles.after !== undefined && budgets.after.price < budgets.before.price;
  const named = (budget: Budget, part: number) => {
    const quantity = x.from + part * (x.to - x.from);
    return { x: x.at(quantity), y: y.at(Math.min(y.to, Math.max(y.from, restOn(budget, quantity)))) };
  };
  const [old, fresh] = [named(budgets.before, gains ? 0.72 : 0.24), named(budgets.after, gains ? 0.24 : 0.72)];
  const moved = budgets.after.price !== budgets.before.price;
  return (
    <g>
      <text x={old.x} y={old.y + (gains ? 22 : 20)} textAnchor="middle" fill="var(--ink)" {...CLEAR}>
        {moved ? "old budget" : "budget"}
      </text>
      {moved && (
        <text
          x={fresh.x}
          y={gains ? fresh.y - 12 : fresh.y + 22}
          textAnchor={gains ? "start" : "middle"}
          fill="var(--accent)"
          {...CLEAR}
        >
          new budget
        </text>
      )}
      {curves && <CurveName at={rightEnd(frame, curves.before)} sub="0" />}
      {curves && moved && <CurveName at={rightEnd(frame, curves.after)} sub="1" />}
    </g>
  );
}

function CurveName({ at, sub }: { at: { x: number; y: number } | undefined; sub: string }) {
  if (at === undefined) return null;
  return (
    <text
      x={at.x - 2}
      y={at.y - 9}
      textAnchor="end"
      className="font-serif text-[0.9375rem] italic"
      {...CLEAR}
      fill="var(--ink)"
    >
      u
      <tspan dy="4" fontSize="0.72em" fontStyle="normal">
        {sub}
      </tspan>
    </text>
  );
}
