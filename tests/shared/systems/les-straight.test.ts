import { expect, it } from "vitest";
import { seededRandom } from "../../../shared/numerics/random.ts";
import { lesStraight } from "../../../shared/systems/les-straight.ts";
import { derivative, gap, moved } from "../../laws/derivatives.ts";

const size = { goods: 4, demographics: 2, alpha0: 0 };
const random = seededRandom(51);
const map = lesStraight(size);
const straight = Array.from({ length: map.free }, () => 0.3 * random.normal());

it("straight coordinates of the linear expenditure system name each θ that adds up once", () => {
  const theta = map.theta(straight);
  expect(gap(map.of(theta), straight)).toBeLessThan(1e-12);
  expect(theta.slice(12).reduce((sum, b) => sum + b, 0)).toBeCloseTo(1, 12);
  expect(theta.slice(0, 4).reduce((sum, c) => sum + c, 0)).toBeCloseTo(straight[3], 12);
});

it("and have the derivatives they say", () => {
  const jacobian = map.jacobian(straight);
  straight.forEach((_, f) => {
    const numerical = derivative((step) => map.theta(moved(straight, f, step)));
    const column = jacobian.map((row) => row[f]);
    expect(gap(column, numerical)).toBeLessThan(1e-9);
  });
});
