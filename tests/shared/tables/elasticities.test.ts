import { describe, expect, test } from "vitest";
import type { ElasticitiesFinding } from "../../../shared/schemas/elasticities.ts";
import { tableCsv } from "../../../shared/tables/csv.ts";
import { goodsTable, groupsTable, priceTable } from "../../../shared/tables/elasticities.ts";
import { elasticityTables } from "../../../shared/tables/elasticity-tables.ts";
import { elasticitiesSentence, elasticityNotes } from "../../../shared/tables/elasticity-words.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import { sampleElasticities } from "../../support/sample-elasticities.ts";

describe("the sentence", () => {
  test("of one point names every class beyond doubt, the undecided last", () => {
    expect(elasticitiesSentence(sampleElasticities(1))).toBe(
      "At the sample mean, by 95\u2009% intervals, meat is a luxury, grains is a necessity and dairy is undecided.",
    );
  });

  test("says so where no class is beyond doubt", () => {
    const finding = sampleElasticities(1);
    const [group] = finding.groups;
    const unsure = { ...group, classes: group.classes.map((one) => ({ ...one, kind: "undecided" as const })) };
    expect(elasticitiesSentence({ ...finding, groups: [unsure] })).toBe(
      "At the sample mean no good is a luxury or a necessity beyond doubt, by 95\u2009% intervals.",
    );
  });

  test("leaves the name of a column as it is written where a sentence begins", () => {
    const finding = sampleElasticities(3);
    const group = { name: "region = north", undefined: "no shares", rows: 4, weightShare: 0.1, total: 1 };
    const of = { ...finding, groupedBy: { of: "region" }, without: [group] };
    expect(elasticitiesSentence(of)).toContain(". region = north has none.");
    expect(elasticityNotes(of).at(-1)).toBe("region = north: no shares");
    const fifths = { ...of, groupedBy: { of: "income", quantiles: 5 }, without: [{ ...group, name: "lowest fifth" }] };
    expect(elasticitiesSentence(fifths)).toContain(". Lowest fifth has none.");
  });

  test("of groups names what holds in each of them, and where they differ most", () => {
    expect(elasticitiesSentence(sampleElasticities(3))).toBe(
      "In each of 3 groups, by 95\u2009% intervals, meat is a luxury and grains is a necessity. Meat varies most, its expenditure elasticity from 1.300 to 1.500.",
    );
  });

  test("names a Giffen good, and a group that has none", () => {
    const finding = sampleElasticities(1);
    const [group] = finding.groups;
    const classes = group.classes.map((one, i) => (i === 0 ? { ...one, giffen: "yes" as const } : one));
    const told: ElasticitiesFinding = {
      ...finding,
      groups: [{ ...group, classes }],
      without: [{ name: "urban = 1", total: 3, undefined: "The predicted share of dairy is −0.0120 there." }],
    };
    expect(elasticitiesSentence(told)).toMatch(/Grains is a Giffen good there\. Urban = 1 has none\.$/);
    expect(elasticityNotes(told)).toContain("Urban = 1: The predicted share of dairy is −0.0120 there.");
  });
});

describe("the conventions", () => {
  test("say how, where and by which shares", () => {
    expect(elasticityNotes(sampleElasticities(1))).toEqual([
      "Estimate over (standard error) by the delta method, conventional; intervals of 95\u2009%.",
      "Evaluated at the sample mean.",
      "The shares in the formulas are the model's predictions.",
    ]);
  });

  test("name the index of la-aids, rows weighted by what they spend, percentiles, and derivatives at some rows", () => {
    const notes = elasticityNotes({
      ...sampleElasticities(3),
      form: "la-aids",
      index: "exact",
      shares: "observed",
      over: "rows",
      intervals: "percentile",
      derivativeRows: { used: 46_296, of: 1_000_000 },
    }).join(" ");
    expect(notes).toContain("by the bootstrap's own percentiles");
    expect(notes).toContain("weighted by what it spends on the good");
    expect(notes).toContain("observed means, taken as known; the weights of Stone's index move with the shares");
    expect(notes).toContain("at 46,296 of 1,000,000 rows");
  });
});

describe("the tables", () => {
  test("one point: goods, then both matrices; groups: each comparison", () => {
    expect(elasticityTables(sampleElasticities(1)).map(({ name }) => name)).toEqual([
      "elasticities",
      "elasticities-uncompensated",
      "elasticities-compensated",
    ]);
    expect(elasticityTables(sampleElasticities(3)).map(({ name }) => name)).toEqual([
      "elasticities-expenditure",
      "elasticities-own-price",
      "elasticities-own-price-compensated",
    ]);
  });

  test("estimates stand over standard errors, three decimals, as LaTeX and CSV", () => {
    const finding = sampleElasticities(1);
    const latex = tableLatex(goodsTable(finding, finding.groups[0]));
    expect(latex).toContain("grains & 0.5000 & 0.700 & $-$0.500 & $-$0.150 & necessity");
    expect(latex).toContain("(0.010)");
    expect(tableCsv(priceTable(finding, finding.groups[0], "uncompensated"))).toContain(
      "grains,estimate,-0.5,0.01,-0.2",
    );
    const groups = groupsTable(sampleElasticities(3), "expenditure");
    expect(groups.title).toBe("Expenditure elasticities by total expenditure, aids");
    expect(groups.rows.map(({ label }) => label)).toEqual(["lowest third", "second third", "highest third"]);
  });
});

test("normal intervals of a bootstrapped system say why they are normal", () => {
  const finding = { ...sampleElasticities(1), over: "rows" as const, intervals: "normal" as const };
  const [of] = elasticityNotes({ ...finding, standardErrors: "bootstrap of rows, 500 replicates, seed 1" });
  expect(of).toContain("normal as the rows are too many to go over at every replicate.");
  expect(elasticityNotes({ ...finding, standardErrors: "conventional" })[0]).not.toContain("too many");
});
