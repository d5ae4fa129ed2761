import type { FindingOf } from "../../shared/schemas/cell.ts";
import { dataFinding } from "../../shared/schemas/data.ts";
import { elasticitiesFinding } from "../../shared/schemas/elasticities.ts";
import { slutskyFinding } from "../../shared/schemas/slutsky.ts";
import { systemFinding } from "../../shared/schemas/system.ts";
import { testsFinding } from "../../shared/schemas/tests.ts";

/** Findings of two goods that fit their schemas, for tests of what carries findings about. The numbers mean nothing. */
const sha = (digit: string) => digit.repeat(64);
const zero = [
  [0, 0],
  [0, 0],
];
const point = { prices: [1, 1], total: 1, demographics: [] };
const law = { size: 0, holds: true };
const checks = {
  pointName: "base point",
  tolerance: 1e-8,
  addingUp: law,
  homogeneity: { ...law, status: "imposed" },
  symmetry: { ...law, status: "imposed" },
  negativity: { stated: true, largest: -0.1, standardError: 0.01, holds: true },
  monotonicity: { holds: true, lowest: 0.4, highest: 0.6 },
  sample: { rows: 5, monotonicity: { breaks: 0, weightedShareThatHolds: 1 } },
};
const fitted = {
  form: "aids",
  goods: ["grains", "sweet drinks"],
  demographics: [],
  alpha0: 0,
  imposed: ["homogeneity", "symmetry"],
  theta: [0.4, 0.6, 0, 0, 0, 0, 0, 0],
  covariance: Array.from({ length: 8 }, () => Array(8).fill(0)),
};

/** Row numbers that must never leave the study: recognisable wherever they turn up. */
export const ROW_NUMBERS = [700_001, 700_002];

export function exampleFindings(): {
  data: FindingOf<"data">;
  system: FindingOf<"system">;
  tests: FindingOf<"tests">;
  elasticities: FindingOf<"elasticities">;
  slutsky: FindingOf<"slutsky">;
} {
  const good = {
    meanShare: 0.5,
    shareDeviation: 0.1,
    boughtNone: 0,
    meanPrice: 1,
    logPriceDeviation: 0.1,
    meanQuantity: 2,
  };
  const strip = Array(100).fill(0);
  return {
    data: dataFinding.parse({
      kind: "data",
      dataFingerprint: sha("d"),
      upload: { name: "purchases.csv", rows: 7, columns: 4, sha256: sha("e") },
      goods: fitted.goods.map((name) => ({ name, ...good })),
      accounting: {
        uploaded: 7,
        leftOut: [
          {
            reason: "price not positive",
            label: "Left out: a price is not positive",
            count: 2,
            rows: ROW_NUMBERS,
            strip,
          },
        ],
        used: 5,
      },
      normalise: "mean",
      priceScale: [1, 1],
      totalScale: 1,
      meanTotal: 80,
      weighted: true,
      numericColumns: ["p1"],
      flags: [{ about: "outliers", sentence: "2 rows stand apart", rows: ROW_NUMBERS }],
    }),
    system: systemFinding.parse({
      kind: "system",
      dataFingerprint: sha("d"),
      fitted,
      coefficients: [{ block: "alpha", symbol: "α", good: "grains", estimate: 0.4, standardError: 0.01 }],
      estimator: "maximum likelihood",
      standardErrors: "conventional",
      dropped: "sweet drinks",
      rows: 5,
      weighted: true,
      freeCoefficients: 3,
      logLikelihood: 12,
      aic: -18,
      bic: -17,
      convergence: { iterations: 4, gradient: 1e-9, largestStep: 1e-9, condition: 10 },
      rSquared: [0.5, 0.5],
      systemRSquared: 0.5,
      residualCovariance: zero,
      tests: [],
      points: { base: point, mean: point },
      expenditureElasticities: [{ good: "grains", estimate: 0.8, standardError: 0.1 }],
      engel: {
        logTotal: [0, 1],
        shares: [
          [0.4, 0.6],
          [0.5, 0.5],
        ],
      },
      checks,
    }),
    tests: testsFinding.parse({
      kind: "tests",
      dataFingerprint: sha("d"),
      level: 0.05,
      rows: 5,
      covariance: "conventional",
      weighted: true,
      tests: [
        {
          hypothesis: "homogeneity",
          given: [],
          degreesOfFreedom: 1,
          wald: { statistic: 4, pValue: 0.0455 },
          likelihoodRatio: { statistic: 3, pValue: 0.0833 },
          score: { statistic: 2, pValue: 0.1573 },
          corrected: { statistic: 1, pValue: 0.3173 },
          laitinen: { absent: "Laitinen's test needs equations linear in their coefficients." },
        },
        { hypothesis: "demographics", because: "nothing to test", reason: "The system names no demographics." },
      ],
    }),
    elasticities: elasticitiesFinding.parse({
      kind: "elasticities",
      dataFingerprint: sha("d"),
      form: "aids",
      goods: fitted.goods,
      over: "means",
      shares: "predicted",
      index: "held",
      level: 0.95,
      standardErrors: "conventional",
      intervals: "normal",
      groups: [
        {
          name: "mean",
          total: 80,
          point,
          shares: [0.4, 0.6],
          expenditure: { values: [1, 1], errors: [0, 0], low: [1, 1], high: [1, 1] },
          uncompensated: { values: zero, errors: zero, low: zero, high: zero },
          compensated: { values: zero, errors: zero, low: zero, high: zero },
          classes: fitted.goods.map((good) => ({
            good,
            kind: "undecided",
            normal: "yes",
            incomeNeutral: false,
            giffen: "no",
          })),
          net: [
            [null, "undecided"],
            ["undecided", null],
          ],
          gross: [
            [null, "undecided"],
            ["undecided", null],
          ],
          notPositive: [],
        },
      ],
      checks,
      tests: [],
      without: [],
    }),
    slutsky: slutskyFinding.parse({
      kind: "slutsky",
      dataFingerprint: sha("d"),
      fitted,
      form: "share",
      pointName: "base point",
      point,
      priceScale: [1, 1],
      totalScale: 1,
      at: {
        shares: [0.4, 0.6],
        totalSlopes: [0, 0],
        priceSlopes: zero,
        share: zero,
        shareErrors: zero,
        quantity: zero,
        quantityErrors: zero,
        compensated: zero,
        compensatedErrors: zero,
        eigenvalues: [
          { value: -0.1, standardError: 0.01, vector: [0.7, -0.7], direction: "grains against sweet drinks" },
        ],
        checks,
      },
      tests: [],
      sample: {
        rows: 5,
        histogram: { edges: [-0.2, 0], shares: [1] },
        byTenth: Array(10).fill(1),
        breaksInRichestTenth: 0,
        breaks: 1,
        goods: ["sweet drinks"],
      },
      brokenRows: [
        {
          row: ROW_NUMBERS[0],
          total: 12.5,
          goods: ["sweet drinks"],
          lowestShare: -0.1,
          highestShare: 1.1,
          breaks: ["monotonicity"],
        },
      ],
    }),
  };
}
