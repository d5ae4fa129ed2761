import { describe, expect, it } from "vitest";
import type { MadeTest, TestsFinding, UnmadeTest } from "../../../shared/schemas/tests.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import { revealedNotes, revealedSentence } from "../../../shared/tables/revealed-preference.ts";
import {
  decidingTest,
  levelText,
  rejects,
  testMeaning,
  testsTable,
  testVerdict,
} from "../../../shared/tables/tests.ts";
import { testsNote } from "../../../shared/tables/tests-note.ts";
import { testsSentence } from "../../../shared/tables/tests-sentence.ts";
import { tableText } from "../../../shared/tables/text.ts";
import { exampleFindings } from "../../support/findings.ts";
import { berndtWoodHomogeneity } from "../../support/made-tests.ts";

const symmetry: MadeTest = {
  hypothesis: "symmetry",
  given: ["homogeneity"],
  degreesOfFreedom: 3,
  wald: { statistic: 14, pValue: 0.003 },
  likelihoodRatio: { statistic: 12.8403304, pValue: 0.0049949 },
  score: { statistic: 10, pValue: 0.019 },
  corrected: { statistic: 10.01545771, pValue: 0.0184352 },
};
const unmade: UnmadeTest = { hypothesis: "quadratic terms", because: "nothing to test", reason: "It has none." };

function finding(tests: TestsFinding["tests"], more: Partial<TestsFinding> = {}): TestsFinding {
  const { tests: example } = exampleFindings();
  return { ...example, tests, rows: 25, weighted: false, ...more };
}

const plain = { level: 0.05, covariance: "conventional" } as const;
const clustered = { level: 0.05, covariance: { cluster: "village" } } as const;

describe("what a verdict goes by", () => {
  it("Laitinen's F where there is one, whatever the others say", () => {
    expect(decidingTest(berndtWoodHomogeneity, plain)).toEqual({ by: "Laitinen’s F", p: 0.05338436 });
    expect(testVerdict(berndtWoodHomogeneity, plain)).toEqual({ figure: "holds here", word: "not rejected" });
  });

  it("else the likelihood ratio, corrected where that changes the answer", () => {
    const { laitinen: _, ...without } = berndtWoodHomogeneity;
    expect(decidingTest(without, plain)).toEqual({ by: "corrected LR", p: 0.0531027 });
    expect(decidingTest(symmetry, plain)).toEqual({ by: "LR", p: 0.0049949 });
  });

  it("Wald's alone where errors are clustered", () => {
    expect(decidingTest(berndtWoodHomogeneity, clustered)).toEqual({ by: "Wald", p: 0.004938 });
    expect(testsNote(finding([berndtWoodHomogeneity], clustered)).join(" ")).toContain("clustered by village");
  });

  it("nothing where errors are clustered in too few clusters for Wald's", () => {
    const few = {
      ...berndtWoodHomogeneity,
      wald: { absent: "The covariance of the estimates has rank 1 where 3 are needed." },
    };
    expect(rejects(few, clustered)).toBeUndefined();
    expect(testVerdict(few, clustered).word).toBe("not tested");
    expect(testMeaning(few, clustered)).toContain("has rank 1");
    expect(testsSentence(finding([few], { ...clustered, revealed: undefined }))).not.toContain("reject");
  });

  it("what is left where fits were refused, and nothing where nothing is", () => {
    const absent = { absent: "The moments are singular." };
    const narrow = { ...symmetry, wald: absent, likelihoodRatio: absent, corrected: absent };
    expect(decidingTest(narrow, plain)).toEqual({ by: "LM", p: 0.019 });
    const none = { ...narrow, score: absent };
    expect(rejects(none, plain)).toBeUndefined();
    expect(testVerdict(none, plain).word).toBe("not tested");
    expect(testMeaning(none, plain)).toContain("The moments are singular.");
  });

  it("the level that was asked for", () => {
    expect(testVerdict(berndtWoodHomogeneity, { ...plain, level: 0.1 }).word).toBe("rejected");
    expect([levelText(0.05), levelText(0.1), levelText(0.001)]).toEqual(["5 per cent", "10 per cent", "0.1 per cent"]);
  });
});

describe("what tests mean", () => {
  it("never that a hypothesis holds", () => {
    expect(testMeaning(berndtWoodHomogeneity, plain)).toBe(
      "The data do not reject homogeneity at 5 per cent; that is no proof that it holds. The plain likelihood ratio rejects: asymptotic tests reject too often in small samples.",
    );
    expect(testMeaning(symmetry, plain)).toBe("The data reject symmetry given homogeneity at 5 per cent.");
  });

  it.each([
    ["demographics", "urban"],
    ["demographics", undefined],
    ["quadratic terms", undefined],
    ["exogeneity", undefined],
    ["homogeneity and symmetry", undefined],
  ] as const)("of %s (%s), rejected and not, in words that do not overclaim", (hypothesis, column) => {
    const test = { ...symmetry, hypothesis, ...(column && { column }) };
    expect(testMeaning(test, plain)).toMatch(/reject/);
    const kept = testMeaning(test, { ...plain, level: 0.001 });
    expect(kept).toMatch(/not|no proof/);
    expect(kept).not.toMatch(/\baccept|\bprove[sd]\b|\btrue\b/);
  });

  it("in the head: what is rejected, what is not", () => {
    expect(testsSentence(finding([berndtWoodHomogeneity, symmetry]))).toBe(
      "The data reject symmetry given homogeneity at 5 per cent. They do not reject homogeneity; that is no proof of it.",
    );
    const both = { ...symmetry, hypothesis: "homogeneity and symmetry" as const };
    const urban = { ...symmetry, hypothesis: "demographics" as const };
    expect(testsSentence(finding([symmetry, both, urban, { ...urban, column: "urban" }]))).toBe(
      "The data reject symmetry given homogeneity and that demographics have no effect at 5 per cent.",
    );
    expect(testsSentence(finding([unmade]))).toBe("None of the hypotheses could be tested.");
  });
});

describe("the table to copy", () => {
  const table = testsTable(finding([berndtWoodHomogeneity, symmetry, unmade]));

  it("has every statistic with its probability, and a reason for what is missing", () => {
    const [, head, first, second, third] = tableText(table).split("\n");
    expect(head).toMatch(/^Hypothesis\td\.f\.\tWald\tp\tLR\tp\tLM\tp\tCorrected LR\tp\tLaitinen F\tp\tAt 5 per cent/);
    expect(first).toContain(
      "Homogeneity\t3\t12.86\t0.005\t10.38\t0.016\t8.49\t0.037\t7.68\t0.053\t3.09\t0.053\tnot rejected",
    );
    expect(second).toMatch(/^Symmetry given homogeneity\t3\t.*\trejected$/);
    expect(third).toMatch(/^No quadratic terms\t+nothing to test$/);
    expect(table.notes).toContain(
      "Laitinen’s (1978) F on (3, 18) is exact: the laspeyres index holds no current shares.",
    );
    expect(table.notes).toContain("No quadratic terms: It has none.");
  });

  it("is LaTeX without a character LaTeX does not know", () => {
    const latex = tableLatex(table);
    expect(latex).toContain("$\\chi$$^2$");
    expect(latex).not.toMatch(/[χ²−]/);
  });
});

describe("revealed preference in words", () => {
  const violated = {
    rows: 338,
    pairs: 52,
    directPairs: 40,
    rowsInvolved: 31,
    index: 0.98714,
    cycle: [12, 40],
    periods: true,
    weighted: false,
  };

  it("names violations, index, the first cycle", () => {
    expect(revealedSentence(violated)).toBe(
      "The generalised axiom of revealed preference is violated: 31 of 338 rows contradict one another. Afriat’s efficiency index is 0.9871.",
    );
    expect(revealedNotes(violated).join(" ")).toContain("rows 12 and 40, each of which could afford the next");
  });

  it("says that rows of a cross-section are read as one consumer's choices, and that weights do not enter", () => {
    const notes = revealedNotes({ ...violated, periods: false, weighted: true }).join(" ");
    expect(notes).toContain("the axiom reads them so");
    expect(notes).toContain("weights do not enter");
  });

  it("claims no more of consistent choices than they show, and prints no index below one as one", () => {
    const consistent = { ...violated, pairs: 0, directPairs: 0, rowsInvolved: 0, index: 1, cycle: [] };
    expect(revealedSentence(consistent)).toMatch(/as far as prices crossed at all\.$/);
    expect(revealedSentence({ ...violated, index: 0.999_999_9 })).toContain("above 0.9999");
  });
});
