import { describe, expect, it } from "vitest";
import { approach } from "../../../../server/engine/estimation/approach.ts";
import { systemForm } from "../../../../server/engine/estimation/coefficient-form.ts";
import type { Estimation } from "../../../../server/engine/estimation/estimation.ts";
import { firstLeastSquares, leastSquares } from "../../../../server/engine/estimation/estimators.ts";
import { reduceRows } from "../../../../server/engine/estimation/moments.ts";
import { momentsRequest, sizeOf, sourceOf } from "../../../../server/engine/estimation/request.ts";
import { meanResponses } from "../../../../server/engine/estimation/responses.ts";
import { withinEquations } from "../../../../server/engine/estimation/solve.ts";
import { specifiedSystem } from "../../../../server/engine/estimation/specified-system.ts";
import { covarianceOf, equalWeights } from "../../../../server/engine/estimation/weighting.ts";
import { QUIET } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import type { SystemName } from "../../../../shared/systems/names.ts";
import { systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

function firstStep(form: SystemName, goods: number, rows: number, noise: number) {
  const impose = form === "les" ? [] : (["homogeneity", "symmetry"] as const);
  const { data } = simulateShares({ form, goods, rows, random: seededRandom(1), noise, impose: [...impose] });
  const specification = systemOver(data, { form, impose, estimator: "seemingly unrelated" });
  const system = specifiedSystem(specification, data);
  const size = sizeOf(specification, data);
  const request = momentsRequest(specification, data);
  const moments = reduceRows(sourceOf(data, request), request.key, QUIET);
  const estimation: Estimation = {
    moments,
    form: systemForm(system, size, withinEquations(specification)),
    equations: data.goods.slice(1).map((_, at) => at + 1),
    coefficientLabels: system.layout(size).map(({ block }) => block),
  };
  const theta = system.start(size, meanResponses(estimation));
  return { estimation, start: estimation.form.expand.places.map((place) => theta[place]) };
}

describe.each([
  ["aids", 5, 400, 0.02],
  ["aids", 4, 60, 0.2],
  ["la-aids", 5, 400, 0.02],
  ["les", 4, 60, 0.02],
  ["les", 8, 300, 0.2],
] as const)(
  "the residuals of the first step of %s, %i goods over %i rows with noise of %f",
  (form, goods, rows, noise) => {
    const { estimation, start } = firstStep(form, goods, rows, noise);

    it("are those of the fit in full", () => {
      const full = covarianceOf(leastSquares(estimation, true, start, QUIET).residuals, rows);
      const alone = covarianceOf(firstLeastSquares(estimation, true, start, QUIET).residuals, rows);
      const size = Math.max(...full.map((row, i) => row[i]));
      alone.forEach((row, i) => {
        row.forEach((value, j) => {
          expect(Math.abs(value - full[i][j])).toBeLessThan(1e-12 * size);
        });
      });
    });

    it("come from contractions alone", () => {
      const weight = equalWeights(estimation.equations.length, true);
      expect(approach(estimation, { kind: "weighted", weight }, start, QUIET, 1e-10).reached).toBe(true);
    });
  },
);

it("a first step that the data do not identify is refused as the fit in full refuses it", () => {
  const { estimation, start } = firstStep("la-aids", 4, 60, 0.02);
  const { terms } = estimation.moments;
  // Total expenditure without any spread: nothing tells its coefficient.
  const values = terms.values.slice();
  values.fill(0, (terms.columns - 1) * terms.rows);
  const flat = { ...estimation, moments: { ...estimation.moments, terms: { ...terms, values } } };
  const refusal = (estimate: typeof leastSquares | typeof firstLeastSquares) => {
    try {
      estimate(flat, true, start, QUIET);
    } catch (error) {
      return String(error);
    }
    return "none";
  };
  expect(refusal(firstLeastSquares)).toContain("identif");
  expect(refusal(firstLeastSquares)).toBe(refusal(leastSquares));
});
