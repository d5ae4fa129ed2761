import { describe, expect, it } from "vitest";
import {
  MOST_ROWS,
  type Purchases,
  revealedPreference,
} from "../../../../server/engine/inference/revealed-preference.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import { type Random, seededRandom } from "../../../../shared/numerics/random.ts";

/** Prices and bundles, a row each. */
function purchasesOf(prices: readonly number[][], bundles: readonly number[][]): Purchases {
  const column = (rows: readonly number[][], good: number) => Float64Array.from(rows, (row) => row[good]);
  const goods = prices[0].map((_, good) => good);
  return {
    prices: goods.map((good) => column(prices, good)),
    quantities: goods.map((good) => column(bundles, good)),
    rowNumbers: prices.map((_, row) => row + 1),
  };
}

const found = (prices: readonly number[][], bundles: readonly number[][]) =>
  revealedPreference(purchasesOf(prices, bundles), QUIET);

/** Every pair by a plain transitive closure (Warshall 1962), the index by trying every ratio and what lies just below. */
function slowly(prices: readonly number[][], bundles: readonly number[][]) {
  const rows = prices.map((_, row) => row);
  const cost = (i: number, j: number) => prices[i].reduce((sum, price, good) => sum + price * bundles[j][good], 0);
  const violationsAt = (e: number) => {
    const reaches = rows.map((i) => rows.map((j) => e * cost(i, i) >= cost(i, j) * (1 - 1e-12)));
    for (const k of rows) for (const i of rows) for (const j of rows) reaches[i][j] ||= reaches[i][k] && reaches[k][j];
    return rows.flatMap((i) =>
      rows.flatMap((j) => (reaches[i][j] && e * cost(j, j) > cost(j, i) * (1 + 1e-12) ? [[i, j]] : [])),
    );
  };
  const pairs = violationsAt(1);
  const critical = rows.flatMap((i) => rows.map((j) => cost(i, j) / cost(i, i))).filter((ratio) => ratio <= 1);
  const index = Math.max(...critical.filter((ratio) => violationsAt(ratio * (1 - 1e-9)).length === 0));
  return { pairs: pairs.length, rowsInvolved: new Set(pairs.flat()).size, index };
}

describe("published and textbook examples", () => {
  it("Varian, Intermediate Microeconomics, ch. 7 (numbers from memory, index recomputed): two of three rows, 0.8", () => {
    const result = found(
      [
        [1, 2],
        [2, 1],
        [1, 1],
      ],
      [
        [1, 2],
        [2, 1],
        [2, 2],
      ],
    );
    expect(result).toEqual({ rows: 3, pairs: 2, directPairs: 2, rowsInvolved: 2, index: 0.8, cycle: [1, 2] });
  });

  it("Bergstrom & Varian, Workouts (prices of B and C from memory): no pair by itself, a cycle of three, 27/28", () => {
    const result = found(
      [
        [1, 2, 8],
        [4, 1, 8],
        [3, 1, 2],
      ],
      [
        [2, 1, 3],
        [3, 4, 2],
        [2, 6, 2],
      ],
    );
    expect(result).toMatchObject({ directPairs: 0, rowsInvolved: 3, cycle: [1, 2, 3] });
    expect(result.index).toBe(27 / 28);
  });

  it("Mas-Colell, Whinston & Green, exercise 2.F.2 (from memory): the cycle 2, 1, 3 and 48/50", () => {
    const result = found(
      [
        [1, 1, 2],
        [1, 1, 1],
        [1, 2, 1],
      ],
      [
        [5, 19, 9],
        [12, 12, 12],
        [27, 11, 1],
      ],
    );
    expect(result).toMatchObject({ directPairs: 0, rowsInvolved: 3, cycle: [1, 3, 2] });
    expect(result.index).toBe(0.96);
  });

  it("two observations, symmetric and not", () => {
    const symmetric = [
      [1, 2],
      [2, 1],
    ];
    expect(found(symmetric, symmetric).index).toBe(0.8);
    const asymmetric = found(
      [
        [2, 1],
        [1, 2],
      ],
      [
        [4, 1],
        [1, 3],
      ],
    );
    expect(asymmetric.index).toBe(6 / 7);
  });

  it("equal shares are consistent", () => {
    const result = found(
      [
        [1, 2],
        [2, 1],
        [1, 1],
      ],
      [
        [6, 3],
        [3, 6],
        [6, 6],
      ],
    );
    expect(result).toEqual({ rows: 3, pairs: 0, directPairs: 0, rowsInvolved: 0, index: 1, cycle: [] });
  });
});

describe("ties", () => {
  it("identical weeks are no violation, whatever rounding does to one of them", () => {
    const week = [0.1, 0.7, 1.3];
    const bundle = [3, 1.1, 0.3];
    const rounded = week.map((price) => Math.exp(Math.log(price)));
    expect(found([week, rounded, week], [bundle, bundle, bundle])).toMatchObject({ pairs: 0, index: 1 });
  });

  it("an equality that closes a cycle is a violation, and yet the supremum is 1", () => {
    const prices = [
      [1, 1],
      [1, 2],
    ];
    const bundles = [
      [2, 2],
      [4, 0],
    ];
    // p₁·x₂ = p₁·x₁ = 4; p₂·x₁ = 6 > p₂·x₂ = 4: no violation. Turned round, p₂·x₁ < p₂·x₂ closes it.
    expect(found(prices, bundles).pairs).toBe(0);
    const turned = found(
      [
        [1, 1],
        [2, 1],
      ],
      bundles,
    );
    expect(turned).toMatchObject({ pairs: 1, rowsInvolved: 2, index: 1 });
  });
});

/** Prices and bundles at random: coarse numbers make ties. */
function randomRows(random: Random, rows: number, goods: number, coarse: boolean): [number[][], number[][]] {
  const draw = () => (coarse ? 1 + random.integer(4) : 0.2 + random.uniform());
  const many = () => Array.from({ length: rows }, () => Array.from({ length: goods }, draw));
  return [many(), many()];
}

it("agrees with the slow path on random data, ties included", () => {
  const random = seededRandom(20);
  for (let round = 0; round < 120; round++) {
    const [prices, bundles] = randomRows(random, 2 + random.integer(9), 2 + random.integer(3), round % 2 === 0);
    const [fast, slow] = [found(prices, bundles), slowly(prices, bundles)];
    expect({ pairs: fast.pairs, rowsInvolved: fast.rowsInvolved }).toEqual({
      pairs: slow.pairs,
      rowsInvolved: slow.rowsInvolved,
    });
    expect(fast.index).toBeCloseTo(slow.index, 10);
  }
});

it("the cycle it names is one: each row affords the next, the last strictly the first", () => {
  const random = seededRandom(21);
  for (let round = 0; round < 40; round++) {
    const [prices, bundles] = randomRows(random, 12, 3, false);
    const { cycle, pairs } = found(prices, bundles);
    expect(cycle.length > 0).toBe(pairs > 0);
    const cost = (i: number, j: number) => prices[i - 1].reduce((sum, p, good) => sum + p * bundles[j - 1][good], 0);
    cycle.forEach((row, place) => {
      const to = cycle[(place + 1) % cycle.length];
      expect(cost(row, row)).toBeGreaterThanOrEqual(cost(row, to) * (1 - 1e-12));
      if (place === cycle.length - 1) expect(cost(row, row)).toBeGreaterThan(cost(row, to));
    });
  }
});

it("depends neither on units nor on the order of rows", () => {
  const random = seededRandom(22);
  const [prices, bundles] = randomRows(random, 30, 4, false);
  const { index, pairs } = found(prices, bundles);
  const scale = [1e6, 1, 1e-6, 3];
  const rescaled = found(
    prices.map((row) => row.map((p, good) => p * scale[good])),
    bundles.map((row) => row.map((q, good) => q / scale[good])),
  );
  const turned = found(prices.toReversed(), bundles.toReversed());
  for (const other of [rescaled, turned]) {
    expect(other.pairs).toBe(pairs);
    expect(other.index).toBeCloseTo(index, 12);
  }
});

describe("what is refused", () => {
  const many = (rows: number): Purchases => ({
    prices: [new Float64Array(rows).fill(1)],
    quantities: [new Float64Array(rows).fill(1)],
    rowNumbers: new Int32Array(rows),
  });

  it("more rows than can be compared, with both numbers", () => {
    expect(() => revealedPreference(many(MOST_ROWS + 1), QUIET)).toThrow(/3001 rows used, and at most 3000/);
  });

  it("to go on once cancelled", () => {
    const control = { ...QUIET, cancelled: () => true };
    expect(() => revealedPreference(many(5), control)).toThrow(Cancelled);
  });
});
