import { beforeAll, describe, expect, it } from "vitest";
import { runElasticities, runSlutsky, runSystem } from "../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { sealedContentOf } from "../../../../server/services/sealed-content.ts";
import { elasticityValues } from "../../../../shared/economics/elasticities.ts";
import { responsesValuesAt } from "../../../../shared/economics/responses.ts";
import { createRowChecker } from "../../../../shared/economics/sample.ts";
import type { SlutskyFinding } from "../../../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { easi } from "../../../../shared/systems/easi.ts";
import { systemOf } from "../../../../shared/systems/index.ts";
import { elasticitiesSentence } from "../../../../shared/tables/elasticity-words.ts";
import { slutskySentence, systemSentence } from "../../../../shared/tables/sentence.ts";
import { systemVerdicts } from "../../../../shared/tables/verdicts.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

const REASON = "no utility near it costs that much while cost rises with utility";
/** Engel curves of the fifth degree bend so far that two weeks of large expenditure lie beyond every utility. */
const SOURCE =
  "data: weeks\nform: easi\ndegree: 5\ninteractions: [prices with expenditure]\nimpose: [homogeneity, symmetry]";

let data: PreparedData;
let weighted: PreparedData;
let system: SystemFinding;
let matrix: SlutskyFinding;
let without: number[];
beforeAll(async () => {
  data = await tunaWeeks();
  weighted = { ...data, weights: Float64Array.from({ length: data.rows }, (_, t) => 1 + (t % 7)) };
  system = runSystem(specificationOf("system", SOURCE), data);
  matrix = runSlutsky(specificationOf("slutsky", "system: base"), system, data);
  without = [...data.logTotal.keys()].filter((t) => !hasUtility(t));
});

const pointOf = (t: number) => ({
  prices: data.logPrices.map((column) => Math.exp(column[t])),
  total: Math.exp(data.logTotal[t]),
  demographics: [],
});
function hasUtility(t: number): boolean {
  if ("absent" in easi.cost) throw new Error("easi has a cost function");
  return Number.isFinite(easi.cost.utility(system.fitted.theta, systemOf(system.fitted).size, pointOf(t)));
}

describe("rows without utility", () => {
  it("are counted and named, and leave the other rows judged", () => {
    const { sample } = system.checks;
    expect(without).toHaveLength(2);
    expect(sample?.undefined).toEqual({ rows: 2, weightedShare: 2 / 338, reason: REASON });
    const checker = createRowChecker(system.fitted);
    let irregular = without.length;
    let negative = 0;
    for (let t = 0; t < data.rows; t++) {
      checker.evaluate(
        data.logPrices.map((column) => column[t]),
        data.logTotal[t],
        [],
      );
      expect(checker.isDefined()).toBe(!without.includes(t));
      if (without.includes(t)) continue;
      if (!checker.negativityHolds()) negative++;
      if (!checker.negativityHolds() || !checker.monotonicityHolds()) irregular++;
    }
    expect(sample?.regular?.breaks).toBe(irregular);
    expect(sample?.negativity?.breaks).toBe(negative);
    expect(sample?.negativity?.weightedShareThatHolds).toBeCloseTo(1 - (negative + 2) / 338, 12);
  });

  it("stand first among the broken rows of the matrix, and in no bar of its histogram", () => {
    const { sample, brokenRows } = matrix;
    expect(brokenRows.slice(0, 2)).toEqual(
      without.map((t) => ({
        row: data.rowNumbers[t],
        total: Math.exp(data.logTotal[t]) * data.totalScale,
        goods: [],
        notDefined: REASON,
        breaks: [],
      })),
    );
    expect(brokenRows).toHaveLength(system.checks.sample?.regular?.breaks ?? -1);
    expect(sample?.undefined?.rows).toBe(2);
    expect(sample?.histogram.shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(336 / 338, 12);
    const holding = sample?.byTenth.reduce((sum, share) => sum + share, 0) ?? 0;
    expect(holding / 10).toBeCloseTo(system.checks.sample?.negativity?.weightedShareThatHolds ?? 0, 2);
  });

  it("weigh what they weigh", () => {
    const { sample } = runSlutsky(specificationOf("slutsky", "system: base"), system, weighted);
    const weights = Array.from(weighted.weights!);
    const share = without.reduce((sum, t) => sum + weights[t], 0) / weights.reduce((sum, weight) => sum + weight, 0);
    expect(sample?.undefined?.weightedShare).toBeCloseTo(share, 12);
  });

  it("are told in the sentences and keep a law from holding everywhere", () => {
    const told = "The system is not defined in 2 of 338 rows.";
    expect(systemSentence(system)).toContain(told);
    expect(slutskySentence(matrix)).toContain(told);
    const monotone = systemVerdicts(system).find(({ law }) => law === "Monotonicity");
    expect(monotone?.note).toMatch(/^breaks in \d+ rows; not defined in 2$/);
    const sample = { ...system.checks.sample!, monotonicity: { breaks: 0, weightedShareThatHolds: 336 / 338 } };
    const clean = systemVerdicts({ ...system, checks: { ...system.checks, sample } });
    expect(clean.find(({ law }) => law === "Monotonicity")).toMatchObject({
      figure: "holds here",
      note: "not defined in 2 of 338 rows",
    });
  });

  it("are left out of elasticities over rows, which say so", () => {
    const finding = runElasticities(specificationOf("elasticities", "system: base\nover: rows"), system, data);
    const [group] = finding.groups;
    expect(group.notDefined).toEqual({ rows: 2, weightedShare: 2 / 338, reason: REASON });
    expect(elasticitiesSentence(finding)).toContain("The system is not defined in 2 of 338 rows.");
    // η_1 as the average of the rows' own, each weighted by what it spends on the good.
    let sum = 0;
    let spent = 0;
    for (let t = 0; t < data.rows; t++) {
      if (without.includes(t)) continue;
      const responses = responsesValuesAt(system.fitted, pointOf(t));
      const weight = pointOf(t).total * responses.shares[0];
      sum += weight * elasticityValues(responses).expenditure[0];
      spent += weight;
    }
    expect(group.expenditure.values[0]).toBeCloseTo(sum / spent, 10);
  });

  it("are refused as the point of a matrix, with the point's name", () => {
    const row = data.rowNumbers[without[0]];
    expect(() => runSlutsky(specificationOf("slutsky", `system: base\nat: {row: ${row}}`), system, data)).toThrow(
      `At row ${row} the exact affine Stone index system is not defined at ln x = `,
    );
  });

  it("reach a referee as counts alone", () => {
    const cell = { name: "x", kind: "data", source: "upload: weeks.csv\n" } as never;
    const about = { program: "p", title: "t", authors: undefined, note: "", sealedAt: new Date(0) };
    const sealed = sealedContentOf(about, {
      matrix: { cell, finding: matrix },
      system: { cell, finding: system },
      data: { cell, finding: data.finding },
    });
    expect(sealed.slutsky.sample?.undefined).toEqual(matrix.sample?.undefined);
    expect(JSON.stringify(sealed)).not.toContain("brokenRows");
  });
});
