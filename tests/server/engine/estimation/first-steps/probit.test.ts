import { describe, expect, it } from "vitest";
import { zeros } from "../../../../../server/engine/estimation/columns.ts";
import { columnFactor } from "../../../../../server/engine/estimation/first-steps/column-factor.ts";
import { type Probit, probit } from "../../../../../server/engine/estimation/first-steps/probit.ts";
import { inverseMillsRatio } from "../../../../../shared/numerics/normal-tail.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { largestDifference } from "../../../../support/estimating.ts";

function attempted(regressors: readonly Float64Array[], chosen: Uint8Array, weights?: Float64Array) {
  const named = regressors.map((values, a) => ({ label: `x${a}`, values }));
  const whole = columnFactor(named, Float64Array.from(chosen), weights);
  const size = named.length + 1;
  const triangle = zeros(size, size);
  for (let j = 0; j < size; j++)
    triangle.values.set(whole.values.subarray(j * whole.rows, j * whole.rows + size), j * size);
  const columns = [new Float64Array(chosen.length).fill(1), ...regressors];
  return probit({ columns, triangle, chosen, ...(weights && { weights }) });
}

function estimatedProbit(...given: Parameters<typeof attempted>): Probit {
  const found = attempted(...given);
  if (typeof found === "string") throw new Error(found);
  return found;
}

const random = seededRandom(3);
const x = Float64Array.from({ length: 600 }, () => random.normal());
const y = Uint8Array.from(x, (value) => (0.5 + value + random.normal() > 0 ? 1 : 0));

describe("probit", () => {
  it("stands where the score is zero", () => {
    const { coefficients, index } = estimatedProbit([x], y);
    const score = [0, 0];
    index.forEach((value, t) => {
      const sign = y[t] === 1 ? 1 : -1;
      const slope = sign * inverseMillsRatio(sign * value);
      score[0] += slope;
      score[1] += slope * x[t];
    });
    expect(Math.max(...score.map(Math.abs))).toBeLessThan(1e-9);
    expect(Math.abs(coefficients[1] - 1)).toBeLessThan(0.3);
  });

  it("counts a row of weight two as two rows, and the error of a coefficient from its curvature", () => {
    const weights = x.map((_, t) => (t % 2 === 0 ? 2 : 1));
    const weighted = estimatedProbit([x], y, weights);
    const rows = [...x.keys()].flatMap((t) => (t % 2 === 0 ? [t, t] : [t]));
    const repeated = estimatedProbit(
      [Float64Array.from(rows, (t) => x[t])],
      Uint8Array.from(rows, (t) => y[t]),
    );
    expect(largestDifference([...weighted.coefficients], [...repeated.coefficients])).toBeLessThan(1e-12);
    expect(largestDifference([...weighted.covariance.values], [...repeated.covariance.values])).toBeLessThan(1e-12);
  });

  it("loses no digits where regressors are nearly collinear", () => {
    const other = x.map((value, t) => value + 1e-6 * Math.sin(37 * t));
    const apart = other.map((value, t) => (value - x[t]) / 1e-6);
    const near = estimatedProbit([x, other], y);
    const plain = estimatedProbit([x, apart], y);
    expect(near.logLikelihood).toBeCloseTo(plain.logLikelihood, 8);
    expect(near.coefficients[2] * 1e-6).toBeCloseTo(plain.coefficients[2], 7);
  });

  it("does not depend on the units of a regressor", () => {
    const scaled = estimatedProbit([x.map((value) => 1e6 * value + 4e6)], y);
    const plain = estimatedProbit([x], y);
    expect(scaled.coefficients[1] * 1e6).toBeCloseTo(plain.coefficients[1], 9);
    expect(scaled.logLikelihood).toBeCloseTo(plain.logLikelihood, 9);
  });

  it("has no estimate where the regressors separate all rows, or all but some", () => {
    expect(
      attempted(
        [x],
        Uint8Array.from(x, (value) => (value > 0.2 ? 1 : 0)),
      ),
    ).toBe("separated");
    const group = Float64Array.from(x, (_, t) => (t % 3 === 0 ? 1 : 0));
    const quasi = Uint8Array.from(y, (value, t) => (group[t] === 1 ? 1 : value));
    expect(attempted([x, group], quasi)).toBe("separated");
  });

  it("estimates a few zeros among many rows", () => {
    const rare = Uint8Array.from(x, (_, t) => (t % 100 === 7 ? 0 : 1));
    const { coefficients } = estimatedProbit([x], rare);
    // Φ⁻¹(0.99) where x tells nothing.
    expect(Math.abs(coefficients[0] - 2.326)).toBeLessThan(0.2);
  });
});
