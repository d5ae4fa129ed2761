import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { estimateSystem } from "../../../../server/engine/estimation/estimate.ts";
import { reduceRows } from "../../../../server/engine/estimation/moments.ts";
import { momentsRequest, sourceOf } from "../../../../server/engine/estimation/request.ts";
import { draw } from "../../../../server/engine/inference/bootstrap/sampling.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { QUIET } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { largestDifference, systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";
import { written } from "../../../support/written-rows.ts";

const BOTH = ["homogeneity", "symmetry"] as const;
const SEED = 31;

/** Rows with an instrument of the total, a good that a third of them do not buy, and villages of ten. */
function sample(rows = 200): PreparedData {
  const random = seededRandom(12);
  const { data } = simulateShares({ form: "la-aids", goods: 3, rows, random, noise: 0.03, impose: BOTH });
  const income = data.logTotal.map((value) => value + 0.4 * random.normal());
  const shares = data.shares.map((column) => column.slice());
  for (let t = 0; t < rows; t++) {
    if (random.uniform() + 0.3 * data.logTotal[t] > 0.4) continue;
    shares[1][t] += shares[0][t];
    shares[0][t] = 0;
  }
  const village = data.logTotal.map((_, t) => t % 20);
  return { ...data, shares, numeric: new Map([...data.numeric, ["income", income], ["village", village]]) };
}

function estimateOf(data: PreparedData, specification: object) {
  const parsed = systemOver(data, { demographics: [], ...specification });
  const request = momentsRequest(parsed, data);
  const moments = reduceRows(sourceOf(data, request), request.key, QUIET);
  const point = { prices: [1, 1, 1], total: 1, demographics: [] };
  return estimateSystem(parsed, data, moments, QUIET, { point, pointName: "base point" });
}

const bootstrapOf = (bootstrap: string, more: object = {}) => ({
  "standard errors": { bootstrap, replicates: 20, seed: SEED, ...more },
});

describe("what comes before or after the system is done again in every replicate", () => {
  const data = sample();

  it.each([
    ["a first stage of the total", { form: "aids", impose: BOTH, instruments: ["income"] }],
    ["participation, in two steps", { form: "aids", impose: BOTH, zeros: { "two-step": ["income"] } }],
    ["negativity imposed at a point", { form: "aids", impose: BOTH, curvature: { at: "base point" } }],
  ])("%s", (_, specification) => {
    const found = estimateOf(data, { ...specification, ...bootstrapOf("rows") });
    expect(found.bootstrap).toMatchObject({ of: "rows", failed: 0 });
    expect(found.fitted.theta).toHaveLength(found.bootstrap!.draws![0].length);
    for (const b of [1, 20]) {
      const rows = [...draw({ of: "rows", seed: SEED, units: data.rows }, b)];
      const slow = estimateOf(written(data, rows), specification).fitted.theta;
      expect(largestDifference(found.bootstrap!.draws![b - 1], slow)).toBeLessThan(1e-8);
    }
  });

  it("by cluster too, whose rows do not stand together", () => {
    const specification = { form: "aids", impose: BOTH, instruments: ["income"] };
    const found = estimateOf(data, { ...specification, ...bootstrapOf("clusters", { cluster: "village" }) });
    const drawn = [...draw({ of: "clusters", seed: SEED, units: 20 }, 3)];
    const rows = drawn.flatMap((village) => Array.from({ length: 10 }, (_, k) => village + 20 * k));
    const slow = estimateOf(written(data, rows), specification).fitted.theta;
    expect(largestDifference(found.bootstrap!.draws![2], slow)).toBeLessThan(1e-8);
  });

  it("and residuals alone cannot be drawn", () => {
    const specification = { form: "aids", impose: BOTH, instruments: ["income"], ...bootstrapOf("residuals") };
    expect(() => estimateOf(data, specification)).toThrow(Refusal);
    expect(() => estimateOf(data, specification)).toThrow(/holds everything but the shares fixed/);
  });
});
