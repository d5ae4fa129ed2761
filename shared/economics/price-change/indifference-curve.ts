/** So much of a good, and money for the rest. */
export interface Spot {
  readonly quantity: number;
  readonly rest: number;
}

/** An indifference curve, by growing price: from much of the good to little of it. */
export interface Curve {
  readonly spots: readonly Spot[];
  /** Whether it ends because demand at constant utility stops falling with the price: no preferences are behind it there. */
  readonly ends: { readonly much: boolean; readonly little: boolean };
}

/** Half the range of log prices: the price from a twentieth to twenty times itself. */
const REACH = 3;
const STEPS = 150;

/**
 * The bundles that a utility is cheapest reached with, as the price of the good moves: h(p, u) and c(p, u) − p h(p, u), which
 * are the points of the indifference curve wherever cost is concave in that price. It goes on from `home` either way while
 * compensated demand falls with the price and shares stay within 0 and 1, and passes through `through` exactly.
 */
export function curveAlong(
  home: number,
  through: number,
  logCost: (logPrice: number) => number,
  demand: (logPrice: number, logTotal: number) => Spot,
): Curve {
  const spot = (logPrice: number) => demand(logPrice, logCost(logPrice));
  const follow = (way: 1 | -1) => {
    const steps = Array.from({ length: STEPS }, (_, step) => home + (way * REACH * (step + 1)) / STEPS);
    if ((through - home) * way > 0) steps.push(through);
    steps.sort((a, b) => way * (a - b));
    const spots: Spot[] = [];
    let last = spot(home);
    for (const logPrice of steps) {
      const own = spot(logPrice);
      const falls = way * (own.quantity - last.quantity) < 0 && way * (own.rest - last.rest) > 0;
      if (!falls || own.quantity < 0 || own.rest < 0) return { spots, ended: true };
      spots.push(own);
      last = own;
    }
    return { spots, ended: false };
  };
  const [much, little] = [follow(-1), follow(1)];
  return {
    spots: [...much.spots.reverse(), spot(home), ...little.spots],
    ends: { much: much.ended, little: little.ended },
  };
}
