import { describe, expect, it } from "vitest";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { resolveParsed } from "../../../shared/study/resolve.ts";
import { parseStudyFile } from "../../../shared/study/study-file.ts";

const FILE = `study: Weekly tuna purchases
cells:
  weeks:
    # the data
    kind: data
    upload: tuna-weekly.csv
    goods:
      brand1: {price: p1, quantity: q1}
      brand2: {price: p2, quantity: q2}      # two
    time: week
  base:
    data: weeks
    kind: system

    form: aids
  matrix: {kind: slutsky, system: base, at: {row: 3}}
`;

describe("parseStudyFile", () => {
  it("reads title and cells, each with the source it would have in the workspace", () => {
    const { title, cells, problems } = parseStudyFile(FILE);
    expect(title).toBe("Weekly tuna purchases");
    expect(problems).toEqual([]);
    expect(cells.map(({ name, kind }) => [name, kind])).toEqual([
      ["weeks", "data"],
      ["base", "system"],
      ["matrix", "slutsky"],
    ]);
    expect(cells[0].source).toBe(
      "# the data\nupload: tuna-weekly.csv\ngoods:\n  brand1: {price: p1, quantity: q1}\n  brand2: {price: p2, quantity: q2}      # two\ntime: week\n",
    );
    expect(cells[1].source).toBe("data: weeks\n\nform: aids\n");
    expect(cells[2].source).toBe("system: base\nat: {row: 3}\n");
    for (const { kind, source, parsed } of cells)
      expect(parseCell(kind, source).specification).toEqual(parsed.specification);
    expect(cells.map(({ order }) => order).toSorted()).toEqual(cells.map(({ order }) => order));
  });

  it("places problems in the file", () => {
    const text = FILE.replace("form: aids", "form: aidss").replace("system: base", "system: bass");
    const cells = resolveParsed(parseStudyFile(text).cells, []);
    const marks = cells.flatMap(({ problems }) =>
      problems.map(({ place }) => [place?.line, text.slice(place?.from, place?.to)]),
    );
    expect(marks).toEqual([
      [6, "tuna-weekly.csv"],
      [15, "aidss"],
      [16, "bass"],
    ]);
  });

  it.each([
    [
      "study: a\ncels: {}",
      [
        "cels is not a key of a study file: the nearest is cells.",
        "A study file needs cells: a name for each, and its keys below it.",
      ],
    ],
    [
      "cells:\n  a!: {kind: data}",
      ["a!: a cell's name begins with a letter and has letters, digits, spaces, - and _ only."],
    ],
    [
      "cells:\n  a: {upload: u}",
      ["a needs kind: one of data, system, tests, elasticities, slutsky, price change, figure, text."],
    ],
    ["- a", ["A study file has the keys study and cells."]],
    ["cells: {a: {kind: data}, a: {kind: data}}", ["a is given twice; keep one."]],
  ])("refuses %j", (text, sentences) => {
    expect(parseStudyFile(text).problems.map(({ sentence }) => sentence)).toEqual(sentences);
  });
});
