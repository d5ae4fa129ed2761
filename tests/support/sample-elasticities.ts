import {
  type ElasticitiesFinding,
  type ElasticityGroup,
  elasticitiesFinding,
} from "../../shared/schemas/elasticities.ts";
import { exampleFindings } from "./findings.ts";

const GOODS = ["grains", "dairy", "meat"];
const Z = 1.959963984540054;

const matrixOf = (values: number[][], error: number) => ({
  values,
  errors: values.map((row) => row.map(() => error)),
  low: values.map((row) => row.map((value) => value - Z * error)),
  high: values.map((row) => row.map((value) => value + Z * error)),
});

function group(name: string, meat: number, rows?: number): ElasticityGroup {
  const expenditure = [0.7, 1.005, meat];
  const errors = [0.01, 0.01, 0.01];
  return {
    name,
    ...(rows !== undefined && { rows, weightShare: 1 / 3 }),
    total: 80,
    shares: [0.5, 0.3, 0.2],
    expenditure: {
      values: expenditure,
      errors,
      low: expenditure.map((value) => value - Z * 0.01),
      high: expenditure.map((value) => value + Z * 0.01),
    },
    uncompensated: matrixOf(
      [
        [-0.5, 0.01, -0.2],
        [-0.1, -0.9, 0],
        [0.3, -0.1, -1.2],
      ],
      0.02,
    ),
    compensated: matrixOf(
      [
        [-0.15, 0.2, -0.05],
        [0.4, -0.6, 0.2],
        [0.5, 0.3, -0.9],
      ],
      0.02,
    ),
    classes: GOODS.map((good, i) => ({
      good,
      kind: (["necessity", "undecided", "luxury"] as const)[i],
      normal: "yes",
      incomeNeutral: false,
      giffen: "no",
    })),
    net: [
      [null, "substitutes", "complements"],
      ["substitutes", null, "substitutes"],
      ["substitutes", "substitutes", null],
    ],
    gross: [
      [null, "undecided", "complements"],
      ["complements", null, "undecided"],
      ["substitutes", "complements", null],
    ],
    notPositive: [],
  };
}

/** Elasticities of three goods at one point, or in thirds of total expenditure. The numbers are invented. */
export function sampleElasticities(groups: 1 | 3): ElasticitiesFinding {
  const { checks } = exampleFindings().system;
  return elasticitiesFinding.parse({
    kind: "elasticities",
    dataFingerprint: "d".repeat(64),
    form: "aids",
    goods: GOODS,
    over: "means",
    shares: "predicted",
    index: "held",
    level: 0.95,
    standardErrors: "conventional",
    intervals: "normal",
    ...(groups === 3 && { groupedBy: { of: "total expenditure", quantiles: 3 } }),
    groups:
      groups === 1
        ? [group("mean", 1.4)]
        : [group("lowest third", 1.5, 100), group("second third", 1.4, 120), group("highest third", 1.3, 110)],
    checks,
    tests: [],
    without: [],
  });
}
