import { describe, expect, it } from "vitest";
import { LONGEST_SOURCE, LONGEST_STUDY_FILE, readDocument } from "../../../shared/study/document.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { SYSTEM_NAMES } from "../../../shared/systems/names.ts";
import { ownTime } from "../../support/own-time.ts";

const sentences = (kind: string, source: string) => parseCell(kind, source).problems.map(({ sentence }) => sentence);
const marked = (source: string, kind: string) =>
  parseCell(kind, source).problems.map(({ place }) => source.slice(place?.from, place?.to));

describe("a sound source", () => {
  it("is a specification with the defaults said", () => {
    const { specification, problems } = parseCell("system", "data: survey\nform: aids # exact\n");
    expect(problems).toEqual([]);
    expect(specification).toEqual({
      kind: "system",
      data: "survey",
      form: "aids",
      impose: [],
      estimator: "maximum likelihood",
      demographics: [],
      alpha0: 0,
      "standard errors": "conventional",
    });
  });

  it("reads the same restrictions in any order", () => {
    const one = parseCell("system", "data: a\nform: la-aids\nimpose: [symmetry, homogeneity, symmetry]");
    const other = parseCell(
      "system",
      "index: tornqvist\nform: la-aids\ndata: a\nimpose:\n  - homogeneity\n  - symmetry",
    );
    expect(one.specification).toEqual(other.specification);
  });

  it.each(["base point", "mean", "{row: 12}", "{x: quantile 0.9}", "{prices: {a: 2, b: 3}, x: 10}"])(
    "may stand at %s",
    (at) => {
      expect(parseCell("slutsky", `system: base\nat: ${at}`).problems).toEqual([]);
    },
  );
});

describe("wrong words", () => {
  it("are told with the nearest valid one, at their place", () => {
    const source = "data: survey\nform: aid\n";
    expect(parseCell("system", source).problems).toEqual([
      {
        sentence: `form is not one of ${SYSTEM_NAMES.join(", ")}: the nearest to aid is aids.`,
        key: ["form"],
        place: { line: 2, column: 7, from: 19, to: 22 },
        nearest: "aids",
      },
    ]);
  });

  it.each([
    [
      "system",
      "data: a\nfrom: aids",
      [
        `A system cell needs form: one of ${SYSTEM_NAMES.join(", ")}.`,
        "from is not a key of a system cell: the nearest is form.",
      ],
    ],
    [
      "system",
      "data: a\nform: aids\nimpose: [symetry]",
      ["impose has symetry, which is not one of homogeneity, symmetry: the nearest to symetry is symmetry."],
    ],
    ["system", "data: a\nform:", [`form is empty: one of ${SYSTEM_NAMES.join(", ")}.`]],
    ["system", "data: a\nform: aids\nimpose: homogeneity", ["impose needs a list: write impose: [homogeneity]."]],
    ["system", "data: a\nform: aids\nalpha0: three", ["alpha0 needs a number and has three."]],
    ["system", "data: a\nform: aids\nindex: stone", ["index belongs to la-aids; aids has none to choose."]],
    ["system", "data: a\nform: aids\ndemographics: [z, z]", ["demographics has z twice."]],
    [
      "system",
      "data: a\nform: aids\nstandard errors: robust",
      ["standard errors cannot be robust: conventional, heteroskedastic, by cluster, or by bootstrap."],
    ],
    [
      "system",
      "data: a\nform: aids\nstandard errors: {bootstrap: rows, block: 4}",
      ["block belongs to a bootstrap of blocks; one of rows has none."],
    ],
    [
      "system",
      "data: a\nform: aids\nstandard errors: {bootstrap: residuals, cluster: village}",
      ["cluster belongs to a bootstrap of clusters; one of residuals has none."],
    ],
    [
      "system",
      "data: a\nform: aids\nstandard errors: {bootstrap: rows, replicates: 5}",
      ["replicates is 5: it must be at least 20."],
    ],
    [
      "data",
      "upload: u\ngoods: {a: {price: p}, b: {price: p, quantity: q}}",
      ["a good needs two of price, quantity and expenditure, and has 1."],
    ],
    [
      "data",
      "upload: u\ngoods: {a: {prise: p, quantity: q}, b: {price: p, quantity: q}}",
      ["prise is not a key of a: the nearest is price."],
    ],
    [
      "elasticities",
      "system: b\nat: mean\ngroups: {of: urban}",
      ["at is one point and groups are several: give one of them."],
    ],
    [
      "elasticities",
      "system: b\nat: {row: 3}\nover: rows",
      ["at is one point, and over: rows goes over all rows or groups of them: give one of them."],
    ],
    [
      "elasticities",
      "system: b\nat: {x: quantile 0.9}\nshares: observed",
      ["shares are observed in rows, and none at this point: give the base point, the mean or a row."],
    ],
    ["elasticities", "system: b\nlevel: 95", ["level is too long or too large: at most 0.999."]],
    [
      "elasticities",
      "system: b\ngroups: {of: urban, quantile: 5}",
      ["quantile is not a key of groups: the nearest is quantiles."],
    ],
    ["data", "upload: u\ngoods: {a: {price: p, quantity: q}}", ["goods has 1 good; shares need at least 2."]],
    [
      "data",
      "upload: 7\ngoods: {a: {price: p, quantity: q}, b: {price: r, quantity: s}}",
      ['upload needs a text and has 7: write it in quotes, "7".'],
    ],
    [
      "slutsky",
      "system: b\nat: base pint",
      ["at is not one of base point, mean: the nearest to base pint is base point."],
    ],
    [
      "slutsky",
      "system: b\nat: {x: quantile 9}",
      ["x of at is quantile 9: a quantile is written quantile 0.9, between 0 and 1."],
    ],
    ["slutsky", "system: b\nat: {x: 3}", ["x of at is 3: write quantile 0.9, or give prices beside it."]],
    ["slutsky", "system: b\nat: {row: 0}", ["row of at is 0: it must be more than 0."]],
    ["slutsky", "system: b\nat: {prices: {a: -1}, x: 2}", ["a of prices is -1: it must be more than 0."]],
    [
      "tests",
      "of: [homogeneity]",
      [
        "A tests cell needs system: the name of the system cell whose restrictions are tested; or give data.",
        "of: homogeneity is a hypothesis about a system; of data only revealed preference can be tested.",
      ],
    ],
    ["tests", "system: b\ndata: d", ["data and system are both named: a tests cell reads one of them."]],
    [
      "tests",
      "system: b\nof: [homogeniety]\nlevel: 0.7",
      [
        "of has homogeniety, which is not one of homogeneity, symmetry, homogeneity and symmetry, demographics, quadratic terms, exogeneity, revealed preference: the nearest to homogeniety is homogeneity.",
        "level is too long or too large: at most 0.5.",
      ],
    ],
    [
      "sistem",
      "",
      [
        "sistem is not a kind of cell (data, system, tests, elasticities, slutsky, price change, figure, text): the nearest is system.",
      ],
    ],
    ["data", "just words", ["A data cell is written as keys, each with a colon, a space and its value."]],
    [
      "data",
      "kind: system\nupload: u\ngoods: {a: {price: p, quantity: q}, b: {price: p, quantity: q}}",
      ["kind has system; only data is offered."],
    ],
  ])("in a %s cell: %s", (kind, source, expected) => {
    expect(sentences(kind, source).toSorted()).toEqual(expected.toSorted());
  });

  it("mark the words themselves", () => {
    expect(marked("data: a\nfrom: aids\nform: aids", "system")).toEqual(["from"]);
    expect(marked("data: a\nform: aids\nimpose: [homogeneity, symetry]", "system")).toEqual(["symetry"]);
    expect(marked("upload: u\ngoods:\n  a: {price: p}\n  b: {price: p, quantity: q}\n", "data")).toEqual([
      "{price: p}",
    ]);
  });
});

describe("YAML that is refused", () => {
  it.each([
    ["form: aids\nform: les", "form is given twice; keep one."],
    ["data: &a x\nform: aids", "Anchors (&a) are not used here; remove it."],
    ["form: *a", "*a repeats an anchored value; write the value itself."],
    ["form: !!str aids", "Tags (words after !) are not used here; remove it."],
    ["form: !own aids", "Tags (words after !) are not used here; remove it."],
    ["form: aids\n---\nform: les", "One text holds one set of keys; remove the line ---."],
    ["impose: [homogeneity", "A closing ] is missing before this place."],
    ["\tform: aids", "Lines are indented with spaces, never with tabs."],
    ["data: a: b", "Two keys stand on one line; give each a line of its own."],
    ["? [a]\n: b", "A key is one word or a few, never a list or a map."],
  ])("%j", (source, sentence) => {
    const { problems, specification } = parseCell("system", source);
    expect(problems.map((problem) => problem.sentence)).toContain(sentence);
    expect(problems.every(({ place }) => place !== undefined)).toBe(true);
    expect(specification).toBeUndefined();
  });

  it("is not read at all when too long, and told with both numbers", () => {
    expect(sentences("system", `# ${"x".repeat(LONGEST_SOURCE)}`)).toEqual([
      "The text has 32,770 characters; at most 32,768 are read.",
    ]);
  });

  it("with many keys is read in a time that grows with them, not with their square", () => {
    const keys = Array.from({ length: 32_000 }, (_, i) => `k${i}: 1`);
    const reading = (count: number) => {
      const text = keys.slice(0, count).join("\n");
      return ownTime(() => expect(readDocument(text, LONGEST_STUDY_FILE).problems).toEqual([]), 2);
    };
    // Eight times the keys take eight times as long; were every pair of them looked at, more than thirty times.
    expect(reading(32_000)).toBeLessThan(20 * reading(4_000));
  });

  it("may be nested as deep as it likes without harm", () => {
    expect(sentences("system", "[".repeat(LONGEST_SOURCE)).length).toBeGreaterThan(0);
    expect(sentences("system", `data: ${"{a: ".repeat(3_000)}1${"}".repeat(3_000)}`).length).toBeGreaterThan(0);
  });

  it("drops no good without a word: records set __proto__ aside", () => {
    const goods = ["__proto__", "b", "c"].map((good) => `  ${good}: {price: p_${good}, quantity: q_${good}}`);
    expect(sentences("data", `upload: u\ngoods:\n${goods.join("\n")}`)).toEqual([
      "__proto__ names nothing here; take another name.",
    ]);
    expect(marked(`upload: u\ngoods:\n${goods.join("\n")}`, "data")).toEqual(["__proto__"]);
  });

  it("cannot reach an object's prototype", () => {
    expect(sentences("system", "data: a\nform: aids\n__proto__: {polluted: 1}")).toHaveLength(1);
    expect(({} as Record<string, unknown>).polluted).toBeUndefined();
  });
});
