import { copyFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, expect, it } from "vitest";
import { estimateStudy } from "../../../server/bin/estimate-study.ts";
import { QUIET } from "../../../server/engine/run.ts";
import { priceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const TUNA = fileURLToPath(new URL("../../reference/fixtures/tuna-weekly.csv", import.meta.url));
const STUDY = `study: Weekly tuna purchases
cells:
  weeks:
    kind: data
    upload: tuna.csv
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
  levy:
    kind: price change
    system: base
    at: {row: 3}
    prices:
      brand1: {ad valorem: 20, pass-through: 0.8}
      brand3: {per cent: 10, tax: true}
    expenditure: 0
    groups: {of: total expenditure, quantiles: 4}
  argument:
    kind: text
    text: "It takes {levy: cv, highest quarter} of those who spend most, and raises {levy: revenue, all rows}."
`;

let folder: ReturnType<typeof temporaryFolder>;
beforeAll(() => {
  folder = temporaryFolder();
  copyFileSync(TUNA, join(folder.path, "tuna.csv"));
});
afterAll(() => folder.remove());

const estimated = (text: string) => estimateStudy(text, join(folder.path, "study.yaml"), { control: QUIET });

it("answers a price change of a study file, and prose that quotes it", async () => {
  const { findings, complaints } = await estimated(STUDY);
  expect(complaints).toEqual([]);
  const levy = priceChangeFinding.parse(findings.levy);
  expect(levy).toMatchObject({ pointName: "row 3", question: { prices: { brand3: { tax: true } } } });
  expect(levy.incidence?.groups.map(({ name }) => name)).toEqual([
    "lowest quarter",
    "second quarter",
    "third quarter",
    "highest quarter",
  ]);
  expect(levy.at.tax?.excessBurden?.value).toBeGreaterThan(0);
  expect(JSON.stringify(findings.argument)).toContain("compensating variation of highest quarter");
});

it("tells what is wrong at its place", async () => {
  const wrong = STUDY.replace("brand3: {per cent: 10, tax: true}", "brand4: {per cent: 10, tac: true}");
  const { complaints } = await estimated(wrong);
  expect(complaints.map(({ place, key, sentence }) => `${place?.line}: ${key}: ${sentence}`)).toEqual([
    "22: levy.prices.brand4.tac: tac is not a key of brand4: the nearest is tax.",
  ]);
  const other = await estimated(STUDY.replace("brand3: {per cent: 10, tax: true}", "brand4: {per cent: 10}"));
  expect(other.complaints.map(({ place, key, sentence }) => `${place?.line}: ${key}: ${sentence}`)).toEqual([
    "22: levy.prices.brand4: weeks has no good brand4. The nearest is brand2.",
  ]);
});
