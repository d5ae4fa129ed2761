import { expect, test } from "vitest";
import { createRowChecker } from "../../shared/economics/sample.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { exactly } from "../support/fitted.ts";

/**
 * Berndt & Wood's (1975) manufacturing cost shares 1947–71 as W. H. Greene, Econometric Analysis, 5th ed. (2003),
 * chapter 14 fits them: translog shares s = α + Γ ln p, symmetry and homogeneity imposed, materials dropped,
 * iterated SUR. Coefficients, fitted shares and elasticities were recomputed with R's systemfit 1.1.28; prices
 * are R's AER `ManufactCosts`. Shares without a total are an almost ideal system with β = 0, so its Slutsky
 * matrix is theirs. Ten digits of the coefficients were kept, five of the elasticities.
 */
const GOODS = ["capital", "labour", "energy", "materials"];
const CAPITAL = [0.0294832676, -0.0000470909, -0.0106754149];
const LABOUR = [-0.0000470909, 0.0754328717, -0.0047563365];
const ENERGY = [-0.0106754149, -0.0047563365, 0.0183386989];

function withLast(entries: readonly number[], total: number): number[] {
  return [...entries, entries.reduce((rest, entry) => rest - entry, total)];
}

const rows = [CAPITAL, LABOUR, ENERGY].map((row) => withLast(row, 0));
const last = rows[0].map((_, j) => -rows.reduce((sum, row) => sum + row[j], 0));
const alpha = withLast([0.0568924781, 0.2534380119, 0.0444099934], 1);
const fitted = exactly("aids", GOODS, [...alpha, ...[...rows, last].flat(), 0, 0, 0, 0]);

/** Capital, labour, energy, materials; 1947 = 1. */
const PRICES = [
  [1, 1, 1, 1],
  [1.0027, 1.15457, 1.30258, 1.05525],
  [0.74371, 1.15584, 1.19663, 1.06625],
  [0.92497, 1.23535, 1.12442, 1.1243],
  [1.04877, 1.33784, 1.25179, 1.21694],
  [0.99744, 1.37949, 1.27919, 1.19961],
  [1.00653, 1.43458, 1.27505, 1.19044],
  [1.08757, 1.45362, 1.30356, 1.20612],
  [1.10315, 1.5112, 1.34277, 1.23835],
  [0.99606, 1.58186, 1.37154, 1.29336],
  [1.06321, 1.64641, 1.3801, 1.30703],
  [1.15619, 1.67389, 1.39338, 1.32699],
  [1.30758, 1.7343, 1.36756, 1.30774],
  [1.25413, 1.7828, 1.38025, 1.33946],
  [1.26328, 1.81977, 1.3763, 1.34319],
  [1.26525, 1.88531, 1.37689, 1.34745],
  [1.32294, 1.93379, 1.34737, 1.33143],
  [1.32798, 2.00998, 1.38969, 1.35197],
  [1.40659, 2.05539, 1.38635, 1.37542],
  [1.451, 2.13441, 1.40102, 1.41878],
  [1.38617, 2.20616, 1.39197, 1.42428],
  [1.49901, 2.33869, 1.43388, 1.43481],
  [1.44957, 2.46412, 1.46481, 1.53356],
  [1.32464, 2.60532, 1.45907, 1.54758],
  [1.20177, 2.76025, 1.64689, 1.54978],
];

test("fitted shares and compensated elasticities of 1959", () => {
  const point = { prices: PRICES[12], total: 1, demographics: [] };
  const { shares, compensated } = matrixAt(fitted, point, {
    priceScale: [1, 1, 1, 1],
    totalScale: 1,
    pointName: "1959",
  });
  [0.05639809, 0.27452024, 0.04388882, 0.62519286].forEach((share, i) => {
    expect(shares[i]).toBeCloseTo(share, 8);
  });
  const printed = [
    [-0.42083, 0.27369, -0.1454, 0.29254],
    [0.05623, -0.4507, 0.02656, 0.36791],
    [-0.18684, 0.16615, -0.53827, 0.55896],
    [0.02639, 0.16155, 0.03924, -0.22718],
  ];
  for (const [i, row] of printed.entries()) {
    for (const [j, entry] of row.entries()) expect(compensated[i][j]).toBeCloseTo(entry, 5);
  }
});

test("negativity holds in all 25 years, least in the one that was published", () => {
  const checker = createRowChecker(fitted);
  const largest = PRICES.map((prices) => {
    checker.evaluate(prices.map(Math.log), 0, []);
    expect(checker.negativityHolds()).toBe(true);
    return checker.largestEigenvalue();
  });
  expect(Math.max(...largest)).toBeCloseTo(-0.0101281843, 10);
});
