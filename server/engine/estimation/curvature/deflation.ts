import type { Point, SystemSize } from "../../../../shared/systems/demand-system.ts";
import { INDEX_WEIGHTS } from "../../../../shared/systems/price-indices.ts";
import type { CurvedForm, CurvedParts } from "./curved-parts.ts";

/** Real expenditure at the point: m and q = m²/b of the shares; m, q, c = m³/b² as they stand in K, zero in LA-AIDS. */
export interface Deflation {
  readonly real: number;
  readonly square: number;
  readonly price: number;
  readonly cross: number;
  readonly cubic: number;
}

/** Real expenditure at a point as a function of the parts that fix the system there, and its change with them. */
export interface Deflating {
  at(parts: CurvedParts): Deflation;
  change(parts: CurvedParts, at: Deflation, change: CurvedParts): Deflation;
}

export function deflation(form: CurvedForm, size: SystemSize, point: Point): Deflating {
  return form === "la-aids" ? byIndex(size, point) : byTranslog(size, point);
}

/** ln P of an index without parameters is linear in the shares at the point. */
function byIndex({ index, goods }: SystemSize, point: Point): Deflating {
  if (index === undefined) throw new RangeError("curvature of the linear approximate system needs its price index");
  const { own, mean, relative } = INDEX_WEIGHTS[index.name];
  const deviation = Array.from(
    { length: goods },
    (_, k) => Math.log(point.prices[k]) - (relative ? Math.log(index.meanPrices[k]) : 0),
  );
  const held = (real: number): Deflation => ({ real, square: 0, price: 0, cross: 0, cubic: 0 });
  return {
    at: ({ shares }) =>
      held(
        deviation.reduce(
          (rest, log, k) => rest - (own * shares[k] + mean * index.meanShares[k]) * log,
          Math.log(point.total),
        ),
      ),
    change: (_, __, { shares }) => held(deviation.reduce((rest, log, k) => rest - own * shares[k] * log, 0)),
  };
}

const MOST_STEPS = 60;

/**
 * The translog index holds α and Γ, which follow from m: m solves
 *
 *     m = ln x − α₀ − w*'l + m β'l + q λ'l + ½ l'Γ(m) l
 *
 * linear in m for AIDS, a cubic for QUAIDS; at l = 0, m = ln x − α₀.
 */
function byTranslog(size: SystemSize, point: Point): Deflating {
  const logPrices = point.prices.map(Math.log);
  const along = (vector: readonly number[]) => vector.reduce((sum, entry, k) => sum + entry * logPrices[k], 0);
  const squared = (parts: Pick<CurvedParts, "factor">) => columnsAlong(parts.factor, logPrices);
  const start = ({ shares, factor }: CurvedParts) => {
    const level = along(shares);
    const fromFactor = squared({ factor }).reduce((sum, entry) => sum + entry * entry, 0);
    const own = shares.reduce((sum, share, k) => sum + share * logPrices[k] ** 2, 0);
    return Math.log(point.total) - size.alpha0 - level + 0.5 * (own - level * level - fromFactor);
  };
  const powers = (real: number, b1: number): Deflation => {
    const b = Math.exp(b1);
    const square = (real * real) / b;
    return { real, square, price: real, cross: square, cubic: real ** 3 / (b * b) };
  };
  /** ∂/∂m of the equation, right side less left. */
  const slope = ({ real }: Deflation, b1: number, l1: number) => {
    const b = Math.exp(b1);
    const square = (2 * real) / b;
    const cubic = (3 * real * real) / (b * b);
    return b1 + square * l1 - 0.5 * (b1 * b1 + 2 * square * b1 * l1 + 2 * cubic * l1 * l1) - 1;
  };
  return {
    at: (parts) => {
      const first = start(parts);
      const b1 = along(parts.beta);
      const l1 = along(parts.lambda);
      let at = powers(first, b1);
      for (let step = 0; step < MOST_STEPS; step++) {
        const right =
          first +
          at.real * b1 +
          at.square * l1 -
          0.5 * (at.real * b1 * b1 + 2 * at.square * b1 * l1 + 2 * at.cubic * l1 * l1);
        const move = (at.real - right) / slope(at, b1, l1);
        at = powers(at.real + move, b1);
        if (Math.abs(move) <= 1e-15 * (1 + Math.abs(at.real))) break;
      }
      return at;
    },
    change: (parts, at, change) => {
      const b1 = along(parts.beta);
      const l1 = along(parts.lambda);
      const db1 = along(change.beta);
      const dl1 = along(change.lambda);
      const w = along(parts.shares);
      const dw = along(change.shares);
      const factor = squared(parts);
      const changed = squared(change);
      const fromFactor = factor.reduce((sum, entry, r) => sum + entry * changed[r], 0);
      const own = change.shares.reduce((sum, share, k) => sum + share * logPrices[k] ** 2, 0);
      const held =
        -dw +
        0.5 * (own - 2 * w * dw - 2 * fromFactor) +
        at.real * db1 -
        at.square * db1 * l1 +
        at.square * dl1 -
        at.real * b1 * db1 +
        at.square * db1 * b1 * l1 -
        at.square * (db1 * l1 + b1 * dl1) +
        2 * at.cubic * db1 * l1 * l1 -
        2 * at.cubic * l1 * dl1;
      const real = -held / slope(at, b1, l1);
      const b = Math.exp(b1);
      const square = ((2 * at.real) / b) * real - at.square * db1;
      return {
        real,
        square,
        price: real,
        cross: square,
        cubic: ((3 * at.real ** 2) / (b * b)) * real - 2 * at.cubic * db1,
      };
    },
  };
}

/** B'l, r. */
function columnsAlong(factor: CurvedParts["factor"], vector: readonly number[]): number[] {
  const sums = new Array<number>(factor[0]?.length ?? 0).fill(0);
  factor.forEach((row, i) => {
    row.forEach((entry, r) => {
      sums[r] += entry * vector[i];
    });
  });
  return sums;
}
