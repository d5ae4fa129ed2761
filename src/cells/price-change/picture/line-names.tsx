import type { Curve } from "../../../../shared/economics/price-change/indifference-curve.ts";
import type { Compensation, OnePrice } from "../../../../shared/economics/price-change/one-price.ts";
import { DECIMALS, printFixed } from "../../../../shared/tables/numbers.ts";
import type { Frame } from "./frame.ts";
import { restOn } from "./lines.tsx";

interface NamesProps {
  readonly frame: Frame;
  readonly one: OnePrice;
  readonly by: Compensation;
}

interface Name {
  readonly key: string;
  /** Money for the rest at the right edge. */
  readonly rest: number;
  readonly colour: string;
  readonly words: string;
  /** Of a utility: 0 before, 1 after. */
  readonly sub?: string;
  readonly strong?: boolean;
}

const APART = 16;
const BAR = 5;
const WORDS = 14;

/** At the right edge, each line by its name, and what the compensation costs as the height between two of them. */
export function LineNames({ frame, one, by }: NamesProps) {
  const { x, y } = frame;
  const { compensated, after } = one.budgets;
  const edge = x.at(x.to);
  const names = namesOf(one, x.to, by).filter(({ rest }) => rest >= y.from && rest <= y.to);
  const heights = standApart(
    names.map(({ rest }) => y.at(rest)),
    [y.at(y.to), y.at(y.from)],
  );
  const bar = compensated && [compensated, after].map((budget) => y.at(restOn(budget, x.to)));
  return (
    <g>
      {bar && Math.abs(bar[0] - bar[1]) > 1 && (
        <path
          d={`M${edge + 1} ${bar[0]}h${2 * BAR - 2}M${edge + BAR} ${bar[0]}V${bar[1]}M${edge + 1} ${bar[1]}h${2 * BAR - 2}`}
          stroke="var(--ink)"
          strokeWidth="1.4"
        />
      )}
      {names.map((name, at) => (
        <text
          key={name.key}
          x={edge + WORDS}
          y={heights[at] + 4}
          fill={name.colour}
          className={name.sub === undefined ? "" : "font-serif text-[0.9375rem] italic"}
          fontWeight={name.strong ? 600 : 400}
        >
          {name.words}
          {name.sub !== undefined && (
            <tspan dy="4" fontSize="0.72em" fontStyle="normal">
              {name.sub}
            </tspan>
          )}
        </text>
      ))}
    </g>
  );
}

/** From the highest at the edge to the lowest. */
function namesOf({ budgets, curves, compensation }: OnePrice, edge: number, by: Compensation): Name[] {
  const { before, compensated, after } = budgets;
  const moved = before.price !== after.price;
  const all: Name[] = [
    { key: "old", rest: restOn(before, edge), colour: "var(--ink)", words: moved ? "old budget" : "budget" },
  ];
  if (curves) all.push({ key: "u0", rest: restAt(curves.before, edge), colour: "var(--ink)", words: "u", sub: "0" });
  if (moved) {
    all.push({ key: "new", rest: restOn(after, edge), colour: "var(--accent)", words: "new budget" });
    if (curves) all.push({ key: "u1", rest: restAt(curves.after, edge), colour: "var(--ink)", words: "u", sub: "1" });
    if (compensated && compensation !== undefined) {
      const rest = (restOn(after, edge) + restOn(compensated, edge)) / 2;
      const words = `${by === "hicks" ? "CV" : "cost"} ${printFixed(compensation, DECIMALS.money)}`;
      all.push({ key: "cost", rest, colour: "var(--ink)", words, strong: true });
    }
  }
  return all.sort((a, b) => b.rest - a.rest);
}

/** The height of a curve at a quantity, between its two nearest points; none where it does not reach so far. */
function restAt({ spots }: Curve, quantity: number): number {
  const next = spots.findIndex((spot) => spot.quantity <= quantity);
  if (next < 1) return Number.NaN;
  const [more, less] = [spots[next - 1], spots[next]];
  const part = (quantity - less.quantity) / (more.quantity - less.quantity);
  return less.rest + part * (more.rest - less.rest);
}

/** Heights in their order, downwards, moved so that words do not lie on one another. */
function standApart(heights: readonly number[], [top, bottom]: readonly [number, number]): number[] {
  const places: number[] = [];
  for (const height of heights) places.push(Math.max(height, (places.at(-1) ?? top - APART) + APART));
  for (let at = places.length - 1, most = bottom; at >= 0; at--, most = places[at + 1] - APART) {
    places[at] = Math.min(places[at], most);
  }
  return places;
}
