import { describe, expect, it } from "vitest";
import { gaussLegendre } from "../../../shared/numerics/quadrature.ts";
import { integrateSlope } from "../../../shared/numerics/runge-kutta.ts";

describe("Gauss and Legendre's rule", () => {
  it("has the nodes and weights of three points in closed form", () => {
    const { nodes, weights } = gaussLegendre(3);
    [-Math.sqrt(0.6), 0, Math.sqrt(0.6)].forEach((node, i) => {
      expect(nodes[i]).toBeCloseTo(node, 15);
    });
    [5 / 9, 8 / 9, 5 / 9].forEach((weight, i) => {
      expect(weights[i]).toBeCloseTo(weight, 15);
    });
  });

  it.each([1, 2, 5, 20, 41])("with %i nodes is exact up to the degree it promises, and not beyond", (count) => {
    const { nodes, weights } = gaussLegendre(count);
    const integral = (degree: number) => nodes.reduce((sum, node, i) => sum + weights[i] * node ** degree, 0);
    for (let degree = 0; degree < 2 * count; degree++) {
      expect(Math.abs(integral(degree) - (degree % 2 === 0 ? 2 / (degree + 1) : 0))).toBeLessThan(2e-14);
    }
    if (count < 6) expect(Math.abs(integral(2 * count) - 2 / (2 * count + 1))).toBeGreaterThan(1e-6);
  });
});

describe("integrating a slope", () => {
  it("follows growth, a logistic curve and a slope of s alone to the tolerance", () => {
    expect(Math.abs(integrateSlope((_, y) => y, 1) / Math.E - 1)).toBeLessThan(1e-11);
    const logistic = integrateSlope((_, y) => 5 * y * (1 - y), 0.1);
    expect(Math.abs(logistic - 1 / (1 + 9 * Math.exp(-5)))).toBeLessThan(1e-11);
    expect(Math.abs(integrateSlope((s) => 1 / (1 + s), 3) - 3 - Math.log(2))).toBeLessThan(1e-11);
  });

  it("gains with a smaller tolerance", () => {
    const error = (tolerance: number) => Math.abs(integrateSlope((_, y) => 3 * y, 1, tolerance) / Math.exp(3) - 1);
    expect(error(1e-9)).toBeLessThan(error(1e-4));
    expect(error(1e-4)).toBeGreaterThan(1e-9);
  });

  it("says where the slope ends", () => {
    expect(() => integrateSlope((s) => (s > 0.5 ? Number.NaN : 1), 0)).toThrow("the slope is not a number at");
  });
});
