import type { Spot } from "../../../../shared/economics/price-change/indifference-curve.ts";
import type { OnePrice } from "../../../../shared/economics/price-change/one-price.ts";
import type { Frame } from "./frame.ts";

/** Words over lines keep a clear edge. */
const CLEAR = { paintOrder: "stroke", stroke: "var(--recto)", strokeWidth: 4, strokeLinejoin: "round" } as const;

type Which = "before" | "compensated" | "after";

/** Disc before, open diamond compensated, square after: told apart without colour. */
function Shape({ which, x, y }: { which: Which; x: number; y: number }) {
  if (which === "before") return <circle cx={x} cy={y} r="4.6" fill="var(--ink)" />;
  if (which === "after") return <rect x={x - 4.4} y={y - 4.4} width="8.8" height="8.8" fill="var(--ink)" />;
  return (
    <path
      d={`M${x} ${y - 7}L${x + 7} ${y}L${x} ${y + 7}L${x - 7} ${y}Z`}
      fill="var(--recto)"
      stroke="var(--ink)"
      strokeWidth="1.5"
    />
  );
}

interface Named {
  readonly which: Which;
  readonly spot: Spot;
  /** Whether its name stands above at its right, or below at its left. */
  readonly above: boolean;
}

/** Bundles on the higher curve are named above it, those on the lower one below. */
function namedBundles({ bundles, budgets }: OnePrice): Named[] {
  const loses = budgets.after.price > budgets.before.price;
  const same = budgets.after.price === budgets.before.price;
  const all: Named[] = [{ which: "before", spot: bundles.before, above: loses || same }];
  if (same) return all;
  if (bundles.compensated) all.push({ which: "compensated", spot: bundles.compensated, above: loses });
  if (bundles.after) all.push({ which: "after", spot: bundles.after, above: !loses });
  return all;
}

/** The bundles with their names, and lines down to the axis. */
export function Bundles({ frame, one, bottom }: { frame: Frame; one: OnePrice; bottom: number }) {
  const named = namedBundles(one).map((own) => ({
    ...own,
    x: frame.x.at(own.spot.quantity),
    y: frame.y.at(own.spot.rest),
  }));
  return (
    <g>
      {named.map(({ which, x, y }) => (
        <path key={which} d={`M${x} ${y + 6}V${bottom}`} stroke="var(--ctl)" strokeDasharray="1.5 3" />
      ))}
      {named.map(({ which, x, y, above }) => (
        <g key={which}>
          <Shape which={which} x={x} y={y} />
          <text
            x={above ? x + 11 : x - 11}
            y={above ? y - 9 : y + 17}
            textAnchor={above ? "start" : "end"}
            fontWeight="600"
            fill="var(--ink)"
            {...CLEAR}
          >
            {which}
          </text>
        </g>
      ))}
    </g>
  );
}
