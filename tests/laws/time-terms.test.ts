import { describe, expect, it } from "vitest";
import { runSystem } from "../../server/engine/cells/system.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { systemSpecification } from "../../shared/schemas/system.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES } from "../../shared/systems/names.ts";
import { largestDifference } from "../support/estimating.ts";
import { inPeriods } from "../support/periods.ts";
import { simulateShares } from "../support/simulated-shares.ts";

const TAKING = SYSTEM_NAMES.filter((name) => SYSTEMS[name].takesDemographics);

/** Terms of time are demographics like others: estimates and everything evaluated at points and rows. */
describe.each(TAKING)("%s", (form) => {
  it("finds with a trend and a wave of the season what it finds with columns of the same numbers", () => {
    const random = seededRandom(12);
    const data = inPeriods(simulateShares({ form: "aids", goods: 3, rows: 90, random, noise: 0.02 }).data, random);
    const time = data.time!;
    const mean = (90 + 1) / 2;
    const wave = time.map((t) => Math.sin((2 * Math.PI * t) / 12));
    const level = wave.reduce((sum, value) => sum + value, 0) / 90;
    const cosine = time.map((t) => Math.cos((2 * Math.PI * t) / 12));
    const height = cosine.reduce((sum, value) => sum + value, 0) / 90;
    const columns = new Map([
      ["own trend", time.map((t) => t - mean)],
      ["own sine", wave.map((value) => value - level)],
      ["own cosine", cosine.map((value) => value - height)],
    ]);
    const found = (keys: object) =>
      runSystem(
        systemSpecification.parse({ kind: "system", data: "d", form, impose: ["homogeneity", "symmetry"], ...keys }),
        { ...data, numeric: columns },
      );
    const terms = found({ trend: true, season: { period: 12, harmonics: 1 } });
    const own = found({ demographics: ["own trend", "own sine", "own cosine"] });
    expect(terms.fitted.demographics).toEqual(["trend", "season sine 1 of 12", "season cosine 1 of 12"]);
    expect(largestDifference(terms.fitted.theta, own.fitted.theta)).toBeLessThan(1e-8);
    expect(largestDifference([terms.logLikelihood], [own.logLikelihood])).toBeLessThan(1e-9);
    const elasticities = (finding: typeof own) => finding.expenditureElasticities.map(({ estimate }) => estimate);
    expect(largestDifference(elasticities(terms), elasticities(own))).toBeLessThan(1e-8);
    expect(terms.checks.sample).toEqual(own.checks.sample);
  });
});
