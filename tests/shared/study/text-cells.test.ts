import { describe, expect, it } from "vitest";
import type { CellStatus } from "../../../shared/schemas/status.ts";
import { LONGEST_TEXT } from "../../../shared/schemas/text.ts";
import { LONGEST_SOURCE } from "../../../shared/study/document.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { resolveCells, resolveParsed } from "../../../shared/study/resolve.ts";
import { cellStatuses } from "../../../shared/study/states.ts";
import { parseStudyFile } from "../../../shared/study/study-file.ts";

const SURVEY =
  'upload: purchases.csv\ngoods:\n  Grains: {price: p1, expenditure: e1}\n  "Bread, rolls": {price: p2, expenditure: e2}\n  Meat & fish: {price: p3, expenditure: e3}\n';
const uploads = [
  {
    name: "purchases.csv",
    sha256: "0".repeat(64),
    columns: ["p1", "p2", "p3", "e1", "e2", "e3", "urban"].map((name) => ({ name, type: "number" as const })),
  },
];

type Given = [name: string, kind: string, source: string];
const DATA: Given = ["survey", "data", SURVEY];
const BASE: Given = ["base", "system", "data: survey\nform: aids\ndemographics: [urban]\n"];
const MATRIX: Given = ["matrix", "slutsky", "system: base\n"];
const LAWS: Given = ["laws", "tests", "system: base\n"];
const FIFTHS: Given = ["fifths", "elasticities", "system: base\ngroups: {of: total expenditure, quantiles: 5}\n"];
const MEAN: Given = ["mean", "elasticities", "system: base\n"];

function sources(...cells: Given[]) {
  return cells.map(([name, kind, source], i) => ({ id: `c${i}`, name, kind, source, order: `a${i}` }));
}
const study = (text: string) => sources(DATA, BASE, MATRIX, LAWS, FIFTHS, MEAN, ["argument", "text", text]);
const argument = (text: string) => resolveCells(study(text), uploads).find(({ name }) => name === "argument")!;
const told = (text: string) => argument(text).problems.map(({ sentence }) => sentence);

describe("a text cell", () => {
  it("holds prose, which is no YAML, up to the length of any source", () => {
    expect(LONGEST_TEXT).toBe(LONGEST_SOURCE);
    expect(parseCell("text", "key: [unclosed\n\t*").specification).toEqual({
      kind: "text",
      text: "key: [unclosed\n\t*",
    });
    const { specification, problems } = parseCell("text", "a".repeat(LONGEST_SOURCE + 1));
    expect(specification).toBeUndefined();
    expect(problems[0].sentence).toBe("The text has 32,769 characters; at most 32,768 are read.");
  });

  it("reads the cells it quotes, in the order of its text", () => {
    const { reads, problems } = argument("{matrix: rows that hold} and {base: eta, meat & fish}, {matrix: rows}");
    expect([reads, problems]).toEqual([["matrix", "base"], []]);
    expect(argument("no number").reads).toEqual([]);
  });

  it.each([
    "{base: eta, grains} {base: η, GRAINS, alone} {base: gamma, grains, meat & fish, error}",
    '{base: demographic, urban, "Bread, rolls"} {base: rows} {survey: mean share, grains}',
    "{matrix: entry, grains, meat & fish} {matrix: eigenvalue, 2} {matrix: largest eigenvalue, alone}",
    "{laws: p, symmetry} {laws: statistic, homogeneity, laitinen} {laws: p, demographics, urban, score}",
    "{fifths: eta, grains, lowest fifth} {mean: uncompensated, grains, grains} {fifths: rows, lowest fifth}",
  ])("may quote %s", (text) => expect(told(text)).toEqual([]));

  it.each([
    ["{bass: rows}", "No cell is called bass. The nearest is base. Braces that quote nothing are written \\{.", "base"],
    ["{base: etaa, grains}", "base has no etaa to quote. The nearest is eta.", "eta"],
    ["{matrix: eta, grains}", /^matrix has no eta to quote\. There are entry, compensated, eigenvalue,/, undefined],
    ["{base: eta, grain}", "base has no good grain. The nearest is Grains.", "Grains"],
    ["{base: eta, bread rolls}", "base has no good bread rolls. The nearest is Bread, rolls.", '"Bread, rolls"'],
    ["{base: eta}", "eta of base needs a good: Grains, Bread, rolls, Meat & fish.", undefined],
    ["{base: gamma, grains}", /^gamma of base needs two goods, parted by a comma:/, undefined],
    ["{base: demographic, urbn, grains}", "base has no demographic urbn. The nearest is urban.", "urban"],
    ["{base: rows, grains}", "rows of base takes nothing after it; grains is too much.", undefined],
    ["{base: eta, grains, grains}", /takes one good, and may end with alone or error; grains is too much/, undefined],
    ["{mean: eta, grains, lowest fifth}", /lowest fifth is too much/, undefined],
    ["{laws: p}", /^p of laws needs a hypothesis: homogeneity/, undefined],
    ["{laws: p, symetry}", "symetry is not a hypothesis. The nearest is symmetry.", "symmetry"],
    ["{laws: p, symmetry, walt}", "walt is not a statistic. The nearest is wald.", "wald"],
    ["{matrix: eigenvalue}", "eigenvalue of matrix needs its rank, 1 being the largest.", undefined],
    ["{base: }", /^\{base: \} asks for nothing\. Of a system cell one may quote eta, alpha/, undefined],
    ["{argument: rows}", "argument is a text cell, which has no number to quote.", undefined],
    ["$\\eta = {base: eta, grains}$", /stands between dollar signs.*Quote it outside them\.$/, undefined],
  ])("refuses %s at its place", (text, sentence, nearest) => {
    const { problems, specification } = argument(`Here: ${text} so.`);
    expect(problems).toHaveLength(1);
    expect(problems[0].sentence).toMatch(
      sentence instanceof RegExp ? sentence : new RegExp(`^${literally(sentence)}$`),
    );
    expect(problems[0].nearest).toBe(nearest);
    expect(problems[0].place?.line).toBe(1);
    expect(problems[0].place?.from).toBeGreaterThanOrEqual(6);
    expect(specification).toBeUndefined();
  });

  it("leaves braces of a formula alone", () => expect(told("$\\frac{a}{b} x_{i: j}$")).toEqual([]));

  it("says fifty mistakes at most", () => expect(told("{nobody: rows} ".repeat(200))).toHaveLength(50));

  it("has a fingerprint that follows what it quotes, not what that is called", () => {
    const of = (text: string, rename = "base", form = "aids") => {
      const cells = sources(DATA, [rename, "system", `data: survey\nform: ${form}\n`], ["argument", "text", text]);
      return fingerprintCells(resolveCells(cells, uploads), uploads).get("c2");
    };
    const first = of("{base: rows}");
    expect(first).toMatch(/^[0-9a-f]{64}$/);
    expect(of("{main: rows}", "main")).toBe(first);
    expect(of("{base: rows}", "base", "quaids")).not.toBe(first);
    expect(of("{base: aic}")).not.toBe(first);
  });
});

const literally = (text: string) => text.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");

describe("where a text cell stands", () => {
  const parts = { running: new Map(), failed: new Map(), stopped: new Map(), last: new Map(), aboutMs: new Map() };
  function state(text: string, found: (name: string) => boolean): CellStatus {
    const cells = resolveCells(study(text), uploads);
    const fingerprints = fingerprintCells(cells, uploads);
    const names = new Map(cells.map(({ id, name }) => [id, name]));
    const known = new Set([...fingerprints].flatMap(([id, one]) => (found(names.get(id)!) ? [one] : [])));
    return cellStatuses({ cells, fingerprints, found: known, ...parts }).at(-1)!;
  }
  const all = () => true;

  it("is as current as what it quotes, without a finding of its own being stored", () => {
    expect(state("{base: rows}", (name) => name !== "argument")).toMatchObject({ state: "current", reads: ["base"] });
    expect(state("nothing quoted", () => false).state).toBe("current");
    expect(state("{base: rows} {survey: rows used}", (name) => name === "survey")).toMatchObject({
      state: "out of date",
      because: "base is not current",
    });
    expect(state("{base: rows} {matrix: rows}", () => false).because).toBe("base and matrix are not current");
  });

  it("is a draft while nothing is written, and failed where it quotes what is not there", () => {
    expect(state("  \n", all)).toMatchObject({ state: "draft", because: "nothing is written yet" });
    expect(state("{bass: rows}", all).state).toBe("failed");
  });
});

describe("a text cell of a study file", () => {
  const FILE = `study: Weekly purchases
cells:
  survey:
    kind: data
    upload: purchases.csv
    goods:
      Grains: {price: p1, expenditure: e1}
      Dairy: {price: p2, expenditure: e2}
  argument:
    kind: text
    text: |
      The budget of {survey: rows used} households.

      - of {survey: mean share, grainz}
      - and {servey: rows used}
  after: {kind: text, text: "{survey: rows} used"}
`;

  it("is the text alone in the workspace", () => {
    const { cells, problems } = parseStudyFile(FILE);
    expect(problems).toEqual([]);
    expect(cells[1].source).toBe(
      "The budget of {survey: rows used} households.\n\n- of {survey: mean share, grainz}\n- and {servey: rows used}\n",
    );
    expect(cells[1].parsed.specification).toEqual({ kind: "text", text: cells[1].source });
    expect(cells[2].source).toBe("{survey: rows} used");
  });

  it("has its mistakes at their places in the file", () => {
    const cells = resolveParsed(parseStudyFile(FILE).cells, uploads);
    const marks = cells.flatMap(({ problems }) =>
      problems.map(({ place, nearest }) => [place?.line, FILE.slice(place?.from, place?.to), nearest]),
    );
    expect(marks).toEqual([
      [14, "grainz", "Grains"],
      [15, "servey", "survey"],
      [16, '"{survey: rows} used"', undefined],
    ]);
  });

  it("needs its text", () => {
    const cells = resolveParsed(parseStudyFile("study: a\ncells:\n  argument:\n    kind: text\n").cells, []);
    expect(cells[0].problems[0].sentence).toMatch(/^A text cell needs text/);
  });
});
