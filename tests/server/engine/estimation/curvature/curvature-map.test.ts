import { describe, expect, test } from "vitest";
import { curvatureMap } from "../../../../../server/engine/estimation/curvature/curvature-map.ts";
import type { CurvedForm } from "../../../../../server/engine/estimation/curvature/curved-parts.ts";
import {
  entriesOfTriangle,
  factorOf,
  nearestTriangle,
} from "../../../../../server/engine/estimation/curvature/negative-matrix.ts";
import { slutskyMatrix } from "../../../../../shared/economics/slutsky-matrix.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import type { Point, SystemSize } from "../../../../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../../../../shared/systems/index.ts";
import { PRICE_INDEX_NAMES } from "../../../../../shared/systems/names.ts";

const FORMS = ["la-aids", "aids"] as const satisfies readonly CurvedForm[];
type TestedForm = (typeof FORMS)[number];

function randomCase(seed: number, form: TestedForm) {
  const random = seededRandom(seed);
  const goods = 3 + random.integer(4);
  const size: SystemSize = {
    goods,
    demographics: random.integer(3),
    alpha0: 0.3 * random.normal(),
    index: {
      name: PRICE_INDEX_NAMES[random.integer(4)],
      meanShares: Array.from({ length: goods }, () => 1 / goods),
      meanPrices: Array.from({ length: goods }, () => Math.exp(0.1 * random.normal())),
    },
  };
  const point: Point = {
    prices: Array.from({ length: goods }, () => Math.exp(0.4 * random.normal())),
    total: Math.exp(0.5 * random.normal()),
    demographics: Array.from({ length: size.demographics }, () => random.normal()),
  };
  const rank = 1 + random.integer(goods - 1);
  const map = curvatureMap(form, size, point, rank);
  const free = Array.from({ length: map.free }, (_, f) =>
    f < goods - 1 ? 1 / goods + 0.02 * random.normal() : 0.1 * random.normal(),
  );
  return { size, point, rank, map, free, system: SYSTEMS[form] };
}

describe.each(FORMS)("coefficients of %s with curvature at a point", (form) => {
  test("the matrix there is −B B', the shares are the free ones", () => {
    for (let seed = 1; seed <= 40; seed++) {
      const { size, point, rank, map, free, system } = randomCase(seed, form);
      const slopes = system.slopes(map.theta(free), size, point);
      const factor = factorOf(free.slice(map.triangle), size.goods, rank);
      const k = slutskyMatrix(slopes);
      for (let i = 0; i < size.goods; i++) {
        if (i < size.goods - 1) expect(slopes.shares[i]).toBeCloseTo(free[i], 11);
        for (let j = 0; j < size.goods; j++) {
          const wanted = -factor[i].reduce((sum, entry, r) => sum + entry * factor[j][r], 0);
          expect(Math.abs(k[i][j] - wanted)).toBeLessThan(1e-12);
        }
      }
    }
  });

  test("θ satisfies adding-up, homogeneity and symmetry", () => {
    for (let seed = 1; seed <= 20; seed++) {
      const { size, map, free, system } = randomCase(seed, form);
      const theta = map.theta(free);
      const { matrix, offset, places } = system.free(size, ["homogeneity", "symmetry"]);
      matrix.forEach((row, a) => {
        const implied = row.reduce((sum, weight, f) => sum + weight * theta[places[f]], offset[a]);
        expect(Math.abs(implied - theta[a])).toBeLessThan(1e-12);
      });
    }
  });

  test("derivatives are those of θ", () => {
    for (let seed = 1; seed <= 10; seed++) {
      const { map, free } = randomCase(seed, form);
      const jacobian = map.jacobian(free);
      const step = 1e-5;
      for (let f = 0; f < map.free; f++) {
        const moved = (by: number) => map.theta(free.map((value, at) => (at === f ? value + by : value)));
        const [up, down] = [moved(step), moved(-step)];
        up.forEach((value, a) => {
          expect(Math.abs((value - down[a]) / (2 * step) - jacobian[a][f])).toBeLessThan(1e-8);
        });
      }
    }
  });
});

test("the nearest triangle gives back a matrix that is negative already, and cuts what is not", () => {
  const random = seededRandom(7);
  for (let trial = 0; trial < 20; trial++) {
    const goods = 3 + random.integer(4);
    const rank = 1 + random.integer(goods - 1);
    const entries = entriesOfTriangle(goods, rank).map(() => random.normal());
    const product = (list: readonly number[]) => {
      const b = factorOf(list, goods, rank);
      return b.map((row) => b.map((other) => -row.reduce((sum, entry, r) => sum + entry * other[r], 0)));
    };
    const matrix = product(entries);
    const again = product(nearestTriangle(matrix, rank));
    matrix.forEach((row, i) => {
      row.forEach((entry, j) => {
        expect(again[i][j]).toBeCloseTo(entry, 10);
      });
    });
    const positive = matrix.map((row) => row.map((entry) => -entry));
    expect(Math.max(...nearestTriangle(positive, rank).map(Math.abs))).toBeLessThan(1e-7);
  }
});
