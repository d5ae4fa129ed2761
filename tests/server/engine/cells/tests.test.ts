import { beforeAll, describe, expect, it } from "vitest";
import { runSystem, runTests } from "../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET } from "../../../../server/engine/run.ts";
import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import { type MadeTest, type TestsFinding, testsFinding } from "../../../../shared/schemas/tests.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

const LINEAR = "data: weeks\nform: la-aids\nimpose: [homogeneity, symmetry]";
let data: PreparedData;
beforeAll(async () => {
  data = await tunaWeeks();
});

function testsOf(source: string, system: string, keys = ""): TestsFinding {
  const specification = specificationOf("system", `${system}\n${keys}`) as SystemSpecification;
  const finding = runSystem(specification, data);
  return runTests(specificationOf("tests", source), data, { specification, finding });
}

const made = ({ tests }: TestsFinding) => tests.filter((test): test is MadeTest => "wald" in test);

describe("runTests", () => {
  it("gives a finding that its schema takes as it is, everything but revealed preference by default", () => {
    const finding = testsOf("system: base", LINEAR);
    expect(testsFinding.parse(JSON.parse(JSON.stringify(finding)))).toEqual(finding);
    expect(finding.tests.map(({ hypothesis }) => hypothesis)).toEqual([
      "homogeneity",
      "symmetry",
      "homogeneity and symmetry",
      "demographics",
      "quadratic terms",
      "exogeneity",
    ]);
    expect(finding.revealed).toBeUndefined();
    expect(finding).toMatchObject({ rows: 338, level: 0.05, covariance: "conventional" });
  });

  it("has the likelihood ratios that the system's own finding has", () => {
    const specification = specificationOf("system", LINEAR);
    const system = runSystem(specification, data);
    const { tests } = runTests(specificationOf("tests", "system: base"), data, { specification, finding: system });
    const [homogeneity, symmetry] = system.tests;
    expect(tests[0]).toMatchObject({ likelihoodRatio: { statistic: expect.closeTo(homogeneity.statistic, 7) } });
    expect(tests[1]).toMatchObject({ likelihoodRatio: { statistic: expect.closeTo(symmetry.statistic, 7) } });
    expect(tests[0]).toMatchObject({ laitinen: { f: expect.closeTo(homogeneity.exact!.f, 7), approximate: true } });
  });

  it("tests what is named, in its own order, at the level named", () => {
    const finding = testsOf("system: base\nof: [symmetry, homogeneity]\nlevel: 0.1", LINEAR);
    expect(finding.tests.map(({ hypothesis }) => hypothesis)).toEqual(["homogeneity", "symmetry"]);
    expect(finding.level).toBe(0.1);
  });

  it("says why there is nothing to test, and which laws hold by the form", () => {
    const finding = testsOf("system: base", "data: weeks\nform: les");
    const reasons = Object.fromEntries(finding.tests.map((test) => [test.hypothesis, "because" in test && test]));
    expect(reasons.homogeneity).toMatchObject({ because: "by form" });
    expect(reasons.symmetry).toMatchObject({ because: "by form" });
    expect(reasons["quadratic terms"]).toMatchObject({ because: "nothing to test" });
    expect(reasons.exogeneity).toMatchObject({ reason: expect.stringContaining("names no instruments") });
  });

  it("tests the quadratic terms of the quadratic system as twice the gain over the system without", () => {
    const finding = testsOf(
      "system: base\nof: [quadratic terms]",
      "data: weeks\nform: quaids\nimpose: [homogeneity, symmetry]",
    );
    const [test] = made(finding);
    const likelihood = (form: string) =>
      runSystem(specificationOf("system", `data: weeks\nform: ${form}\nimpose: [homogeneity, symmetry]`), data)
        .logLikelihood;
    expect(test).toMatchObject({ degreesOfFreedom: 6, given: ["homogeneity", "symmetry"] });
    expect(test.likelihoodRatio).toMatchObject({
      statistic: expect.closeTo(2 * (likelihood("quaids") - likelihood("aids")), 6),
    });
    for (const statistic of [test.wald, test.score]) expect("statistic" in statistic).toBe(true);
  });

  it("takes Wald's covariance of the kind the system names, and leaves the likelihoods as they are", () => {
    const [plain] = made(testsOf("system: base\nof: [homogeneity]", LINEAR));
    const robust = testsOf("system: base\nof: [homogeneity]", LINEAR, "standard errors: heteroskedastic");
    const [test] = made(robust);
    expect(robust.covariance).toBe("heteroskedastic");
    expect(test.likelihoodRatio).toEqual(plain.likelihoodRatio);
    expect("statistic" in test.wald && "statistic" in plain.wald && test.wald.statistic !== plain.wald.statistic).toBe(
      true,
    );
    expect(test.equations?.[0].freedom).toBeUndefined();
    expect(plain.equations?.[0].freedom).toBe(338 - 9);
  });

  it("tells what could not be tested, and tests the rest", async () => {
    // Fourteen weeks, nine coefficients an equation and six equations: unrestricted, some combination fits exactly.
    const few = await tunaWeeks("time: week\nkeep: week <= 14");
    const specification = specificationOf("system", "data: weeks\nform: la-aids\nimpose: [homogeneity, symmetry]");
    const finding = runSystem(specification, few);
    const { tests } = runTests(specificationOf("tests", "system: base"), few, { specification, finding });
    const [homogeneity, symmetry] = tests.filter((test): test is MadeTest => "wald" in test);
    const without = {
      absent: expect.stringMatching(/^Without the restriction there is no fit: The residual covariance/),
    };
    expect(homogeneity).toMatchObject({ wald: without, likelihoodRatio: without, laitinen: without });
    expect(symmetry.likelihoodRatio).toHaveProperty("statistic");
    expect(finding.untested).toMatchObject([{ restriction: "homogeneity", reason: without.absent }]);
  });
});

describe("exogeneity", () => {
  it("is tested as the system's own finding has it, with a score besides", () => {
    const specification = specificationOf("system", `${LINEAR}\ninstruments: [week]`);
    const finding = runSystem(specification, data);
    const asked = specificationOf("tests", "system: base\nof: [exogeneity, homogeneity]");
    const [homogeneity, exogeneity] = made(runTests(asked, data, { specification, finding }));
    const own = finding.endogeneity!.exogeneity;
    expect(exogeneity).toMatchObject({ degreesOfFreedom: 6, given: ["homogeneity", "symmetry"] });
    expect(exogeneity.wald).toMatchObject({ statistic: expect.closeTo(own.wald!.statistic, 6) });
    expect(exogeneity.likelihoodRatio).toMatchObject({ statistic: expect.closeTo(own.likelihoodRatio!.statistic, 6) });
    expect(exogeneity.score).toHaveProperty("statistic");
    expect(homogeneity.laitinen).toMatchObject({ approximate: true, because: expect.stringContaining("first stage") });
  });
});

describe("seasonal terms", () => {
  it("are tested as one thing", () => {
    const finding = testsOf(
      "system: base\nof: [demographics]",
      LINEAR,
      "season: {period: 52, harmonics: 1}\ntrend: true",
    );
    expect(made(finding).map(({ column, degreesOfFreedom }) => [column, degreesOfFreedom])).toEqual([
      [undefined, 18],
      ["trend", 6],
      ["season", 12],
    ]);
  });
});

describe("revealed preference", () => {
  it("is all that data alone are asked for", () => {
    const finding = runTests(specificationOf("tests", "data: weeks"), data, undefined);
    expect(finding.tests).toEqual([]);
    expect(finding.covariance).toBeUndefined();
    expect(finding.revealed).toMatchObject({ rows: 338, periods: true, weighted: false });
  });

  it("does not depend on units, and reads rows without a time of their own as no sequence", async () => {
    const asUploaded = await tunaWeeks("normalise: none");
    const [one, other] = [data, asUploaded].map((of) =>
      runTests(specificationOf("tests", "data: weeks"), of, undefined),
    );
    expect({ ...other.revealed, periods: true, index: 0 }).toEqual({ ...one.revealed, index: 0 });
    if (!one.revealed || !other.revealed || "absent" in one.revealed || "absent" in other.revealed) throw new Error();
    expect(other.revealed.index).toBeCloseTo(one.revealed.index, 12);
    expect(other.revealed.periods).toBe(false);
  });

  it("is a refusal with both numbers where it was all that was asked, a reason beside other tests", () => {
    const many = Int32Array.from({ length: 3001 }, (_, t) => t);
    const wide = { ...data, rows: 3001, rowNumbers: many };
    expect(() => runTests(specificationOf("tests", "data: weeks"), wide, undefined)).toThrow(Refusal);
    expect(() => runTests(specificationOf("tests", "data: weeks"), wide, undefined)).toThrow(
      /3001 rows used, and at most 3000/,
    );
  });

  it("stops when it is cancelled", () => {
    const control = { ...QUIET, cancelled: () => true };
    expect(() => runTests(specificationOf("tests", "data: weeks"), data, undefined, control)).toThrow(Cancelled);
  });
});
