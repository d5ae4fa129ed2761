import { describe, expect, it } from "vitest";
import { coefficientTable } from "../../../shared/tables/coefficients.ts";
import { covarianceCsv } from "../../../shared/tables/covariance.ts";
import { standardErrorsNotes, standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";
import { exampleFindings } from "../../support/findings.ts";

const { system } = exampleFindings();
const intervals: [number, number][] = system.coefficients.map(() => [0, 1]);
const village = { column: "village", count: 1200 };
const drawn = { of: "rows", replicates: 500, failed: 0, seed: 7, intervals } as const;
const bootstrapped = { ...system, standardErrors: "bootstrap" } as const;

describe("what standard errors are called", () => {
  it.each([
    ["conventional", system],
    ["robust to heteroskedasticity", { ...system, standardErrors: "heteroskedastic" } as const],
    ["clustered by village, 1,200 clusters", { ...system, standardErrors: "clustered", clusters: village } as const],
    ["bootstrap of rows, 500 replicates, seed 7", { ...bootstrapped, bootstrap: drawn }],
    [
      "bootstrap of clusters by village, 1,200 clusters, 500 replicates, seed 7",
      { ...bootstrapped, clusters: village, bootstrap: { ...drawn, of: "clusters" } } as const,
    ],
    [
      "bootstrap of blocks of 7 periods, 500 replicates, seed 7",
      { ...bootstrapped, bootstrap: { ...drawn, of: "blocks", block: 7 } } as const,
    ],
  ])("%s", (phrase, finding) => {
    expect(standardErrorsPhrase(finding).replaceAll("\u2009", ",")).toBe(phrase);
    expect(coefficientTable(finding).notes[0]).toContain(standardErrorsPhrase(finding));
  });
});

describe("the file of the coefficients", () => {
  it("has the ends of the percentile intervals of a bootstrap", () => {
    const [head, first] = covarianceCsv({ ...bootstrapped, bootstrap: drawn }).split("\r\n");
    const at = head.split(",").indexOf("2.5 percentile");
    expect(head.split(",").slice(at - 1, at + 2)).toEqual(["standard error", "2.5 percentile", "97.5 percentile"]);
    expect(first.split(",").slice(at, at + 2)).toEqual(["0", "1"]);
    expect(covarianceCsv(system)).not.toContain("percentile");
  });
});

describe("what is said besides", () => {
  it("nothing of conventional errors of equal weights", () => expect(standardErrorsNotes(system)).toEqual([]));

  it("fewer clusters than coefficients, with both numbers", () => {
    const clusters = { column: "region", count: 6 };
    const few = { ...system, freeCoefficients: 30, standardErrors: "clustered", clusters } as const;
    expect(standardErrorsNotes(few).join()).toMatch(/6 clusters for 30 free coefficients: no more than 5 restrictions/);
    expect(standardErrorsNotes({ ...few, freeCoefficients: 5 }).join()).not.toMatch(/clusters for/);
  });

  it("replicates without an estimate, held prices, weights, what the ratios assume", () => {
    const firstFailure = { replicate: 17, reason: "The moments are singular." };
    const bootstrap = { ...drawn, of: "residuals", failed: 3, firstFailure } as const;
    const finding = { ...bootstrapped, bootstrap, effectiveRows: 812.4, rows: 1000 };
    const said = standardErrorsNotes(finding).join(" ");
    expect(said).toMatch(/3 of 500 replicates have no estimate; the first is replicate 17: The moments are singular\./);
    expect(said).toMatch(/held as observed/);
    expect(said).toMatch(/tell as much as 812 of one weight/);
    const test = {
      restriction: "homogeneity",
      statistic: 1,
      degreesOfFreedom: 1,
      pValue: 0.3,
      corrected: { statistic: 1, pValue: 0.3 },
    } as const;
    expect(standardErrorsNotes({ ...finding, tests: [test] }).join(" ")).toMatch(/Likelihood ratios assume/);
  });
});
