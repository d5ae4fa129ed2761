import { describe, expect, it } from "vitest";
import { accumulateSums, momentMatrix } from "../../../../server/engine/estimation/accumulate-sums.ts";
import { whiteningOf } from "../../../../server/engine/estimation/find-whitening.ts";
import type { MomentSource, TermPair } from "../../../../server/engine/estimation/moment-source.ts";
import { reduceRows } from "../../../../server/engine/estimation/moments.ts";
import { planTiles } from "../../../../server/engine/estimation/monomial-plan.ts";
import { densePlan } from "../../../../server/engine/estimation/tile-plan.ts";
import { QUIET } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";

const random = seededRandom(6);
const ROWS = 1000;
const column = (mean: number) => Float64Array.from({ length: ROWS }, () => mean + random.normal());
const source: MomentSource = {
  rows: ROWS,
  columns: [column(0), column(5), column(-3)],
  columnLabels: ["a", "b", "c"],
  terms: [
    [0, 0],
    [0, 1],
    [0, 2],
    [0, 3],
    [1, 1],
    [1, 2],
    [2, 2],
    [1, 3],
    [2, 3],
  ],
  responses: [column(1), column(0)],
  responseLabels: ["y", "v"],
  weights: Float64Array.from({ length: ROWS }, () => 0.5 + random.uniform()),
};
const all: TermPair[] = [...source.terms, [0, 4], [0, 5]];

/** One row at a time, one product at a time. */
function plainMoments(): number[][] {
  const places = [...source.columns, ...source.responses];
  const value = ([left, right]: TermPair, t: number) =>
    (left === 0 ? 1 : places[left - 1][t]) * (right === 0 ? 1 : places[right - 1][t]);
  return all.map((one) =>
    all.map((other) => {
      let sum = 0;
      for (let t = 0; t < ROWS; t++) sum += source.weights![t] * value(one, t) * value(other, t);
      return sum;
    }),
  );
}

describe("the tile plan", () => {
  it("covers every pair of terms, each monomial once, in fewer products than pairs", () => {
    const goods = [1, 2, 3, 4, 5, 6, 7, 8];
    const terms: TermPair[] = [
      [0, 0],
      ...goods.map((p): TermPair => [0, p]),
      ...goods.flatMap((p) => goods.filter((q) => q >= p).map((q): TermPair => [p, q])),
      ...goods.map((w): TermPair => [0, 8 + w]),
    ];
    const plan = planTiles(terms);
    const pairs = (terms.length * (terms.length + 1)) / 2;
    expect(plan.tiles * 16).toBeLessThan(0.85 * pairs);
    const sorted = (i: number, j: number) => [...terms[i], ...terms[j]].sort((a, b) => a - b).join();
    for (let i = 0; i < terms.length; i++) {
      for (let j = i; j < terms.length; j++) {
        const place = plan.placeOf[i * terms.length + j];
        const tile = Math.floor(place / 16);
        const row = plan.left[4 * tile + Math.floor((place % 16) / 4)];
        const other = plan.right[4 * tile + (place % 4)];
        expect(sorted(row, other)).toBe(sorted(i, j));
      }
    }
  });

  it("of unrelated columns takes each pair once", () => {
    const plan = densePlan(10);
    expect(plan.tiles).toBe(6);
    expect(new Set([0, 11, 22].map((at) => plan.placeOf[at])).size).toBe(3);
  });
});

describe("sums", () => {
  const identity = {
    shift: new Float64Array(5),
    triangle: { rows: 3, columns: 3, values: Float64Array.of(1, 0, 0, 0, 1, 0, 0, 0, 1) },
  };
  const plan = planTiles(all);
  const over = (from: number, to: number) => accumulateSums(source, identity, all, plan, { from, to }, QUIET, () => 0);

  it("are the weighted products of the terms", () => {
    const matrix = momentMatrix(plan, over(0, ROWS));
    plainMoments().forEach((row, i) => {
      row.forEach((expected, j) => {
        const actual = matrix.values[j * matrix.rows + i];
        expect(Math.abs(actual - expected) / (1 + Math.abs(expected))).toBeLessThan(1e-13);
      });
    });
  });

  it.each([1, 7, 256, 300, 999])("of parts of %d rows add up to those of all", (size) => {
    const whole = over(0, ROWS);
    const parts = new Float64Array(whole.length);
    for (let from = 0; from < ROWS; from += size) {
      over(from, Math.min(from + size, ROWS)).forEach((value, k) => {
        parts[k] += value;
      });
    }
    whole.forEach((value, k) => {
      expect(Math.abs(parts[k] - value) / (1 + Math.abs(value))).toBeLessThan(1e-13);
    });
  });
});

describe("moments", () => {
  it.each(["reflected", "summed"] as const)("are the squares of their factor (%s)", (reduction) => {
    const moments = reduceRows(source, "test", QUIET, reduction);
    const factor = [moments.terms, moments.responses].flatMap((part) =>
      Array.from({ length: part.columns }, (_, j) => part.values.subarray(j * part.rows, (j + 1) * part.rows)),
    );
    const expected = plainMoments();
    expected.forEach((row, i) => {
      row.forEach((value, j) => {
        const product = factor[i].reduce((sum, entry, r) => sum + entry * factor[j][r], 0);
        const size = Math.sqrt(expected[i][i] * expected[j][j]);
        expect(Math.abs(product - value) / size).toBeLessThan(1e-13);
      });
    });
    expect(JSON.parse(JSON.stringify({ ...moments, terms: 0, responses: 0 })).key).toBe("test");
  });
});

describe("whitening", () => {
  it("tells nearly collinear columns apart, and says which depend on which", () => {
    const [a, b, c] = source.columns;
    const nearly = a.map((value) => value + 1e-7 * random.normal());
    const exactly = a.map((value, t) => 2 * value - c[t] + 4);
    const constant = a.map(() => 1 / 3);
    const columns = [a, nearly, b, c, exactly, constant];
    const labels = ["a", "nearly", "b", "c", "exactly", "constant"];
    const { dependent, passes } = whiteningOf({ ...source, columns, columnLabels: labels }, QUIET);
    expect(passes).toBe(2);
    expect(dependent).toEqual([
      { column: "exactly", on: ["a", "c"] },
      { column: "constant", on: [] },
    ]);
  });
});
