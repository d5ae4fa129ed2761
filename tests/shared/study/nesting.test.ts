import { describe, expect, it } from "vitest";
import { type SystemFinding, type SystemSpecification, systemSpecification } from "../../../shared/schemas/system.ts";
import { type EstimatedSystem, nestingOf } from "../../../shared/study/nesting.ts";
import { besideEachOther } from "../../../shared/study/specification-differences.ts";

const asked = (keys: Record<string, unknown> = {}): SystemSpecification =>
  systemSpecification.parse({ kind: "system", data: "survey", form: "aids", ...keys });

/** What nesting needs of a finding; nothing else of it is looked at. */
const found = (changes: Partial<SystemFinding> = {}) =>
  ({
    dataFingerprint: "a".repeat(64),
    rows: 900,
    standardErrors: "conventional",
    estimator: "maximum likelihood",
    aic: 12,
    ...changes,
  }) as SystemFinding;

const system = (
  name: string,
  keys: Record<string, unknown> = {},
  changes: Partial<SystemFinding> = {},
): EstimatedSystem => ({ name, specification: asked(keys), finding: found(changes) });

const reason = (left: EstimatedSystem, right: EstimatedSystem) => {
  const nesting = nestingOf(left, right);
  return nesting.isNested ? "nested" : nesting.reason;
};

describe("two systems of which one is a special case of the other", () => {
  it.each([
    [{ impose: ["homogeneity", "symmetry"] }, {}, "left", ["imposes homogeneity and symmetry"]],
    [{}, { demographics: ["urban"] }, "left", ["leaves out urban"]],
    [{ demographics: ["urban"] }, {}, "right", ["leaves out urban"]],
    [{ form: "quaids" }, {}, "right", ["has no quadratic terms"]],
    [{ form: "easi", degree: 2 }, { form: "easi", degree: 4 }, "left", ["has Engel curves of degree 2 only"]],
    [{ trend: true }, {}, "right", ["has no trend"]],
    [{ season: { period: 12, harmonics: 2 } }, { season: { period: 12 } }, "left", ["has a smoother season"]],
    [{}, { demographics: ["urban"], trend: true }, "left", ["leaves out urban", "has no trend"]],
  ] as const)("%j and %j", (left, right, smaller, tests) => {
    expect(nestingOf(system("one", left), system("other", right))).toEqual({ isNested: true, smaller, tests });
  });

  it("is the same whichever way restrictions are ordered, and then there is nothing to test", () => {
    const [one, other] = [
      ["homogeneity", "symmetry"],
      ["symmetry", "homogeneity"],
    ].map((impose) => ({ impose }));
    expect(reason(system("one", one), system("other", other))).toMatch(/the same system/);
  });
});

describe("two systems no likelihood ratio is formed of, and why", () => {
  it.each([
    ["another form", system("a", { form: "les" }), system("b"), /les and aids are different forms/],
    [
      "each without what the other has",
      system("a", { demographics: ["urban"] }),
      system("b", { trend: true }),
      /neither is a special case of the other: a has no trend, and b leaves out urban/,
    ],
    ["another fixed constant", system("a", { alpha0: 1 }), system("b"), /alpha0 differs: 1 and 0/],
    [
      "another index",
      system("a", { form: "la-aids", index: "stone" }),
      system("b", { form: "la-aids" }),
      /index differs: stone and tornqvist/,
    ],
    [
      "other data",
      system("a", {}, { dataFingerprint: "b".repeat(64) }),
      system("b", { trend: true }),
      /different data/,
    ],
    ["other rows", system("a", {}, { rows: 899 }), system("b", { trend: true }), /a rests on 899 rows and b on 900/],
    [
      "robust errors",
      system("a"),
      system("b", { trend: true }, { standardErrors: "clustered" }),
      /b asks for clustered errors/,
    ],
    [
      "no maximum",
      system("a", {}, { aic: undefined, estimator: "least squares" }),
      system("b", { trend: true }),
      /a is estimated by least squares, which does not maximise/,
    ],
    [
      "a curvature imposed",
      system("a", {}, { curvature: {} as SystemFinding["curvature"] }),
      system("b", { trend: true }),
      /a imposes negativity/,
    ],
    [
      "a first step",
      system("a", {}, { zeros: {} as SystemFinding["zeros"] }),
      system("b", { trend: true }),
      /a rests on a first step/,
    ],
    [
      "changes against shares",
      system("a", {}, { equations: { explains: "changes of shares", leftOut: 1, because: [], gaps: 0 } }),
      system("b"),
      /a explains changes of shares and b shares/,
    ],
  ] as const)("%s", (_, left, right, words) => {
    expect(reason(left, right)).toMatch(words);
  });
});

describe("specifications side by side", () => {
  it("have every key either gives or takes by default, in words", () => {
    const keys = besideEachOther(
      asked({ demographics: ["log_size", "urban"], "standard errors": { cluster: "village" } }),
      asked({ form: "quaids", impose: ["homogeneity"], trend: true }),
    );
    const by = Object.fromEntries(keys.map(({ key, ...rest }) => [key, rest]));
    expect(by.form).toEqual({ left: "aids", right: "quaids", isSame: false });
    expect(by.demographics).toEqual({ left: "log_size, urban", right: "none", isSame: false });
    expect(by["standard errors"]).toEqual({ left: "cluster: village", right: "conventional", isSame: false });
    expect(by.trend).toEqual({ right: "yes", isSame: false });
    expect(by.estimator).toEqual({ left: "maximum likelihood", right: "maximum likelihood", isSame: true });
    expect(by.index).toBeUndefined();
  });

  it("do not differ by the order of restrictions or a default written out", () => {
    const [left, right] = [
      asked({ form: "la-aids", impose: ["homogeneity", "symmetry"] }),
      asked({ form: "la-aids", impose: ["symmetry", "homogeneity"], index: "tornqvist" }),
    ];
    expect(besideEachOther(left, right).every(({ isSame }) => isSame)).toBe(true);
  });
});
