import { Readable } from "node:stream";
import { beforeAll, describe, expect, test } from "vitest";
import {
  runData,
  runElasticities,
  runFigure,
  runPriceChange,
  runSlutsky,
  runSystem,
} from "../../../../server/engine/cells/index.ts";
import type { EstimatedSystem } from "../../../../server/engine/cells/two-stages.ts";
import { readCsv } from "../../../../server/engine/columns/read-csv.ts";
import { QUIET } from "../../../../server/engine/run.ts";
import { elasticitiesAt } from "../../../../shared/economics/elasticities.ts";
import type { ElasticitiesFinding } from "../../../../shared/schemas/elasticities.ts";
import { figureTable } from "../../../../shared/tables/figure.ts";
import { gap } from "../../../laws/derivatives.ts";
import { exactly } from "../../../support/fitted.ts";
import { specificationOf } from "../../../support/tuna.ts";
import { TREE, TREE_GOODS, treeCsv } from "../../../support/utility-tree-csv.ts";

const systems: Record<string, EstimatedSystem> = {};

async function estimated(goods: string, form: string, csv = treeCsv(), keys = ""): Promise<EstimatedSystem> {
  const { table } = await readCsv(Readable.from([Buffer.from(csv)]), "tree.csv");
  const data = runData(specificationOf("data", `upload: tree.csv\n${goods}${keys}`), table);
  return { data, finding: runSystem(specificationOf("system", `data: d\n${form}\n`), data) };
}

beforeAll(async () => {
  systems.food = await estimated(TREE_GOODS.food, "form: les\nconditional on: food");
  systems.budget = await estimated(TREE_GOODS.budget, "form: les");
  systems.early = await estimated(TREE_GOODS.budget, "form: les", treeCsv(), "keep: quarter < 3\n");
  systems.late = await estimated(TREE_GOODS.food, "form: les", treeCsv(), "keep: quarter > 2\n");
  systems.aids = await estimated(TREE_GOODS.food, "form: aids\nimpose: [homogeneity, symmetry]");
  systems.elsewhere = await estimated(TREE_GOODS.budget, "form: les", treeCsv(200, 5));
  systems.pence = await estimated(
    TREE_GOODS.budget.replace("food, expenditure: e_food", "food, expenditure: pence"),
    "form: les",
    treeCsv(),
    "derive: {pence: 100 * e_food}\n",
  );
});

const run = (keys = "", own = "food", broader = "budget"): ElasticitiesFinding =>
  runElasticities(
    specificationOf("elasticities", `system: s\nwithin: b\nas: food\n${keys}\n`),
    systems[own].finding,
    systems[own].data,
    QUIET,
    systems[broader],
  );

/** Of the utility the rows were made with, at the mean of the broader data. */
function truth() {
  const { data, finding } = systems.budget;
  const { prices, total } = finding.points.mean;
  const one = exactly("les", ["a", "b", "c", "d", "e"], [...TREE.committed, ...TREE.marginal]);
  const [, rent, travel] = prices.map((price, i) => price * data.priceScale[i]);
  // Prices of goods without committed quantities do not matter to an elasticity.
  return elasticitiesAt(one, { prices: [1, 1, 1, rent, travel], total: total * data.totalScale, demographics: [] });
}

describe("a group in a broader system", () => {
  test.each(["carpentier guyomard", "edgerton"])(
    "has the elasticities of the utility its rows were made with, %s",
    (formula) => {
      const { unconditional, conditionalOn, groups } = run(`unconditional: ${formula}`);
      const known = truth();
      expect(conditionalOn).toBe("food");
      const gapsInErrors = unconditional!.uncompensated.values.flatMap((row, i) =>
        row.map((value, j) => Math.abs(value - known.uncompensated[i][j]) / unconditional!.uncompensated.errors[i][j]),
      );
      expect(Math.max(...gapsInErrors)).toBeLessThan(4);
      expect(gap(unconditional!.expenditure.values, known.expenditure.slice(0, 3))).toBeLessThan(0.005);
      expect(
        gap(
          unconditional!.uncompensated.values.flat(),
          known.uncompensated.slice(0, 3).flatMap((row) => row.slice(0, 3)),
        ),
      ).toBeLessThan(0.005);
      expect(
        gap(
          unconditional!.others.compensated.values.flat(),
          known.compensated.slice(0, 3).flatMap((row) => row.slice(3)),
        ),
      ).toBeLessThan(0.005);
      expect(gap(unconditional!.shares, known.shares.slice(0, 3))).toBeLessThan(0.005);
      // Given what is spent on food, its goods have elasticities of one: the two are not the same numbers.
      expect(groups[0].expenditure.values[0]).toBeCloseTo(1, 1);
      expect(unconditional!.expenditure.values[0]).toBeGreaterThan(1.1);
    },
  );

  test("says what is spent on it in both, the group as a good, classes, and how far laws are missed", () => {
    // At the base point, means of prices and totals: what is spent on food is linear in them.
    const { unconditional } = run("at: base point");
    const { spent, asGood, identities, classes, pointName, others, form } = unconditional!;
    expect(spent.own / spent.broader).toBeCloseTo(1, 4);
    expect(asGood.share).toBeGreaterThan(0.3);
    expect(asGood.compensated.value).toBeCloseTo(
      asGood.uncompensated.value + asGood.share * asGood.expenditure.value,
      12,
    );
    for (const miss of Object.values(identities)) expect(miss).toBeLessThan(1e-10);
    expect(classes.map(({ good, kind }) => [good, kind])).toEqual(
      ["grains", "dairy", "meat"].map((good) => [good, "luxury"]),
    );
    expect({ pointName, others: others.goods, form }).toEqual({
      pointName: "base point",
      others: ["rent", "travel"],
      form: "les",
    });
  });

  test("has errors that hold whatever the correlation where both systems rest on the same rows, and else as independent", () => {
    expect(run().unconditional!.errors).toBe("bound");
    expect(run("", "late", "early").unconditional!.errors).toBe("independent");
    expect(run("", "food", "elsewhere").unconditional!.errors).toBe("independent");
  });

  test("meets it at the same row, quantile or base point; observed shares in both", () => {
    const row = run("at: {row: 7}\nshares: observed").unconditional!;
    const { data } = systems.budget;
    expect(row.asGood.share).toBe(data.shares[0][6]);
    expect(row.spent.own).toBeCloseTo(row.spent.broader, 10);
    expect(run("at: {x: quantile 0.75}").unconditional!.pointName).toBe("quantile 0.75 of expenditure");
    expect(run("at: base point").unconditional!.pointName).toBe("base point");
  });

  test("may be of another form than the broader system", () => {
    const { unconditional } = run("", "aids");
    expect(gap(unconditional!.expenditure.values, truth().expenditure.slice(0, 3))).toBeLessThan(0.02);
  });
});

test("matrices, figures and price changes of a group's own system say that they are conditional", () => {
  const { finding, data } = systems.food;
  const label = { caveats: ["conditional on a group"] };
  const matrix = runSlutsky(specificationOf("slutsky", "system: s\n"), finding, data);
  expect(matrix).toMatchObject({ ...label, conditionalOn: "food" });
  const figure = runFigure(specificationOf("figure", "system: s\nshow: engel curves\n"), finding, data);
  expect(figure).toMatchObject({ ...label, conditionalOn: "food" });
  expect(figureTable(figure).title).toMatch(/, conditional on food expenditure$/);
  const change = specificationOf("price change", "system: s\nprices: {grains: {per cent: 10}}\n");
  expect(runPriceChange(change, finding, data)).toMatchObject(label);
  expect(runElasticities(specificationOf("elasticities", "system: s\n"), finding, data)).toMatchObject({
    ...label,
    conditionalOn: "food",
  });
});

describe("is refused, in words with both numbers", () => {
  test("where what is spent on the group is of other units", () => {
    expect(() => run("", "food", "pence")).toThrow(
      /^The two systems do not meet at the mean: food takes \d+\.?\d* in the broader data, and the total of the group's own data is \d\.\d+\. Bring both/,
    );
  });

  test("at a row of two uploads, and for a good that is not there", () => {
    expect(() => run("at: {row: 3}", "food", "elsewhere")).toThrow(
      /^Row 3 is not the same in both systems: one is of tree\.csv/,
    );
    expect(() => run("", "food", "late")).toThrow(
      "The broader system has no good food; its goods are grains, dairy, meat.",
    );
  });
});
