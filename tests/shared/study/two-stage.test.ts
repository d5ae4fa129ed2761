import { describe, expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { sourcesAfterRenaming } from "../../../src/app/workspace/rename.ts";
import { TREE_GOODS, treeCsv } from "../../support/utility-tree-csv.ts";

const [head] = treeCsv(1).split("\n");
const uploads = [
  {
    name: "tree.csv",
    sha256: "0".repeat(64),
    columns: head.split(",").map((name) => ({ name, type: "number" as const })),
  },
];
const STAGES = "system: food\nwithin: budget\nas: food\n";

function study(changes: Readonly<Record<string, string>> = {}): CellSource[] {
  const given: Readonly<Record<string, readonly [kind: string, source: string]>> = {
    plates: ["data", `upload: tree.csv\n${TREE_GOODS.food}`],
    purse: ["data", `upload: tree.csv\n${TREE_GOODS.budget}`],
    food: ["system", "data: plates\nform: les\nconditional on: food\n"],
    budget: ["system", "data: purse\nform: les\n"],
    stages: ["elasticities", STAGES],
  };
  return Object.entries(given).map(([name, [kind, source]], i) => ({
    id: name,
    name,
    kind,
    source: changes[name] ?? source,
    order: String.fromCharCode(97 + i),
  }));
}

const told = (changes: Readonly<Record<string, string>>, cell = "stages") =>
  resolveCells(study(changes), uploads)
    .filter(({ name }) => name === cell)
    .flatMap(({ problems }) => problems.map(({ key, sentence }) => `${key?.join(".")}: ${sentence}`));
const stages = (keys: string) => told({ stages: keys });

describe("an elasticities cell within a broader system", () => {
  it("reads both systems", () => {
    const cells = resolveCells(study(), uploads);
    expect(cells.flatMap(({ problems }) => problems)).toEqual([]);
    expect(cells.find(({ name }) => name === "stages")?.reads).toEqual(["food", "budget"]);
  });

  it("has another fingerprint when anything below the broader system changes, and the same under new names", () => {
    const printOf = (cells: CellSource[]) => fingerprintCells(resolveCells(cells, uploads), uploads).get("stages");
    const before = printOf(study());
    expect(before).toMatch(/^[0-9a-f]{64}$/);
    expect(printOf(study({ purse: `upload: tree.csv\n${TREE_GOODS.budget}keep: quarter < 4\n` }))).not.toBe(before);
    expect(printOf(study({ stages: `${STAGES}unconditional: edgerton\n` }))).not.toBe(before);
    expect(printOf(study({ stages: `${STAGES}unconditional: carpentier guyomard\n` }))).toBe(before);

    const changed = sourcesAfterRenaming("budget", "whole purse", study());
    expect([...changed]).toEqual([["stages", STAGES.replace("budget", "whole purse")]]);
    const renamed = study(Object.fromEntries(changed)).map((cell) =>
      cell.name === "budget" ? { ...cell, name: "whole purse" } : cell,
    );
    expect(printOf(renamed)).toBe(before);
  });

  it("tells of systems and goods that are not there, with the nearest", () => {
    expect(stages("system: food\nwithin: bugdet\nas: food\n")).toEqual([
      "within: No cell is called bugdet. The nearest is budget.",
    ]);
    expect(stages("system: food\nwithin: purse\nas: food\n")).toEqual([
      "within: stages reads purse, which is a data cell; within names a system cell.",
    ]);
    expect(told({ stages: STAGES.replace("as: food", "as: foood"), food: "data: plates\nform: les\n" })).toEqual([
      "as: purse has no good foood. The nearest is food.",
    ]);
  });

  it("tells what cannot be a broader system, and a group that goes by two names", () => {
    expect(stages("system: food\nwithin: food\nas: food\n")).toEqual([
      "within: within names a broader system than food itself.",
    ]);
    expect(told({ stages: STAGES.replace("as: food", "as: rent") })).toEqual([
      "as: food is conditional on food, and as names rent: they are one group.",
    ]);
    expect(told({ budget: "data: purse\nform: les\nconditional on: household goods\n" })).toEqual([
      "within: budget is itself conditional on household goods: name the system of the whole budget.",
    ]);
  });

  it("tells of keys that need one another, and of places where two systems do not meet", () => {
    const sentences = (keys: string) =>
      parseCell("elasticities", `system: food\n${keys}\n`).problems.map(({ sentence }) => sentence);
    expect(sentences("as: food").join()).toContain("as names a good of the broader system: name that system in within");
    expect(sentences("unconditional: edgerton").join()).toContain("need a broader system");
    expect(sentences("within: budget").join()).toContain("which good of the broader system the group is");
    const within = "within: budget\nas: food\n";
    expect(sentences(`${within}over: rows`).join()).toContain("at one point");
    expect(sentences(`${within}groups: {of: quarter}`).join()).toContain("at one point");
    expect(sentences(`${within}at: {prices: {grains: 1}, x: 2}`).join()).toContain("known of one system only");
    expect(sentences(`${within}at: {x: quantile 0.9}`)).toEqual([]);
    expect(sentences(`${within}unconditional: edgertown`).join()).toContain("edgerton");
  });
});
