import { describe, expect, it } from "vitest";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";

const told = (source: string) => parseCell("figure", source).problems.map(({ sentence }) => sentence);

describe("what a figure's source may say", () => {
  it.each([
    "system: base\nshow: engel curves",
    "system: base\nshow: demand curve\ngoods: [grains]\nat: {x: quantile 0.9}",
    "system: base\nshow: elasticities\ngroups: {of: region}\nlevel: 0.9",
    "system: base\nshow: fit of shares",
    "system: base\nshow: largest eigenvalue",
    "price change: levy\nshow: incidence",
    "data: survey\nshow: shares by group\ngroups: {of: total expenditure, quantiles: 5}",
    "data: survey\nshow: price distribution\ngoods: [grains]",
  ])("%j", (source) => {
    expect(told(source)).toEqual([]);
  });

  it.each([
    ["show: engel curves", /^show: engel curves is drawn of a system cell: name it under system\.$/],
    ["data: survey\nshow: engel curves", /engel curves is drawn of a system cell/],
    ["system: base\ndata: survey\nshow: engel curves", /a figure reads one cell, and system and data are named/],
    ["system: base\nshow: demand curve", /demand curve is of one good: name it/],
    ["system: base\nshow: demand curve\ngoods: [a, b]", /demand curve is of one good/],
    ["system: base\nshow: largest eigenvalue\ngoods: [a]", /of all goods together: leave goods out/],
    ["system: base\nshow: fit of shares\nat: mean", /stands at no one point: leave at out/],
    ["system: base\nshow: engel curves\ngroups: {of: region}", /has no groups of its own/],
    ["system: base\nshow: elasticities\nat: mean\ngroups: {of: region}", /at is one point and groups are several/],
    ["system: base\nshow: engel curves\ngoods: [a, a]", /goods has a twice/],
    ["system: base\nshow: engle curves", /the nearest to engle curves is engel curves/],
  ])("and %j is told in a sentence", (source, sentence) => {
    const problems = told(source);
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatch(sentence);
  });
});

const SURVEY =
  "upload: purchases.csv\ngoods:\n  grains: {price: pg, quantity: qg}\n  dairy: {price: pd, quantity: qd}\n";
const COLUMNS = ["pg", "qg", "pd", "qd", "region"].map((name) => ({ name, type: "number" as const }));
const UPLOADS = [{ name: "purchases.csv", sha256: "a".repeat(64), columns: COLUMNS }];

function study(figure: string, levy = "system: base\nprices: {dairy: {per cent: 10}}\n") {
  const cells = [
    ["survey", "data", SURVEY],
    ["base", "system", "data: survey\nform: aids\nimpose: [homogeneity, symmetry]\n"],
    ["levy", "price change", levy],
    ["figure", "figure", figure],
  ];
  const resolved = resolveCells(
    cells.map(([name, kind, source], i) => ({ id: name, name, kind, source, order: `a${i}` })),
    UPLOADS,
  );
  return { figure: resolved[3], fingerprint: fingerprintCells(resolved, UPLOADS).get("figure") };
}

describe("a figure among the cells of its study", () => {
  it("reads the one cell it names", () => {
    expect(study("price change: levy\nshow: incidence").figure).toMatchObject({ reads: ["levy"], problems: [] });
    expect(study("data: survey\nshow: shares by group").figure).toMatchObject({ reads: ["survey"], problems: [] });
  });

  it("is told which good is not there, at its place, and the nearest", () => {
    const source = "system: base\nshow: engel curves\ngoods: [grains, diary]\n";
    const [problem] = study(source).figure.problems;
    expect(problem).toMatchObject({
      sentence: "survey has no good diary. The nearest is dairy.",
      key: ["goods", "1"],
      nearest: "dairy",
      place: { from: source.indexOf("diary") },
    });
  });

  it("is told of a column to group by that is not there, of data as of systems", () => {
    for (const source of ["system: base\nshow: elasticities\n", "data: survey\nshow: shares by group\n"]) {
      const [problem] = study(`${source}groups: {of: regoin}\n`).figure.problems;
      expect(problem).toMatchObject({ key: ["groups", "of"], nearest: "region" });
    }
  });

  it("is another figure when the price change beneath it is another", () => {
    const asked = "price change: levy\nshow: incidence";
    const dearer = "system: base\nprices: {dairy: {per cent: 20}}\n";
    expect(study(asked).fingerprint).toMatch(/^[0-9a-f]{64}$/);
    expect(study(asked, dearer).fingerprint).not.toBe(study(asked).fingerprint);
  });
});
