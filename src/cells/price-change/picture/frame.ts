import type { Curve, Spot } from "../../../../shared/economics/price-change/indifference-curve.ts";
import type { OnePrice } from "../../../../shared/economics/price-change/one-price.ts";
import { linearScale, roundTicks, type Scale } from "../../../components/chart-scale.ts";

/** The window of a picture: how much of the good across, money for the rest upwards, in pixels. */
export interface Frame {
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: ReturnType<typeof roundTicks>;
  readonly yTicks: ReturnType<typeof roundTicks>;
  /** Whether either axis begins elsewhere than at nought. */
  readonly isCut: boolean;
  /** Whether a curve ends within it, for want of preferences. */
  readonly curveEnds: boolean;
}

export interface Edges {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** No picture is narrower than this part of the quantity before: else nothing could be seen to bend. */
const NARROWEST = 0.16;
/** Room beyond the outermost bundles, of their distance. */
const ROOM = 0.95;

/** Around the bundles, so that they stand well within it. */
export function frameOf({ bundles, budgets, curves }: OnePrice, { left, right, top, bottom }: Edges): Frame {
  const spots = [bundles.before, bundles.compensated, bundles.after].filter((spot) => spot !== undefined);
  const quantities = spots.map(({ quantity }) => quantity);
  const [least, most] = [Math.min(...quantities), Math.max(...quantities)];
  const spread = Math.max(most - least, NARROWEST * Math.abs(bundles.before.quantity));
  const middle = (least + most) / 2;
  const half = (most - least) / 2 + ROOM * spread;
  const [from, to] = [Math.max(0, middle - half), middle + half];
  const rests = spots.map(({ rest }) => rest);
  const steep = Math.max(budgets.before.price, budgets.after.price) * spread;
  const tall = Math.max(Math.max(...rests) - Math.min(...rests), steep);
  const centre = (Math.max(...rests) + Math.min(...rests)) / 2;
  // The lowest line reaches the right edge, where lines are named and the compensation is measured.
  const ends = [budgets.before, budgets.after].map(({ price, total }) => total - price * to);
  const low = Math.max(0, Math.min(centre - 1.1 * tall, ...ends) - 0.06 * tall);
  const high = centre + 1.1 * tall;
  return {
    x: linearScale(from, to, left, right),
    y: linearScale(low, high, bottom, top),
    xTicks: roundTicks(from, to, right - left < 340 ? 4 : 6),
    yTicks: roundTicks(low, high, 5),
    isCut: from > 0 || low > 0,
    curveEnds: [curves?.before, curves?.after].some((curve) => {
      const ends = curve ? endsOf(curve) : [];
      return ends.some(({ quantity, rest }) => quantity > from && quantity < to && rest > low && rest < high);
    }),
  };
}

/** The points at which a curve ends for want of preferences. */
function endsOf({ spots, ends }: Curve): Spot[] {
  return [...(ends.much ? [spots[0]] : []), ...(ends.little ? [spots[spots.length - 1]] : [])];
}
