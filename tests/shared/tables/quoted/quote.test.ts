import { describe, expect, it } from "vitest";
import type { Finding } from "../../../../shared/schemas/cell.ts";
import { QUOTABLE } from "../../../../shared/study/quotable.ts";
import { quoteOf } from "../../../../shared/tables/quoted/quote.ts";
import { exampleFindings } from "../../../support/findings.ts";
import { berndtWoodHomogeneity } from "../../../support/made-tests.ts";
import { sampleElasticities } from "../../../support/sample-elasticities.ts";
import { sampleData, sampleSlutsky, sampleSystem } from "../../../support/sample-findings.ts";

const system = sampleSystem();
const slutsky = sampleSlutsky();
const data = sampleData();
const fifths = sampleElasticities(3);
const tests: Finding = {
  ...exampleFindings().tests,
  tests: [...exampleFindings().tests.tests, { ...berndtWoodHomogeneity, hypothesis: "symmetry" }],
};

function quoted(finding: Finding, word: string, ...rest: string[]): string {
  const answer = quoteOf(finding, word, rest);
  return "absent" in answer ? answer.absent : `${answer.printed} | ${answer.says}`.replaceAll("\u2009", " ");
}

const CASES: readonly (readonly [finding: Finding, words: readonly string[], told: string | RegExp])[] = [
  [system, ["eta", "meat & fish"], /^1\.318 \(0\.\d{3}\) \| expenditure elasticity of meat & fish at the base point$/],
  [system, ["eta", "Meat  & FISH", "alone"], /^1\.318 \| /],
  [system, ["eta", "meat & fish", "error"], /^0\.\d{3} \| /],
  [system, ["beta", "grains", "alone"], "−0.0815 | β of grains"],
  [system, ["gamma", "grains", "dairy"], /^−?0\.\d{4} \(0\.\d{4}\) \| γ of grains and the price of dairy$/],
  [
    system,
    ["demographic", "log_size", "grains", "alone"],
    "0.0228 | coefficient of log_size in the equation of grains",
  ],
  [system, ["lambda", "grains"], "The form aids has no λ."],
  [system, ["eta", "bread"], /^It has no good bread: there are grains, dairy,/],
  [system, ["eta"], /^A good is needed: there are grains/],
  [system, ["log likelihood"], / \| log-likelihood$/],
  [system, ["r2", "grains"], /^0\.\d\d \| R² of grains$/],
  [system, ["parameters"], / \| free coefficients$/],
  [system, ["quadratic p"], "It has no test of no quadratic terms."],
  [system, ["exogeneity p"], "Total expenditure has no instruments."],
  [
    system,
    ["largest eigenvalue"],
    /^−0\.\d{4} \(0\.\d{4}\) \| largest eigenvalue of the Slutsky matrix at the base point$/,
  ],
  [system, ["rows that hold"], /^\d+\.\d % \| share of rows in which negativity holds/],
  [
    slutsky,
    ["entry", "grains", "dairy", "alone"],
    /^0\.0238 \| entry of the Slutsky matrix, share form, grains and the/,
  ],
  [sampleSlutsky("quantity"), ["entry", "grains", "dairy"], /^−?[\d.]+ \([\d.]+\) \| .*quantity form/],
  [slutsky, ["compensated", "grains", "grains"], /^−0\.\d{3} \(0\.\d{3}\) \| compensated elasticity of grains/],
  [slutsky, ["eigenvalue", "2"], /^−0\.\d{4} \(.*\) \| eigenvalue 2 of/],
  [slutsky, ["eigenvalue", "9"], "It has 5 eigenvalues."],
  [slutsky, ["share", "grains"], /^0\.\d{4} \| predicted budget share of grains at the base point$/],
  [data, ["rows used"], /^[\d,]+ \| rows used$/],
  [data, ["mean share", "grains"], /^0\.\d{4} \| mean budget share of grains/],
  [data, ["mean expenditure"], /^184\.60 \| mean total expenditure, in the units uploaded/],
  [data, ["bought none", "sweet drinks"], /^\d+\.\d % \| share of rows that buy no sweet drinks/],
  [tests, ["p", "homogeneity"], "0.045 | p of homogeneity, by the Wald statistic"],
  [
    tests,
    ["statistic", "homogeneity", "likelihood ratio"],
    "3.0 | likelihood ratio for homogeneity on 1 degrees of freedom",
  ],
  [tests, ["p", "homogeneity", "laitinen"], /^homogeneity has no Laitinen’s T²: Laitinen's test needs/],
  [tests, ["p", "demographics"], "demographics has no test: The system names no demographics."],
  [tests, ["p", "exogeneity"], "It does not test exogeneity."],
  [tests, ["afriat"], "It does not test revealed preference."],
  [fifths, ["eta", "meat"], /^A group is needed: there are /],
  [fifths, ["eta", "meat", fifths.groups[1].name], /^1\.\d{3} \(.*\) \| expenditure elasticity of meat /],
  [fifths, ["eta interval", "meat", fifths.groups[0].name], /^−?\d\.\d{3} to \d\.\d{3} \| 95 per cent interval of the/],
  [sampleElasticities(1), ["uncompensated", "meat", "grains"], / \| uncompensated elasticity of meat with respect/],
  [sampleElasticities(1), ["compensated", "meat", "meat", "error"], /^\d\.\d{3} \| compensated elasticity of meat/],
];

describe("a quoted number", () => {
  it.each(
    CASES.map(([finding, words, told]) => [`${finding.kind}: ${words.join(", ")}`, finding, words, told] as const),
  )("of %s", (_, finding, [word, ...rest], told) => {
    const said = quoted(finding, word, ...rest);
    if (typeof told === "string") expect(said).toBe(told);
    else expect(said).toMatch(told);
  });

  it("agrees with its kind's vocabulary: every word that needs nothing is answered or says why not", () => {
    const findings: Finding[] = [system, slutsky, data, tests, sampleElasticities(1)];
    for (const finding of findings) {
      for (const { word, needs } of QUOTABLE[finding.kind as keyof typeof QUOTABLE]) {
        const said = quoted(finding, word, ...(needs === "rank" ? ["1"] : []));
        expect(said, `${finding.kind}: ${word}`).not.toMatch(/undefined|NaN|Infinity|It has no such number/);
      }
    }
  });

  it("is none of a word that only looks like one", () => {
    for (const word of ["toString", "__proto__", "constructor", undefined]) {
      expect(quoteOf(system, word, [])).toMatchObject({ absent: expect.stringMatching(/^It has no such number/) });
    }
  });

  it("is none of negativity without homogeneity", () => {
    const checks = { ...system.checks, negativity: { stated: false } };
    for (const word of ["largest eigenvalue", "rows that hold", "rows that break"]) {
      expect(quoted({ ...system, checks }, word)).toBe("Without homogeneity, negativity cannot be stated.");
    }
  });
});
