import { describe, expect, it } from "vitest";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { type RestrictionName, SYSTEM_NAMES, type SystemName } from "../../shared/systems/names.ts";
import { estimated, largestDifference, systemOver } from "../support/estimating.ts";
import { simulateShares } from "../support/simulated-shares.ts";
import { termByTerm } from "../support/term-by-term.ts";

/** In every registered system the moments, read once, say what every row's own terms say again in every iteration. */
const CASES: [form: SystemName, impose: RestrictionName[], weighted: boolean][] = SYSTEM_NAMES.flatMap((form) =>
  SYSTEMS[form].heldByForm.length > 0
    ? [[form, [], false] as [SystemName, RestrictionName[], boolean]]
    : [
        [form, [], true],
        [form, ["homogeneity"], false],
        [form, ["homogeneity", "symmetry"], true],
      ],
);

/** Rows of the almost ideal system serve every other but the LES, which does not come near them. */
function sample(form: SystemName, weighted: boolean): PreparedData {
  const source = form === "les" ? "les" : "aids";
  const shape = { goods: 3, rows: 150, noise: 0.02, weighted, demographics: SYSTEMS[form].takesDemographics ? 1 : 0 };
  const { data } = simulateShares({ ...shape, form: source, random: seededRandom(43) });
  return { ...data, time: Float64Array.from({ length: data.rows }, (_, t) => t) };
}

/** The likelihood of exact real expenditure has a Jacobian of its own and is held to its own slow path. */
const optionsOf = (form: SystemName) => (form === "easi" ? { "real expenditure": "approximate" } : {});

describe.each(["reflected", "summed"] as const)("moments (%s) against the terms of every row", (reduction) => {
  it.each(CASES)("%s %j, weighted %s", (form, impose, weighted) => {
    const data = sample(form, weighted);
    const asked = { form, impose, ...optionsOf(form) };
    const specification = systemOver(data, asked);
    const finding = estimated(data, asked, reduction);
    // A hundredth off the solution: the slow path has to come back by itself.
    const slow = termByTerm(
      specification,
      data,
      finding.fitted.theta.map((value, a) => value * (1 + 0.01 * (-1) ** a)),
    );
    expect(largestDifference(finding.fitted.theta, slow.theta)).toBeLessThan(1e-10);
    expect(largestDifference([finding.logLikelihood], [slow.logLikelihood])).toBeLessThan(1e-10);
    const errors = finding.coefficients.map((coefficient) => coefficient.standardError);
    expect(largestDifference(errors, slow.standardErrors)).toBeLessThan(1e-10);
    expect(largestDifference(finding.residualCovariance.flat(), slow.residualCovariance.flat())).toBeLessThan(1e-10);
  });
});
