import { type ElasticitiesFinding, elasticitiesFinding } from "../../shared/schemas/elasticities.ts";
import type { UnconditionalFinding } from "../../shared/schemas/two-stage.ts";
import { sampleElasticities } from "./sample-elasticities.ts";

const Z = 1.959963984540054;
const one = (value: number, error: number) => ({ value, error, low: value - Z * error, high: value + Z * error });

/** The three goods of the sample as those of food, in a budget of food, rent and travel. The numbers are invented. */
export function sampleTwoStage(more: Partial<UnconditionalFinding> = {}): ElasticitiesFinding {
  const conditional = sampleElasticities(1);
  const [group] = conditional.groups;
  const { expenditure, uncompensated, compensated, shares, classes, net, gross } = group;
  const halved = ({ values, errors }: { values: number[]; errors: number[] }) => {
    const all = values.map((value, i) => one(value / 2, errors[i]));
    return {
      values: all.map(({ value }) => value),
      errors,
      low: all.map(({ low }) => low),
      high: all.map(({ high }) => high),
    };
  };
  const rows = (values: number[][]) => {
    const each = values.map((row) => halved({ values: row, errors: row.map(() => 0.03) }));
    return {
      values: each.map((row) => row.values),
      errors: each.map((row) => row.errors),
      low: each.map((row) => row.low),
      high: each.map((row) => row.high),
    };
  };
  return elasticitiesFinding.parse({
    ...conditional,
    caveats: ["conditional on a group"],
    conditionalOn: "food",
    unconditional: {
      formula: "carpentier guyomard",
      group: "food",
      form: "les",
      pointName: "mean",
      standardErrors: "conventional",
      errors: "bound",
      spent: { own: 80, broader: 82.5 },
      asGood: {
        share: 0.4,
        expenditure: one(0.5, 0.02),
        uncompensated: one(-0.6, 0.03),
        compensated: one(-0.4, 0.03),
      },
      shares: shares.map((share) => 0.4 * share),
      expenditure: halved(expenditure),
      uncompensated: rows(uncompensated.values),
      compensated: rows(compensated.values),
      classes: classes.map((each) => ({ ...each, kind: "necessity" })),
      net,
      gross,
      others: {
        goods: ["rent", "travel"],
        uncompensated: rows(uncompensated.values.map(([first, second]) => [first, second])),
        compensated: rows(compensated.values.map(([first, second]) => [first, second])),
      },
      identities: { engel: 1e-16, cournot: 2e-16, groupPrice: 0, homogeneity: 1e-16, symmetry: 1e-16 },
      ...more,
    },
  });
}
