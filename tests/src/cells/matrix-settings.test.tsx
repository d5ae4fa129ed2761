import { render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { matrixAt } from "../../../shared/economics/slutsky.ts";
import type { FittedSystem } from "../../../shared/schemas/system.ts";
import { placeEigenvalues } from "../../../src/cells/slutsky/eigenvalue-layout.ts";
import { stepsInWords } from "../../../src/cells/slutsky/legend.tsx";
import { MatrixReading } from "../../../src/cells/slutsky/matrix-reading.tsx";
import { scaleSteps, scaleToken } from "../../../src/cells/slutsky/scale.ts";
import { axisFloor } from "../../../src/cells/slutsky/tenths.tsx";
import { roundTicks } from "../../../src/components/chart-scale.ts";
import { sampleSlutsky } from "../../support/sample-findings.ts";

afterEach(() => vi.unstubAllGlobals());

/** A linear expenditure system of n goods, the same for each, and its matrix. */
function expenditureSystem(n: number) {
  const goods = Array.from({ length: n }, (_, i) => `good ${i + 1}`);
  const theta = [...goods.map(() => 0.4 / n), ...goods.map(() => 1 / n)];
  const fitted: FittedSystem = {
    form: "les",
    goods,
    demographics: [],
    alpha0: 0,
    imposed: [],
    theta,
    covariance: theta.map((_, i) => theta.map((_, j) => (i === j ? 1e-6 : 0))),
  };
  const point = { prices: goods.map(() => 1), total: 1, demographics: [] };
  const at = matrixAt(fitted, point, { priceScale: goods.map(() => 1), totalScale: 1, pointName: "base point" });
  return { fitted, point, at, pointName: "base point", priceScale: goods.map(() => 1), totalScale: 1 };
}

describe("the field of the matrix", () => {
  it("is in thousandths on a phone, with every digit in the name of the entry", () => {
    vi.stubGlobal("matchMedia", () => ({ matches: true, addEventListener() {}, removeEventListener() {} }));
    render(<MatrixReading finding={sampleSlutsky()} form="share" />);
    expect(screen.getByText("thousandths")).toBeInTheDocument();
    const entry = screen.getByRole("gridcell", { name: /^meat & fish, price of meat & fish: \u22120\.1374/ });
    expect(entry).toHaveTextContent(/^\u2212137$/);
  });

  it("has three decimals and no errors in its cells with more than twelve goods; the panel has the rest", () => {
    render(<MatrixReading finding={expenditureSystem(13)} form="share" />);
    const entry = screen.getByRole("gridcell", { name: /^good 1, price of good 2: 0\.0036, standard error/ });
    expect(entry).toHaveTextContent(/^0\.004$/);
    expect(screen.getByRole("region", { name: "Entry pointed at" })).toHaveTextContent("0.0036");
  });

  it("explains a linear expenditure system by its own formula", () => {
    render(<MatrixReading finding={expenditureSystem(4)} form="share" />);
    expect(screen.getByText(/^with/)).toHaveTextContent("with μij = \u2212bi cj pj/x = \u22120.2500 × 0.1000");
  });
});

describe("the signed scale", () => {
  it("steps at 0.002, 0.01, 0.03, 0.06 and 0.10 either side of nought", () => {
    const steps = scaleSteps("share", [[1]]);
    expect(stepsInWords(steps)).toBe("steps 0.002, 0.01, 0.03, 0.06, 0.10");
    expect(
      [-0.11, -0.07, -0.04, -0.02, -0.005, 0.0019, 0.005, 0.02, 0.04, 0.07, 0.1].map((k) => scaleToken(k, steps)),
    ).toEqual(["n5", "n4", "n3", "n2", "n1", "z0", "p1", "p2", "p3", "p4", "p5"]);
  });

  it("follows another form's largest entry, which has the deepest step", () => {
    const steps = scaleSteps("quantity", [[-53.21, 2]]);
    expect(stepsInWords(steps)).toBe("steps 1, 5.3, 15, 31, 53");
    expect(scaleToken(-53.21, steps)).toBe("n5");
  });
});

describe("drawings", () => {
  it("keep the labels of eigenvalues clear of one another", () => {
    const eigenvalues = [-0.05, -0.051, -0.052, -0.2].map((value) => ({ value, standardError: 0.002 }));
    const placed = placeEigenvalues(eigenvalues, (value) => 700 + 3000 * value, 112, 735);
    const lanes = placed.filter((one) => one.index !== 3).map((one) => one.lane);
    expect(new Set(lanes).size).toBe(3);
    for (const one of placed) {
      expect(one.label - 56).toBeGreaterThanOrEqual(0);
      expect(one.label + 56).toBeLessThanOrEqual(735);
    }
  });

  it("begin the axis of tenths at a round figure below the worst", () => {
    expect(axisFloor([1, 0.911])).toBe(0.88);
    expect(axisFloor([1, 1])).toBe(0.98);
    expect(axisFloor([1, 0.1])).toBe(0);
  });

  it("have ticks at round figures, nought exactly nought", () => {
    expect(roundTicks(-0.23, 0.07, 6)).toEqual({
      ticks: [-0.2, -0.15000000000000002, -0.1, -0.05, 0, 0.05],
      decimals: 2,
    });
  });
});
