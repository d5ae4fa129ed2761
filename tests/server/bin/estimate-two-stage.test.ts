import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, expect, it } from "vitest";
import { estimateStudy } from "../../../server/bin/estimate-study.ts";
import { QUIET } from "../../../server/engine/run.ts";
import { Snapshot } from "../../../server/services/cells/snapshot.ts";
import { temporaryFolder } from "../../support/temporary.ts";
import { TREE_GOODS, treeCsv } from "../../support/utility-tree-csv.ts";

const indented = (source: string) => source.replace(/^/gm, "    ").trimEnd();
const STUDY = `study: A budget and what is eaten of it
cells:
  stages:
    kind: elasticities
    system: food
    within: budget
    as: food
  plates:
    kind: data
    upload: tree.csv
${indented(TREE_GOODS.food)}
  purse:
    kind: data
    upload: tree.csv
${indented(TREE_GOODS.budget)}
  food:
    kind: system
    data: plates
    form: les
    conditional on: food
  budget:
    kind: system
    data: purse
    form: les
  matrix:
    kind: slutsky
    system: food
`;

let folder: ReturnType<typeof temporaryFolder>;
beforeAll(() => {
  folder = temporaryFolder();
  writeFileSync(join(folder.path, "tree.csv"), treeCsv());
});
afterAll(() => folder.remove());
const estimated = (text: string, only: string[] = []) =>
  estimateStudy(text, join(folder.path, "study.yaml"), { only, control: QUIET });

it("computes a study of two stages from its file, with everything the cell asked for reads", async () => {
  const { findings, complaints } = await estimated(STUDY, ["stages", "matrix"]);
  expect(complaints).toEqual([]);
  const { stages, matrix } = findings;
  if (stages.kind !== "elasticities" || matrix.kind !== "slutsky") throw new Error("other kinds were asked for");
  expect(stages.conditionalOn).toBe("food");
  expect(matrix).toMatchObject({ conditionalOn: "food", caveats: ["conditional on a group"] });
  expect(stages.unconditional?.formula).toBe("carpentier guyomard");
  const { expenditure } = stages.unconditional!;
  const [, , meat] = stages.groups[0].expenditure.values;
  expect(expenditure.values[2]).toBeCloseTo(meat * stages.unconditional!.asGood.expenditure.value, 12);
});

it("tells at its place what keeps the two systems apart", async () => {
  const inPence = STUDY.replace("e_food}", "pence}").replace(
    "  purse:\n",
    "  purse:\n    derive: {pence: 100 * e_food}\n",
  );
  const { complaints } = await estimated(inPence);
  expect(complaints.map(({ key, place }) => `${key} ${place?.line}`)).toEqual(["stages.within 6"]);
  expect(complaints[0].sentence).toMatch(/^The two systems do not meet at the mean: food takes /);
});

it("is sent to a worker with both systems and their data", () => {
  const cells = (
    [
      ["plates", "data", `upload: tree.csv\n${TREE_GOODS.food}`],
      ["purse", "data", `upload: tree.csv\n${TREE_GOODS.budget}`],
      ["food", "system", "data: plates\nform: les\n"],
      ["budget", "system", "data: purse\nform: les\n"],
      ["stages", "elasticities", "system: food\nwithin: budget\nas: food\n"],
      ["alone", "elasticities", "system: food\n"],
    ] as const
  ).map(([name, kind, source], i) => ({ id: name, name, kind, source, order: String.fromCharCode(97 + i) }));
  const [head] = treeCsv(1).split("\n");
  const columns = head.split(",").map((name) => ({ name, type: "number" as const }));
  const upload = { id: "u", name: "tree.csv", sha256: "0".repeat(64), version: 1, rows: 240, columns };
  const snapshot = new Snapshot(cells, [upload] as ConstructorParameters<typeof Snapshot>[1]);
  const job = (id: string) => snapshot.job("study", snapshot.cell(id)!);
  const [plates, purse, budget] = ["plates", "purse", "budget"].map((id) => snapshot.fingerprints.get(id));
  expect(job("stages")).toMatchObject({
    data: { fingerprint: plates },
    broader: { systemFingerprint: budget, data: { fingerprint: purse, uploadId: "u" } },
  });
  expect(job("alone")).not.toHaveProperty("broader");
});
