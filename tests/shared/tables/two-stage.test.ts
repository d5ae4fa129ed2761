import { describe, expect, it } from "vitest";
import { systemSpecification } from "../../../shared/schemas/system.ts";
import { coefficientTable } from "../../../shared/tables/coefficients.ts";
import { unconditionalOf } from "../../../shared/tables/conditional.ts";
import { tableCsv } from "../../../shared/tables/csv.ts";
import { elasticitiesSentence, elasticityNotes } from "../../../shared/tables/elasticity-words.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import { methodsParagraph, paragraphBibtex } from "../../../shared/tables/methods/paragraph.ts";
import { FINDING_TABLES } from "../../../shared/tables/of-finding.ts";
import { quoteOf } from "../../../shared/tables/quoted/quote.ts";
import { slutskySentence, systemSentence } from "../../../shared/tables/sentence.ts";
import { compensatedTable, slutskyTable } from "../../../shared/tables/slutsky-matrix.ts";
import { exampleFindings } from "../../support/findings.ts";
import { sampleElasticities } from "../../support/sample-elasticities.ts";
import { sampleTwoStage } from "../../support/sample-two-stage.ts";

const notesOf = (more: Parameters<typeof sampleTwoStage>[0] = {}) =>
  elasticityNotes(unconditionalOf(sampleTwoStage(more))!).join(" ");

describe("the sentence of two stages", () => {
  it("says what goods are given the whole budget first, then what they are given the group's", () => {
    expect(elasticitiesSentence(sampleTwoStage())).toBe(
      "Unconditionally, by Carpentier and Guyomard (2001), at the sample mean, grains, dairy and meat are necessities. " +
        "Conditional on food expenditure, at the sample mean, by 95\u2009% intervals, meat is a luxury, grains is a necessity and dairy is undecided.",
    );
  });

  it("warns where the two systems meet at different budgets, with both numbers beside the tables", () => {
    const apart = { spent: { own: 80, broader: 100 } };
    expect(elasticitiesSentence(sampleTwoStage(apart))).toContain(
      "What is spent on the group differs between the two systems there.",
    );
    expect(notesOf(apart)).toContain(
      "At the sample mean 100.00 is spent on food by the broader system, and the total of the group's own data is 80.00: they differ by 25.0",
    );
    expect(notesOf()).toContain("the total of the group's own data is 80.00. Engel's");
  });

  it("labels groups of a conditional system too", () => {
    const groups = { ...sampleElasticities(3), conditionalOn: "food" };
    expect(elasticitiesSentence(groups)).toMatch(/^Conditional on food expenditure, in each of 3 groups/);
    expect(FINDING_TABLES.elasticities(groups)[0].title).toBe(
      "Expenditure elasticities by total expenditure, conditional on food expenditure, aids",
    );
  });
});

describe("notes of unconditional elasticities", () => {
  it("name the formula, when it is exact, which errors are assumed, and the group's price", () => {
    expect(notesOf()).toContain(
      "by Carpentier and Guyomard (2001), from those of the goods within food and of food as one good",
    );
    expect(notesOf()).toContain("exact under weak separability where");
    expect(notesOf()).toContain("both systems rest on the same rows, so that errors are the largest");
    expect(notesOf()).toContain("The price of food in the broader data is taken to move with the prices of its goods");
    expect(notesOf({ errors: "independent" })).toContain("the estimates of the two systems are taken as independent");
  });

  it("say how far Edgerton's compensated effects miss symmetry, and what the systems themselves miss", () => {
    const edgerton = {
      formula: "edgerton" as const,
      identities: { engel: 0, cournot: 0, groupPrice: 0, homogeneity: 0.02, symmetry: 0.004 },
    };
    expect(notesOf(edgerton)).toContain("by Edgerton (1997)");
    expect(notesOf(edgerton)).toContain("miss symmetry by up to 0.0040, as Edgerton's formula leaves it");
    expect(notesOf(edgerton)).toContain("sums miss the group's own elasticities by up to 0.020");
  });
});

describe("tables of two stages", () => {
  const tables = FINDING_TABLES.elasticities(sampleTwoStage());

  it("are both side by side, each in full under its label, other prices and the group", () => {
    expect(tables.map(({ title }) => title)).toEqual([
      "Elasticities conditional on food expenditure and unconditional, at the sample mean, aids within les",
      "Unconditional elasticities at the sample mean, aids",
      "Unconditional uncompensated price elasticities at the sample mean, aids",
      "Unconditional compensated price elasticities at the sample mean, aids",
      "Elasticities at the sample mean, conditional on food expenditure, aids",
      "Uncompensated price elasticities at the sample mean, conditional on food expenditure, aids",
      "Compensated price elasticities at the sample mean, conditional on food expenditure, aids",
      "Unconditional uncompensated elasticities with respect to other prices at the sample mean, aids within les",
      "Unconditional compensated elasticities with respect to other prices at the sample mean, aids within les",
      "Food as one good of the broader system, les",
    ]);
    expect(new Set(tables.map(({ name }) => name)).size).toBe(tables.length);
  });

  it("have each number in its own column, as CSV and LaTeX", () => {
    const [both, whole] = tables;
    expect(tableCsv(both)).toContain("meat,estimate,0.2,1.4,0.7,-1.2,-0.6,necessity");
    expect(tableCsv(both)).toContain("meat,standard error,,0.01,0.01,0.02,0.03,");
    // Of the whole budget, 0.4 of which is the group's.
    expect(tableCsv(whole)).toMatch(/meat,estimate,0\.08\d*,0\.7,-0\.6,-0\.45,necessity/);
    expect(tableLatex(both)).toContain("conditional on food expenditure");
  });
});

it("quotes both, each by its name", () => {
  const finding = sampleTwoStage();
  expect(quoteOf(finding, "eta", ["meat"])).toEqual({
    printed: "1.400 (0.010)",
    says: "expenditure elasticity of meat at the sample mean, conditional on food expenditure",
  });
  expect(quoteOf(finding, "unconditional eta", ["meat"])).toEqual({
    printed: "0.700 (0.010)",
    says: "unconditional expenditure elasticity of meat at the sample mean",
  });
  expect(quoteOf(finding, "unconditional compensated", ["meat", "grains"])).toMatchObject({
    printed: "0.250 (0.030)",
    says: "unconditional compensated elasticity of meat with respect to the price of grains at the sample mean",
  });
  expect(quoteOf(sampleElasticities(1), "unconditional eta", ["meat"])).toEqual({
    absent: "It names no broader system, and so has no unconditional elasticities.",
  });
});

it("labels system and matrix of a group wherever their numbers stand", () => {
  const { system, slutsky } = exampleFindings();
  const conditionalOn = "food";
  expect(systemSentence({ ...system, conditionalOn })).toContain(", conditional on food expenditure.");
  expect(coefficientTable({ ...system, conditionalOn }).title).toMatch(/, conditional on food expenditure$/);
  const matrix = { ...slutsky, conditionalOn, caveats: ["conditional on a group" as const] };
  expect(slutskySentence(matrix)).toMatch(/^The matrix, conditional on food expenditure, is /);
  const { conditionalOn: _, ...unnamed } = matrix;
  expect(slutskySentence(unnamed)).toContain("conditional on what is spent on the group.");
  expect(slutskyTable(matrix, "share").title).toMatch(/, conditional on food expenditure$/);
  expect(compensatedTable(matrix).title).toMatch(/, conditional on food expenditure$/);
  const [good] = system.fitted.goods;
  expect(quoteOf({ ...system, conditionalOn }, "eta", [good])).toMatchObject({
    says: expect.stringMatching(/, conditional on food expenditure$/),
  });
});

it("says both stages in the methods paragraph, with the works", () => {
  const specification = systemSpecification.parse({ kind: "system", data: "d", form: "les", "conditional on": "food" });
  const paragraph = methodsParagraph({ specification, unconditional: ["carpentier guyomard", "edgerton"] });
  expect(paragraph.text).toContain(
    "The goods are those of food: what the system says is conditional on food expenditure.",
  );
  expect(paragraph.text).toContain("by the formulas of Carpentier and Guyomard (2001) and Edgerton (1997).");
  expect(paragraph.references).toEqual(expect.arrayContaining(["carpentierGuyomard2001", "edgerton1997"]));
  expect(paragraphBibtex(paragraph)).toContain("pages = {222--229}");
});
