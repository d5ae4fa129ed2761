import type { Curve } from "../../../../shared/economics/price-change/indifference-curve.ts";
import type { Budget, OnePrice } from "../../../../shared/economics/price-change/one-price.ts";
import type { Frame } from "./frame.ts";

const place = ({ x, y }: Frame, quantity: number, rest: number) => `${x.at(quantity)} ${y.at(rest)}`;
/** Money left for the rest when so much of the good is bought. */
export const restOn = ({ price, total }: Budget, quantity: number): number => total - price * quantity;

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

/** Budgets before (ink), compensated (dashed) and after (accent); curves before (ink) and after (lighter), all named at their ends. */
export function Lines({ frame, one: { budgets, curves }, clip }: LinesProps) {
  const moved = budgets.after.price !== budgets.before.price;
  return (
    <g clipPath={`url(#${clip})`} fill="none">
      <path d={budgetPath(frame, budgets.before)} stroke="var(--ink)" strokeWidth="1.3" />
      {moved && budgets.compensated && (
        <path
          d={budgetPath(frame, budgets.compensated)}
          stroke="var(--accent)"
          strokeWidth="1.3"
          strokeDasharray="6 4"
        />
      )}
      {moved && <path d={budgetPath(frame, budgets.after)} stroke="var(--accent)" strokeWidth="1.6" />}
      {curves && (
        <>
          <path d={curvePath(frame, curves.after)} stroke="var(--s6)" strokeWidth="2.2" />
          <path d={curvePath(frame, curves.before)} stroke="var(--ink)" strokeWidth="2.2" />
        </>
      )}
    </g>
  );
}
