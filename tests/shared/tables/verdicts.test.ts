import { describe, expect, it } from "vitest";
import type { TheoryChecks } from "../../../shared/schemas/checks.ts";
import type { RestrictionTest } from "../../../shared/schemas/system.ts";
import { dataSentence, slutskySentence, systemSentence } from "../../../shared/tables/sentence.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { exampleFindings } from "../../support/findings.ts";

/** As in the pictures of the product's look: 4,812 rows, negativity breaking in 48, monotonicity in 1. */
const checks: TheoryChecks = {
  pointName: "base point",
  tolerance: 1e-8,
  addingUp: { size: 4e-17, holds: true },
  homogeneity: { size: 1e-17, holds: true, status: "imposed" },
  symmetry: { size: 0, holds: true, status: "imposed" },
  negativity: { stated: true, largest: -0.0469, standardError: 0.0041, holds: true },
  monotonicity: { holds: true, lowest: 0.063, highest: 0.242 },
  sample: {
    rows: 4812,
    negativity: { breaks: 48, weightedShareThatHolds: 0.99 },
    monotonicity: { breaks: 1, weightedShareThatHolds: 0.9998 },
    regular: { breaks: 48, weightedShareThatHolds: 0.99 },
  },
};
const test = (
  restriction: RestrictionTest["restriction"],
  statistic: number,
  degreesOfFreedom: number,
  pValue: number,
): RestrictionTest => ({
  restriction,
  statistic,
  degreesOfFreedom,
  pValue,
  corrected: { statistic, pValue },
});
const homogeneity = test("homogeneity", 6.2, 5, 0.286);
const symmetry = test("symmetry given homogeneity", 18.1, 10, 0.053);
const rejected = test("symmetry given homogeneity", 31.4, 10, 0.001);
const laitinen = {
  ...homogeneity,
  exact: { tSquared: 1, f: 1, numerator: 5, denominator: 9, pValue: 0.072, approximate: false },
};
const free = { ...checks, symmetry: { size: 0.02, holds: false, status: "free" as const } };
const unbound = {
  ...free,
  homogeneity: { size: 0.1, holds: false, status: "free" as const },
  negativity: { stated: false },
};

const lines = (...given: Parameters<typeof verdictsOf>) =>
  verdictsOf(...given).map(({ law, figure, word, note }) => `${law} | ${figure} | ${word} | ${note}`);

describe("verdictsOf", () => {
  it("gives none by likelihood ratios that assume other errors than the cell asks for", () => {
    const assuming = [homogeneity, rejected].map((one) => ({ ...one, assumes: "conventional errors" as const }));
    expect(lines(checks, assuming).slice(1, 3)).toEqual([
      "Homogeneity | imposed | imposed | Wald by a tests cell",
      "Symmetry | imposed | imposed | Wald by a tests cell",
    ]);
    expect(lines(unbound, assuming).slice(1, 3)).toEqual([
      "Homogeneity | not stated | not tested | Wald by a tests cell",
      "Symmetry | not stated | not tested | Wald by a tests cell",
    ]);
    const told = { checks: unbound, tests: assuming, expenditureElasticities: [], rows: 4812 };
    expect(systemSentence(told)).not.toMatch(/reject/);
  });

  it("says of a system with theory imposed what the band shows", () => {
    expect(lines(checks, [homogeneity, symmetry])).toEqual([
      "Adding-up | holds | holds | by construction",
      "Homogeneity | imposed | imposed | test p 0.286",
      "Symmetry | imposed | imposed | test p 0.053",
      "Negativity | holds here | at base point | breaks in 48 rows",
      "Monotonicity | holds here | at base point | breaks in 1 row",
    ]);
  });

  it("says the same in full for an opened cell", () => {
    expect(lines(checks, [homogeneity, symmetry], { detail: true })).toEqual([
      "Adding-up | holds | holds | largest column sum 4 × 10⁻¹⁷",
      "Homogeneity | imposed | imposed | LR 6.2 on 5, p 0.286",
      "Symmetry | imposed | imposed | LR 18.1 on 10, p 0.053",
      "Negativity | holds here | at base point | breaks in 48 rows, 1.0\u2009% by weight",
      "Monotonicity | holds here | at base point | breaks in 1 row, below 0.1\u2009% by weight",
    ]);
  });

  it("says of which the percentage is, where rows do not weigh the same", () => {
    const counted = { breaks: 48, weightedShareThatHolds: 1 - 48 / 4812 };
    const unweighted = { ...checks, sample: { rows: 4812, negativity: counted, monotonicity: counted } };
    expect(lines(unweighted, [], { detail: true })[3]).toBe(
      "Negativity | holds here | at base point | breaks in 48 rows, 1.0\u2009%",
    );
  });

  it("says what is rejected, and that negativity breaks with its size", () => {
    const broken = { ...free, negativity: { stated: true, largest: 0.0121, standardError: 0.004, holds: false } };
    expect(lines(broken, [laitinen, rejected]).slice(1, 4)).toEqual([
      "Homogeneity | imposed | imposed | Laitinen p 0.072",
      "Symmetry | breaks | rejected | LR 31.4 on 10, p 0.001",
      "Negativity | breaks | breaks | largest 0.0121 (0.0040)",
    ]);
  });

  it("states no negativity without homogeneity", () => {
    const sample = { rows: 400, monotonicity: { breaks: 0, weightedShareThatHolds: 1 } };
    expect(lines({ ...unbound, sample }, [laitinen, rejected]).slice(1)).toEqual([
      "Homogeneity | holds here | not rejected | Laitinen p 0.072",
      "Symmetry | breaks | rejected | LR 31.4 on 10, p 0.001",
      "Negativity | not stated | not stated | needs homogeneity",
      "Monotonicity | holds | holds | in all 400 rows",
    ]);
  });

  it("tells one row as one, and the rows judged from the fewer that equations explain", () => {
    const whole = { breaks: 0, weightedShareThatHolds: 1 };
    const noteOf = (sample: object) => lines({ ...checks, sample: { ...checks.sample!, ...sample } }, [])[4];
    expect(noteOf({ rows: 1, monotonicity: whole })).toBe("Monotonicity | holds | holds | in the one row");
    expect(noteOf({ rows: 338, equations: 337, monotonicity: whole })).toBe(
      "Monotonicity | holds | holds | in all 338 rows used, where T is 337",
    );
  });

  it("never says that an imposed law holds, nor one held by form", () => {
    for (const status of ["imposed", "by form"] as const) {
      const law = { size: 0, holds: true, status };
      for (const tests of [[], [homogeneity, rejected]]) {
        const [, second, third] = verdictsOf({ ...checks, homogeneity: law, symmetry: law }, tests);
        expect([second, third].map(({ figure, word }) => `${figure} ${word}`)).toEqual([
          "imposed imposed",
          "imposed imposed",
        ]);
      }
    }
  });

  it("says so when an imposed law does not hold in the numbers", () => {
    const off = { ...checks, homogeneity: { size: 0.002, holds: false, status: "imposed" as const } };
    expect(lines(off, [])[1]).toBe("Homogeneity | breaks | breaks | imposed, yet off by 0.0020");
  });

  it("goes by the corrected test where it changes the answer, and says so", () => {
    const near = { ...symmetry, pValue: 0.04, corrected: { statistic: 17.6, pValue: 0.061 } };
    expect(lines(free, [near])[2]).toBe("Symmetry | holds here | not rejected | corrected p 0.061");
    expect(lines(free, [near], { detail: true })[2]).toBe(
      "Symmetry | holds here | not rejected | corrected LR 17.6 on 10, p 0.061",
    );
  });
});

describe("sentences", () => {
  const system = (over: Partial<Parameters<typeof systemSentence>[0]> = {}) =>
    systemSentence({
      checks,
      tests: [homogeneity, symmetry],
      rows: 4812,
      expenditureElasticities: [
        { good: "grains", estimate: 0.664, standardError: 0.008 },
        { good: "meat & fish", estimate: 1.318, standardError: 0.009 },
        { good: "other", estimate: 1.01, standardError: 0.1 },
      ],
      ...over,
    });

  it("of a system: classes of goods beyond doubt, then violations", () => {
    expect(system()).toBe(
      "Meat & fish is a luxury and grains a necessity at the base point. Negativity breaks in 48 of 4,812 rows.",
    );
    expect(system({ tests: [test("homogeneity", 60, 5, 1e-9), rejected] })).toContain(
      "The data reject homogeneity and symmetry, which are imposed.",
    );
    expect(system({ checks: unbound, tests: [laitinen, rejected] })).toBe(
      "Meat & fish is a luxury and grains a necessity at the base point. Symmetry given homogeneity is rejected. Homogeneity is not rejected. It is not imposed either, so negativity cannot be stated.",
    );
    expect(system({ expenditureElasticities: [] })).toMatch(
      /^No good is a luxury or a necessity beyond doubt at the base point\./,
    );
  });

  it("of a system whose estimates depend on units", () => {
    expect(system({ unitsMatterBy: "Stone's index" })).toMatch(
      / Prices are not normalised, so with Stone's index the estimates depend on their units\.$/,
    );
  });

  it("of a matrix: what it is at its point, and where it breaks", () => {
    const { at, ...slutsky } = exampleFindings().slutsky;
    const sample = {
      ...slutsky.sample!,
      rows: 4812,
      breaks: 48,
      breaksInRichestTenth: 44,
      goods: ["grains", "meat & fish"],
    };
    expect(slutskySentence({ at: { ...at, checks }, pointName: "base point", sample })).toBe(
      "The matrix is symmetric and negative semidefinite at the base point. Negativity breaks in 48 of 4,812 rows, 44 of them in the richest tenth, most often through grains and meat & fish.",
    );
    expect(slutskySentence({ at: { ...at, checks: unbound }, pointName: "mean" })).toBe(
      "The matrix is not symmetric, by up to 0.020 at the sample mean. Without homogeneity, negativity cannot be stated.",
    );
    const broken = { ...free, negativity: { stated: true, largest: 0.0121, standardError: 0.004, holds: false } };
    expect(slutskySentence({ at: { ...at, checks: broken }, pointName: "row 12" })).toBe(
      "The matrix is not symmetric, by up to 0.020, and not negative semidefinite at row 12: the largest eigenvalue is 0.0121 (0.0040).",
    );
  });

  it("of data: how many rows are used and what took the others", () => {
    const left = (reason: "keep" | "missing value" | "total not positive", count: number) => ({
      reason,
      label: "",
      count,
      rows: [],
      strip: [],
    });
    expect(dataSentence({ accounting: { uploaded: 338, used: 338, leftOut: [] } })).toBe("All 338 rows are used.");
    expect(
      dataSentence({
        accounting: {
          uploaded: 4938,
          used: 4812,
          leftOut: [left("keep", 124), left("missing value", 1), left("total not positive", 1)],
        },
      }),
    ).toBe(
      "4,812 of 4,938 rows are used. Of the 126 left out, 124 fall to keep, 1 lacks a value and 1 bought nothing.",
    );
  });
});
