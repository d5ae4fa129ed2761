import { describe, expect, it } from "vitest";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { SYSTEM_NAMES } from "../../../shared/systems/names.ts";
import { ownTime } from "../../support/own-time.ts";

const survey =
  "upload: purchases.csv\ngoods:\n  grains: {price: p_grains, expenditure: e_grains}\n  dairy: {price: p_dairy, expenditure: e_dairy}\nderive: {log_size: log(members)}\n";
const uploads = [
  {
    name: "purchases.csv",
    sha256: "0".repeat(64),
    columns: [
      ...["p_grains", "e_grains", "p_dairy", "e_dairy", "members", "urban"].map((name) => ({
        name,
        type: "number" as const,
      })),
      { name: "village", type: "text" as const },
    ],
  },
];

type Given = [name: string, kind: string, source: string];
function resolve(...cells: Given[]) {
  const sources = cells.map(([name, kind, source], i) => ({
    id: `c${i}`,
    name,
    kind,
    source,
    order: String.fromCharCode(97 + i),
  }));
  return resolveCells(sources, uploads);
}
function told(name: string, ...cells: Given[]) {
  return resolve(...cells)
    .filter((cell) => cell.name === name)
    .flatMap(({ problems }) => problems.map(({ sentence }) => sentence));
}
const DATA: Given = ["survey", "data", survey];
const BASE: Given = [
  "base",
  "system",
  "data: survey\nform: aids\ndemographics: [log_size, urban]\nimpose: [homogeneity]",
];

describe("resolveCells", () => {
  it("reads a sound study", () => {
    const cells = resolve(DATA, BASE, ["matrix", "slutsky", "system: base"]);
    expect(cells.map(({ problems }) => problems)).toEqual([[], [], []]);
    expect(cells.map(({ reads }) => reads)).toEqual([[], ["survey"], ["base"]]);
    expect(cells.map(({ specification }) => specification?.kind)).toEqual(["data", "system", "slutsky"]);
  });

  it("tells unknown columns with the nearest, derived ones included", () => {
    expect(
      told("by region", DATA, ["by region", "system", "data: survey\nform: aids\ndemographics: [log_size, urbn]"]),
    ).toEqual(["survey has no column urbn. The nearest is urban."]);
    expect(told("s", DATA, ["s", "system", "data: survey\nform: aids\ndemographics: [log_siz]"])).toEqual([
      "survey has no column log_siz. The nearest is log_size.",
    ]);
    expect(told("survey", ["survey", "data", survey.replace("p_dairy", "p_diary")])).toEqual([
      "purchases.csv has no column p_diary. The nearest is p_dairy.",
    ]);
  });

  it("finds instruments and the columns of two steps that the data lack", () => {
    expect(told("s", DATA, ["s", "system", "data: survey\nform: aids\ninstruments: [urbn]"])[0]).toMatch(
      /survey has no column urbn/,
    );
    expect(told("s", DATA, ["s", "system", "data: survey\nform: aids\nzeros: {two-step: [urban, siz]}"])).toEqual([
      expect.stringMatching(/survey has no column siz/),
    ]);
    expect(told("s", DATA, ["s", "system", "data: survey\nform: aids\ninstruments: [village]"])[0]).toMatch(
      /instruments need numbers/,
    );
  });

  it("tells a text column where numbers are needed", () => {
    expect(told("s", DATA, ["s", "system", "data: survey\nform: aids\ndemographics: [village]"])[0]).toMatch(
      /^village of survey is a text column/,
    );
  });

  it("tells unknown uploads, goods and cells", () => {
    expect(told("survey", ["survey", "data", survey.replace("purchases", "purchase")])).toEqual([
      "No upload is called purchase.csv. The nearest is purchases.csv.",
    ]);
    expect(told("s", DATA, ["s", "system", "data: survey\nform: aids\ndropped: diary"])).toEqual([
      "survey has no good diary. The nearest is dairy.",
    ]);
    expect(told("m", DATA, BASE, ["m", "slutsky", "system: bases"])).toEqual([
      "No cell is called bases. The nearest is base.",
    ]);
    expect(told("m", DATA, ["m", "slutsky", "system: base"])).toEqual([
      "No cell is called base. The study has no system cell yet.",
    ]);
  });

  it("tells a cell of the wrong kind", () => {
    expect(told("matrix", DATA, BASE, ["matrix", "slutsky", "system: survey"])).toEqual([
      "matrix reads survey, which is a data cell; system names a system cell.",
    ]);
  });

  it("tells names given twice, on the later cell only", () => {
    const cells = resolve(DATA, ["survey", "data", survey]);
    expect(cells.map(({ problems }) => problems.length)).toEqual([0, 1]);
  });

  it("tells which goods have no price of one's own", () => {
    expect(told("m", DATA, BASE, ["m", "slutsky", "system: base\nat: {prices: {grains: 2}, x: 5}"])).toEqual([
      "prices has 1 good, the system has 2 goods: dairy has no price.",
    ]);
    expect(told("m", DATA, BASE, ["m", "slutsky", "system: base\nat: {prices: {grains: 2, diary: 3}, x: 5}"])).toEqual([
      "survey has no good diary. The nearest is dairy.",
    ]);
  });

  it("tells of elasticities: columns to group by, prices, and an index that cannot move", () => {
    const of = (keys: string) => told("e", DATA, BASE, ["e", "elasticities", `system: base\n${keys}`]);
    expect(of("groups: {of: village}")).toEqual([]);
    expect(of("groups: {of: log_size, quantiles: 4}")).toEqual([]);
    expect(of("groups: {of: total expenditure, quantiles: 5}\nover: rows")).toEqual([]);
    expect(of("groups: {of: urbane}")).toEqual(["purchases.csv has no column urbane. The nearest is urban."]);
    expect(of("groups: {of: village, quantiles: 5}")).toEqual(["village is a text column and has no quantiles."]);
    expect(of("at: {prices: {grains: 2}, x: 5}")).toEqual([
      "prices has 1 good, the system has 2 goods: dairy has no price.",
    ]);
    expect(of("index: exact")).toEqual([
      "exact lets the weights of Stone's index in la-aids move; base is aids. Write held.",
    ]);
    const stone: Given = ["base", "system", "data: survey\nform: la-aids\nindex: stone"];
    expect(told("e", DATA, stone, ["e", "elasticities", "system: base\nindex: exact"])).toEqual([]);
  });

  it("tells of a price change: goods, columns of needs and of groups", () => {
    const of = (keys: string) => told("c", DATA, BASE, ["c", "price change", `system: base\n${keys}`]);
    const needs = "equivalence scale: {square root of: members}";
    expect(
      of(`prices: {dairy: {to: 2}}\n${needs}\ngroups: {of: expenditure per equivalent adult, quantiles: 5}`),
    ).toEqual([]);
    expect(of("equivalence scale: log_size")).toEqual([]);
    expect(of("prices: {diary: {to: 2}}")).toEqual(["survey has no good diary. The nearest is dairy."]);
    expect(of("equivalence scale: {square root of: membres}")).toEqual([
      "survey has no column membres. The nearest is members.",
    ]);
    expect(of("equivalence scale: vilage")[0]).toContain("survey has no column vilage.");
    expect(of("groups: {of: urbane}")).toEqual(["purchases.csv has no column urbane. The nearest is urban."]);
    expect(of("at: {prices: {grains: 2}, x: 5}")).toEqual([
      "prices has 1 good, the system has 2 goods: dairy has no price.",
    ]);
  });

  it("tells twenty unknown columns at most, in no time", () => {
    const goods = Array.from({ length: 500 }, (_, i) => `  g${i}: {price: price${i}, quantity: quantity${i}}`).join(
      "\n",
    );
    const many = Array.from({ length: 3000 }, (_, i) => ({ name: `column${i}`, type: "number" as const }));
    const source = `upload: purchases.csv\ngoods:\n${goods}\n`;
    let read = 0;
    const resolve = () => {
      // What was read before is remembered: another text every time.
      const another = `${source}# ${read++}`;
      const [cell] = resolveCells(
        [{ id: "c", name: "survey", kind: "data", order: "a", source: another }],
        [{ ...uploads[0], columns: many }],
      );
      expect(cell.problems).toHaveLength(20);
    };
    expect(ownTime(resolve, 1)).toBeLessThan(5_000);
  });

  it("marks a wrong reference at its place in the source", () => {
    const source = "form: aids\ndata: servey\n";
    const [, cell] = resolve(DATA, ["s", "system", source]);
    const place = cell.problems[0].place;
    expect(source.slice(place?.from, place?.to)).toBe("servey");
    expect(cell.problems[0].nearest).toBe("survey");
  });
});

describe("like", () => {
  it("takes over every key not given, through several cells", () => {
    const cells = resolve(
      DATA,
      BASE,
      ["b", "system", "like: base\ndemographics: []"],
      ["c", "system", "like: b\nform: les"],
    );
    expect(cells.flatMap(({ problems }) => problems)).toEqual([]);
    expect(cells[3].specification).toMatchObject({
      data: "survey",
      form: "les",
      demographics: [],
      impose: ["homogeneity"],
    });
    expect(cells[3].reads).toEqual(["survey"]);
  });

  it("takes over no index with a form of its own", () => {
    const linear: Given = ["linear", "system", "data: survey\nform: la-aids\nindex: stone"];
    const cells = resolve(
      DATA,
      linear,
      ["exact", "system", "like: linear\nform: aids"],
      ["same", "system", "like: linear\nimpose: [homogeneity]"],
    );
    expect(cells[2].specification).toMatchObject({ form: "aids" });
    expect(cells[2].specification).not.toHaveProperty("index");
    expect(cells[3].specification).toMatchObject({ form: "la-aids", index: "stone" });
  });

  it("tells what a taken over key does wrong where it was taken over", () => {
    expect(told("b", DATA, ["a", "system", "data: survey"], ["b", "system", "like: a"])).toEqual([
      `As taken over from a: A system cell needs form: one of ${SYSTEM_NAMES.join(", ")}.`,
    ]);
  });

  it("refuses circles", () => {
    const cells = resolve(DATA, ["a", "system", "like: b\nform: aids"], ["b", "system", "like: a\ndata: survey"]);
    expect(cells[1].problems.map(({ sentence }) => sentence)).toEqual([
      "a reads b reads a: cells cannot read each other in a circle.",
    ]);
    expect(told("a", DATA, ["a", "system", "like: a"])).toContain("a reads itself.");
  });
});
