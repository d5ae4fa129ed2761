import { describe, expect, it } from "vitest";
import { runSystem } from "../../../../../server/engine/cells/system.ts";
import { QUIET } from "../../../../../server/engine/run.ts";
import { compensatingVariation, equivalentVariation } from "../../../../../shared/economics/welfare.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { systemFinding } from "../../../../../shared/schemas/system.ts";
import { INTERACTION_NAMES } from "../../../../../shared/systems/names.ts";
import { coefficientRows, coefficientTable, priceMatrices } from "../../../../../shared/tables/coefficients.ts";
import { systemOver } from "../../../../support/estimating.ts";
import { simulateEasi } from "../../../../support/simulated-easi.ts";

const easi = { degree: 2, interactions: INTERACTION_NAMES };
const { data } = simulateEasi({ goods: 3, rows: 200, random: seededRandom(13), noise: 0.02, easi, demographics: 1 });
const specification = {
  form: "easi",
  ...easi,
  impose: ["homogeneity", "symmetry"],
  estimator: "iterated seemingly unrelated",
};
const found = (more: object = {}) => runSystem(systemOver(data, { ...specification, ...more }), data, QUIET);

describe("a finding of easi", () => {
  const finding = found();

  it("names every coefficient by what it multiplies", () => {
    expect(coefficientTable(finding).rows.map(({ label }) => label)).toEqual([
      "Constant",
      "y",
      "y²",
      "z1",
      "z1 × y",
      ...["good 1", "good 2", "good 3"].map((good) => `ln p, ${good}`),
      ...["good 1", "good 2", "good 3"].map((good) => `ln p, ${good} × z1`),
      ...["good 1", "good 2", "good 3"].map((good) => `ln p, ${good} × y`),
    ]);
    expect(priceMatrices(coefficientRows(finding))).toBe("A, B");
  });

  it("is its schema's own, evaluates anywhere and has welfare", () => {
    expect(systemFinding.parse(JSON.parse(JSON.stringify(finding)))).toEqual(finding);
    const point = { prices: [1, 1.1, 0.9], total: 1.3, demographics: [0.5] };
    const dearer = [1.2, 1.1, 0.9];
    const loss = compensatingVariation(finding.fitted, point, dearer);
    expect(loss).toBeGreaterThan(0);
    expect(equivalentVariation(finding.fitted, { ...point, prices: dearer }, point.prices)).toBeCloseTo(-loss, 12);
  });

  it("says that units matter where data are not normalised and Engel curves bend", () => {
    const plain = { ...data, finding: { ...data.finding, normalise: "none" as const } };
    const by = (degree: number) =>
      runSystem(systemOver(plain, { ...specification, interactions: [], degree }), plain, QUIET).unitsMatterBy;
    expect(by(2)).toBe("real expenditure at unit prices");
    expect(by(1)).toBeUndefined();
  });

  it("of the approximate form has likelihood ratios and Laitinen's test where no product holds prices", () => {
    const approximate = found({ "real expenditure": "approximate", interactions: [], estimator: "maximum likelihood" });
    expect(approximate.implicit).toEqual({ realExpenditure: "approximate", method: "maximum likelihood" });
    expect(approximate.aic).toBeDefined();
    const [homogeneity] = approximate.tests;
    expect(homogeneity.exact?.approximate).toBe(false);
    expect(found({ "real expenditure": "approximate" }).tests[0].exact).toBeUndefined();
  });
});
