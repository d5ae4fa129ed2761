import { spawnSync } from "node:child_process";
import { copyFileSync, mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { estimateStudy } from "../../../server/bin/estimate-study.ts";
import { QUIET } from "../../../server/engine/run.ts";
import { finding } from "../../../shared/schemas/cell.ts";
import { SYSTEM_NAMES } from "../../../shared/systems/names.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const SCRIPT = fileURLToPath(new URL("../../../server/bin/estimate.mjs", import.meta.url));
const TUNA = fileURLToPath(new URL("../../reference/fixtures/tuna-weekly.csv", import.meta.url));
const STUDY = `study: Weekly tuna purchases
cells:
  matrix:
    kind: slutsky
    system: base
    at: base point
  weeks:
    kind: data
    upload: data/tuna.csv
    goods:
      brand1: {price: p1, quantity: q1}
      brand2: {price: p2, quantity: q2}
      brand3: {price: p3, quantity: q3}
    time: week
  base:
    kind: system
    data: weeks
    form: aids
    impose: [homogeneity, symmetry]
  linear:
    kind: system
    like: base
    form: la-aids
`;

let folder: ReturnType<typeof temporaryFolder>;
beforeAll(() => {
  folder = temporaryFolder();
  mkdirSync(join(folder.path, "data"));
  copyFileSync(TUNA, join(folder.path, "data", "tuna.csv"));
});
afterAll(() => folder.remove());

function written(text: string, name = "study.yaml"): string {
  const path = join(folder.path, name);
  writeFileSync(path, text);
  return path;
}
const estimated = (text: string, only: string[] = []) =>
  estimateStudy(text, join(folder.path, "study.yaml"), { only, control: QUIET });
const told = async (text: string, only: string[] = []) =>
  (await estimated(text, only)).complaints.map(
    ({ key, sentence, place }) => `${place?.line}:${place?.column} ${key}: ${sentence}`,
  );

function command(...words: string[]) {
  const { INIT_CWD: _, ...env } = process.env;
  const { status, stdout, stderr } = spawnSync(process.execPath, [SCRIPT, ...words], {
    cwd: folder.path,
    env,
    encoding: "utf8",
  });
  return { status, stdout, stderr };
}

describe("the command", () => {
  it("prints findings by cell as JSON of their schemas, and nothing else", () => {
    written(STUDY);
    const { status, stdout, stderr } = command("study.yaml");
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    const findings = JSON.parse(stdout) as Record<string, unknown>;
    expect(Object.keys(findings)).toEqual(["matrix", "weeks", "base", "linear"]);
    for (const one of Object.values(findings)) expect(finding.parse(one)).toEqual(one);
    expect(findings.matrix).toMatchObject({
      kind: "slutsky",
      pointName: "base point",
      at: { checks: { symmetry: { holds: true } } },
    });
  });

  it("prints errors as file:line:column: key: sentence, nothing on standard output, and exits with 1", () => {
    written(STUDY.replace("form: aids", "form: aidz").replace("p2", "p22"), "wrong.yaml");
    const { status, stdout, stderr } = command("wrong.yaml");
    expect({ status, stdout }).toEqual({ status: 1, stdout: "" });
    expect(stderr).toBe(
      [
        "wrong.yaml:12:23: weeks.goods.brand2.price: data/tuna.csv has no column p22. The nearest is p2.",
        `wrong.yaml:18:11: base.form: form is not one of ${SYSTEM_NAMES.join(", ")}: the nearest to aidz is aids.`,
        "",
      ].join("\n"),
    );
  });

  it("shows no control character of a file: a terminal would obey it", () => {
    written(STUDY.replace("data/tuna.csv", '"\\e[2J\\a.csv"'), "escaping.yaml");
    const { status, stderr } = command("escaping.yaml");
    expect(status).toBe(1);
    expect(stderr).toContain("\uFFFD[2J\uFFFD.csv");
    expect(stderr.replaceAll("\n", "")).not.toMatch(/\p{Cc}/u);
  });

  it.each([[[]], [["a.yaml", "b.yaml"]], [["--colour", "a.yaml"]], [["gone.yaml"]]])(
    "called wrongly with %j says how, and exits with 2",
    (words) => {
      const { status, stdout, stderr } = command(...words);
      expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
      expect(stderr).toContain("npm run --silent estimate -- study.yaml");
    },
  );
});

describe("estimateStudy", () => {
  it("computes only what is wanted and what that reads", async () => {
    const all = await estimated(STUDY);
    const { findings } = await estimated(STUDY, ["base"]);
    expect(Object.keys(findings)).toEqual(["base"]);
    expect(findings.base).toEqual(all.findings.base);
    // What is wrong elsewhere is of no concern then.
    expect(await told(STUDY.replace("at: base point", "at: nowhere"), ["base"])).toEqual([]);
  });

  it.each([
    [
      "a file that is not there",
      STUDY.replace("tuna.csv", "tuna.csw"),
      ["9:13 weeks.upload: There is no file data/tuna.csw beside the study file. The nearest is tuna.csv."],
    ],
    ["no YAML", "cells: [", ["1:9 : A closing ] is missing before this place."]],
    ["no cells", "study: a", ["1:1 cells: A study file needs cells: a name for each, and its keys below it."]],
    [
      "a row that is not there",
      STUDY.replace("at: base point", "at: {row: 400}"),
      ["6:15 matrix.at.row: The upload has 338 rows; there is no row 400."],
    ],
    [
      "a row that is left out",
      STUDY.replace("at: base point", "at: {row: 3}").replace("time: week", "keep: week > 5"),
      ["6:15 matrix.at.row: Row 3 is not among the rows used: left out by keep: week > 5."],
    ],
  ])("refuses %s", async (_, text, complaints) => {
    expect(await told(text)).toEqual(complaints);
  });

  it("refuses fewer rows than coefficients with both numbers, for every system that asks too much", async () => {
    const lines = await told(STUDY.replace("time: week", "keep: week <= 4"));
    expect(lines).toHaveLength(2);
    expect(lines[0]).toMatch(/base: The data have 4 rows used; 7 free coefficients in 2 equations need at least \d+\./);
  });

  it("refuses a table that is not one, at the cell that names it", async () => {
    writeFileSync(join(folder.path, "data", "ragged.csv"), "a,b\n1,2\n3\n");
    expect(await told(STUDY.replace("tuna.csv", "ragged.csv"))).toEqual([
      "9:13 weeks.upload: data/ragged.csv: Row 2 has 1 cell, the header has 2.",
    ]);
  });

  it("says which cell is meant when none has the name", async () => {
    expect((await estimated(STUDY, ["matrx"])).complaints).toEqual([
      { key: "", sentence: "No cell is called matrx. The nearest is matrix." },
    ]);
  });
});
