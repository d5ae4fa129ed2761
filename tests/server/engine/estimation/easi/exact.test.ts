import { describe, expect, it } from "vitest";
import { systemForm } from "../../../../../server/engine/estimation/coefficient-form.ts";
import { estimateExactEasi } from "../../../../../server/engine/estimation/easi/exact.ts";
import { EasiRows } from "../../../../../server/engine/estimation/easi/exact-rows.ts";
import { accumulateMoments, momentsRequest } from "../../../../../server/engine/estimation/index.ts";
import type { Reduction } from "../../../../../server/engine/estimation/moments.ts";
import { draw } from "../../../../../server/engine/inference/bootstrap/sampling.ts";
import { QUIET } from "../../../../../server/engine/run.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { ESTIMATOR_NAMES } from "../../../../../shared/schemas/system.ts";
import type { EasiSize } from "../../../../../shared/systems/demand-system.ts";
import { easi } from "../../../../../shared/systems/easi.ts";
import { INTERACTION_NAMES, type RestrictionName } from "../../../../../shared/systems/names.ts";
import { easiRowByRow } from "../../../../support/easi-row-by-row.ts";
import { estimated, largestDifference, systemOver } from "../../../../support/estimating.ts";
import { simulateEasi } from "../../../../support/simulated-easi.ts";
import { written } from "../../../../support/written-rows.ts";

const BOTH: RestrictionName[] = ["homogeneity", "symmetry"];
const PLAIN: EasiSize = { degree: 3, interactions: [] };
const FULL: EasiSize = { degree: 2, interactions: INTERACTION_NAMES };

describe("moments projected on instruments against dense matrices of rows", () => {
  const cases = [
    ["least squares", "alike", PLAIN, 0, [], false],
    ["least squares", "alike", FULL, 1, BOTH, true],
    ["iterated seemingly unrelated", "by residuals", PLAIN, 1, BOTH, false],
    ["iterated seemingly unrelated", "by residuals", FULL, 1, ["homogeneity"], true],
  ] as const;

  it.each(cases)(
    "%s, weighing %s, %j, %d demographics, %j, weighted %s",
    (estimator, weighing, size, demographics, impose, weighted) => {
      const simulation = {
        goods: 3,
        rows: 150,
        random: seededRandom(5),
        noise: 0.03,
        easi: size,
        demographics,
        weighted,
      };
      const { data, size: full } = simulateEasi(simulation);
      const finding = estimated(data, { form: "easi", ...size, estimator, impose });
      const slow = easiRowByRow(data, full, easi.free(full, impose), weighing);
      expect(largestDifference(finding.fitted.theta, slow.theta)).toBeLessThan(1e-9);
      expect(largestDifference(finding.residualCovariance.flat(), slow.residualCovariance.flat())).toBeLessThan(1e-9);
      // Its derivatives are numerical: central differences of 1e-4.
      const errors = finding.coefficients.map((coefficient) => coefficient.standardError);
      expect(largestDifference(errors, slow.standardErrors)).toBeLessThan(1e-7);
    },
  );
});

describe("the exact form", () => {
  it("returns the coefficients the shares were made from where there are no errors", () => {
    const { data, theta } = simulateEasi({
      goods: 4,
      rows: 200,
      random: seededRandom(6),
      noise: 0,
      easi: FULL,
      demographics: 1,
    });
    const finding = estimated(data, { form: "easi", ...FULL, estimator: "least squares", impose: BOTH });
    expect(largestDifference(finding.fitted.theta, theta)).toBeLessThan(1e-9);
  });

  it.each(ESTIMATOR_NAMES)("does not depend on which good is dropped (%s)", (estimator) => {
    const { data } = simulateEasi({
      goods: 3,
      rows: 200,
      random: seededRandom(7),
      noise: 0.03,
      easi: FULL,
      demographics: 1,
      weighted: true,
    });
    const by = (dropped: string) => estimated(data, { form: "easi", ...FULL, estimator, impose: BOTH, dropped });
    const last = by("good 3");
    for (const dropped of ["good 1", "good 2"]) {
      const other = by(dropped);
      expect(largestDifference(other.fitted.theta, last.fitted.theta)).toBeLessThan(1e-9);
      expect(largestDifference([other.logLikelihood], [last.logLikelihood])).toBeLessThan(1e-9);
      // Second derivatives of the likelihood are differences of its gradient, in units of each standard error.
      const bound = estimator === "maximum likelihood" ? 1e-7 : 1e-9;
      expect(largestDifference(other.fitted.covariance.flat(), last.fitted.covariance.flat())).toBeLessThan(bound);
    }
  });

  it("has its largest likelihood by maximum likelihood, and says AIC and BIC there only", () => {
    const { data } = simulateEasi({ goods: 3, rows: 250, random: seededRandom(8), noise: 0.04, easi: PLAIN });
    const found = ESTIMATOR_NAMES.map((estimator) =>
      estimated(data, { form: "easi", ...PLAIN, estimator, impose: BOTH }),
    );
    const [least, one, iterated, maximum] = found.map((finding) => finding.logLikelihood);
    for (const other of [least, one, iterated]) expect(maximum).toBeGreaterThan(other);
    expect(found.map((finding) => finding.aic !== undefined)).toEqual([false, false, false, true]);
    expect(found.map((finding) => finding.implicit?.method)).toEqual([
      "two-stage least squares, iterated on implicit utility",
      "three-stage least squares, iterated on implicit utility",
      "iterated three-stage least squares, iterated on implicit utility",
      "full information maximum likelihood, with the Jacobian of implicit utility",
    ]);
  });

  it("covers the truth: squared errors over their variances average one", () => {
    const random = seededRandom(9);
    const totals = { conventional: 0, heteroskedastic: 0 };
    let count = 0;
    const rounds = 25;
    for (let round = 0; round < rounds; round++) {
      const { data, theta } = simulateEasi({
        goods: 3,
        rows: 200,
        random,
        noise: 0.03,
        easi: { degree: 2, interactions: ["prices with expenditure"] },
      });
      for (const errors of ["conventional", "heteroskedastic"] as const) {
        const asked = {
          degree: 2,
          interactions: ["prices with expenditure"],
          estimator: "iterated seemingly unrelated",
          impose: BOTH,
        };
        const { fitted } = estimated(data, { form: "easi", ...asked, "standard errors": errors });
        theta.forEach((truth, a) => {
          const variance = fitted.covariance[a][a];
          totals[errors] += (fitted.theta[a] - truth) ** 2 / variance;
        });
      }
      count += theta.length;
    }
    // An average of at least twenty-five (correlated within a round) χ²(1), each with a standard deviation of √2.
    expect(Math.abs(totals.conventional / count - 1)).toBeLessThan(3 * Math.sqrt(2 / rounds));
    expect(Math.abs(totals.heteroskedastic / count - 1)).toBeLessThan(3 * Math.sqrt(2 / rounds));
  });

  it("bootstraps rows, each replicate the estimate of its rows written out, and no residuals", () => {
    const { data } = simulateEasi({ goods: 3, rows: 120, random: seededRandom(10), noise: 0.03, easi: PLAIN });
    const asked = { form: "easi", ...PLAIN, estimator: "least squares", impose: BOTH };
    const bootstrap = { bootstrap: "rows", replicates: 20, seed: 6 };
    const found = estimated(data, { ...asked, "standard errors": bootstrap });
    const rows = [...draw({ of: "rows", seed: 6, units: 120 }, 4)];
    const slow = estimated(written(data, rows), asked).fitted.theta;
    expect(largestDifference(found.bootstrap!.draws![3], slow)).toBeLessThan(1e-7);
    expect(() => estimated(data, { ...asked, "standard errors": { bootstrap: "residuals" } })).toThrow(
      /holds everything but the shares fixed/,
    );
  });

  it("is the same from the sums of rows as from the rows reflected", () => {
    const simulation = { goods: 3, rows: 250, random: seededRandom(10), noise: 0.03, easi: FULL, demographics: 1 };
    const { data, size } = simulateEasi(simulation);
    const specification = systemOver(data, { form: "easi", ...FULL, impose: BOTH, estimator: "maximum likelihood" });
    const estimation = {
      moments: accumulateMoments(data, momentsRequest(specification, data), QUIET),
      form: systemForm(easi, size, BOTH),
      equations: [0, 1],
      coefficientLabels: easi.layout(size).map(({ block }) => block),
    };
    const by = (reduction: Reduction) => estimateExactEasi(specification, data, size, estimation, QUIET, reduction);
    const [summed, reflected] = [by("summed"), by("reflected")];
    expect(largestDifference(summed.theta, reflected.theta)).toBeLessThan(1e-9);
    expect(largestDifference(summed.covariance.flat(), reflected.covariance.flat())).toBeLessThan(1e-7);
  });

  it("refuses a row whose implicit utility is undefined, with its number and what is wrong", () => {
    const tilted: EasiSize = { degree: 1, interactions: ["prices with expenditure"] };
    const { data, size } = simulateEasi({ goods: 2, rows: 20, random: seededRandom(11), noise: 0.01, easi: tilted });
    data.logPrices[0][6] = 2;
    data.logPrices[1][6] = -2;
    // ½ p'Bp = ½ · 0.3 · 4² > 1
    const theta = easi.layout(size).map(({ block, good, column }) => {
      if (block === "price expenditure") return good === column ? 0.3 : -0.3;
      return block === "constant" ? 0.5 : 0;
    });
    expect(() => new EasiRows(data, []).realExpenditure(theta, size, QUIET)).toThrow(
      "Implicit utility is not defined in row 7: 1 − ½ p'Bp is −1.40 there where more than 0 is needed.",
    );
  });
});
