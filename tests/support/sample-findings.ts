import { theoryChecksAt } from "../../shared/economics/checks.ts";
import { goodsOfDirection } from "../../shared/economics/eigenvalues.ts";
import { elasticitiesAt } from "../../shared/economics/elasticities.ts";
import { createRowChecker } from "../../shared/economics/sample.ts";
import { matrixAt } from "../../shared/economics/slutsky.ts";
import { multiply, transpose } from "../../shared/numerics/matrix.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { FindingOf } from "../../shared/schemas/cell.ts";
import { dataFinding } from "../../shared/schemas/data.ts";
import { type RefereeCopy, refereeCopy, type SealedContent } from "../../shared/schemas/referee-copy.ts";
import { slutskyFinding } from "../../shared/schemas/slutsky.ts";
import { type FittedSystem, systemFinding } from "../../shared/schemas/system.ts";
import { canonicalJson } from "../../shared/study/canonical-json.ts";
import { sha256Hex } from "../../shared/study/fingerprint.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { RestrictionName } from "../../shared/systems/names.ts";

/**
 * Findings of an almost ideal system over six goods as the engine would make them: coefficients chosen, everything
 * that follows from them computed, the sample simulated with a fixed seed.
 */
const GOODS = ["grains", "dairy", "produce", "meat & fish", "sweet drinks", "other food"];
const SHARES = [0.2424, 0.1284, 0.1674, 0.2204, 0.0633];
const BETA = [-0.0815, 0.0067, -0.0087, 0.0701, 0.0093];
const SIZE_SHIFT = [0.0228, -0.0094, -0.0106, 0.0089, 0.0059];
const URBAN_SHIFT = [-0.0288, 0.0123, 0.0057, 0.0037, 0.0105];
/** Compensated effects k_ij at the base point, upper triangle over the first five goods. */
const EFFECTS: Readonly<Record<string, number>> = {
  "0,0": -0.0744,
  "0,1": 0.0238,
  "0,2": 0.0315,
  "0,3": 0.0015,
  "0,4": 0.0025,
  "1,1": -0.0842,
  "1,2": 0.0134,
  "1,3": 0.0338,
  "1,4": 0.0021,
  "2,2": -0.0943,
  "2,3": 0.0368,
  "2,4": -0.0053,
  "3,3": -0.1374,
  "3,4": 0.0294,
  "4,4": -0.0547,
};
const PRICES = [6.2, 9.1, 7.4, 31, 4.8, 12];
const MEAN_TOTAL = 184.6;
const ROWS = 900;
const NOUGHT: Point = { prices: GOODS.map(() => 1), total: 1, demographics: [0, 0] };

const fill = (five: readonly number[], sum: number) => [...five, sum - five.reduce((total, value) => total + value, 0)];

function effect(i: number, j: number): number {
  const known = (a: number, b: number) => EFFECTS[`${Math.min(a, b)},${Math.max(a, b)}`];
  const others = [0, 1, 2, 3, 4];
  if (i < 5 && j < 5) return known(i, j);
  if (i === 5 && j === 5) return others.reduce((sum, a) => sum + others.reduce((row, b) => row + known(a, b), 0), 0);
  const one = Math.min(i, j);
  return -others.reduce((sum, other) => sum + known(one, other), 0);
}

/** θ of AIDS whose matrix at the base point is `EFFECTS`: γ_ij = k_ij + δ_ij w_i − w_i w_j. */
function theta(): number[] {
  const alpha = fill(SHARES, 1);
  const size = fill(SIZE_SHIFT, 0);
  const urban = fill(URBAN_SHIFT, 0);
  const gamma = alpha.map((w, i) => alpha.map((v, j) => effect(i, j) + (i === j ? w : 0) - w * v));
  return [...alpha, ...alpha.flatMap((_, i) => [size[i], urban[i]]), ...gamma.flat(), ...fill(BETA, 0)];
}

const SIZE = { goods: 6, demographics: 2, alpha0: 0 };

/** S diag(d²) S' + S u u' S': a covariance that respects every restriction imposed, standard errors about 0.002. */
function covariance(impose: readonly RestrictionName[]): number[][] {
  const { matrix } = SYSTEMS.aids.free(SIZE, impose);
  const random = seededRandom(7);
  const free = matrix[0].length;
  const shocks = Array.from({ length: free }, () =>
    Array.from({ length: free + 20 }, () => (0.002 * random.normal()) / Math.sqrt(free + 20)),
  );
  const spread = multiply(matrix, shocks);
  return multiply(spread, transpose(spread));
}

export function sampleFitted(impose: readonly RestrictionName[] = ["homogeneity", "symmetry"]): FittedSystem {
  return {
    form: "aids",
    goods: GOODS,
    demographics: ["log_size", "urban"],
    alpha0: 0,
    imposed: [...impose],
    theta: theta(),
    covariance: covariance(impose),
  };
}

function simulatedRows() {
  const random = seededRandom(11);
  return Array.from({ length: ROWS }, (_, t) => ({
    row: t + 1 + Math.floor(t / 40),
    logPrices: GOODS.map(() => 0.22 * random.normal()),
    logTotal: 0.62 * random.normal() - 0.19,
    demographics: [0.5 * random.normal(), random.uniform() < 0.43 ? 1 : 0],
  }));
}

/** Negativity and monotonicity at every simulated row, as the engine counts them, without weights. */
function overRows(fitted: FittedSystem) {
  const checker = createRowChecker(fitted);
  const rows = simulatedRows().map((row) => {
    checker.evaluate(row.logPrices, row.logTotal, row.demographics);
    const monotone = checker.monotonicityHolds();
    const eigenvalue = checker.largestEigenvalue();
    const breaks = [
      ...(eigenvalue > 1e-8 ? (["negativity"] as const) : []),
      ...(monotone ? [] : (["monotonicity"] as const)),
    ];
    return {
      row: row.row,
      logTotal: row.logTotal,
      total: Math.exp(row.logTotal) * MEAN_TOTAL,
      largestEigenvalue: eigenvalue,
      goods: goodsOfDirection(checker.vector(), fitted.goods),
      lowestShare: checker.lowestShare(),
      highestShare: checker.highestShare(),
      breaks,
    };
  });
  const broken = rows.filter((row) => row.breaks.length > 0).sort((a, b) => b.largestEigenvalue - a.largestEigenvalue);
  const negative = broken.filter((row) => row.breaks.includes("negativity"));
  const monotone = broken.filter((row) => row.breaks.includes("monotonicity"));
  const byTotal = rows.toSorted((a, b) => a.logTotal - b.logTotal);
  const holds = (some: typeof rows) => some.filter((row) => row.largestEigenvalue <= 1e-8).length / some.length;
  const tenth = ROWS / 10;
  const width = 0.004;
  const first = Math.floor(Math.min(...rows.map((row) => row.largestEigenvalue)) / width);
  const bins = Math.floor(Math.max(...rows.map((row) => row.largestEigenvalue)) / width) - first + 1;
  const inBin = (bin: number) => rows.filter((row) => Math.floor(row.largestEigenvalue / width) - first === bin).length;
  const counted = (breaks: number) => ({ breaks, weightedShareThatHolds: 1 - breaks / ROWS });
  return {
    checks: {
      rows: ROWS,
      negativity: counted(negative.length),
      monotonicity: counted(monotone.length),
      regular: counted(broken.length),
    },
    brokenRows: broken.map(({ logTotal: _, ...row }) => row),
    sample: {
      rows: ROWS,
      histogram: {
        edges: Array.from({ length: bins + 1 }, (_, bin) => (first + bin) * width),
        shares: Array.from({ length: bins }, (_, bin) => inBin(bin) / ROWS),
      },
      byTenth: Array.from({ length: 10 }, (_, k) => holds(byTotal.slice(k * tenth, (k + 1) * tenth))),
      breaksInRichestTenth: byTotal.slice(9 * tenth).filter((row) => row.largestEigenvalue > 1e-8).length,
      breaks: negative.length,
      goods: [...new Set(negative.flatMap((row) => row.goods))],
    },
  };
}

const TESTS = [
  {
    restriction: "homogeneity" as const,
    statistic: 6.2,
    degreesOfFreedom: 5,
    pValue: 0.286,
    corrected: { statistic: 6.1, pValue: 0.297 },
  },
  {
    restriction: "symmetry given homogeneity" as const,
    statistic: 18.1,
    degreesOfFreedom: 10,
    pValue: 0.053,
    corrected: { statistic: 18, pValue: 0.054 },
  },
];

function coefficientsOf(fitted: FittedSystem) {
  const blocks = SYSTEMS[fitted.form].blocks;
  return SYSTEMS[fitted.form].layout(SIZE).map((place, index) => {
    const block = blocks.find((one) => one.name === place.block);
    const names = block?.columns === "goods" ? fitted.goods : fitted.demographics;
    return {
      block: place.block,
      symbol: block?.symbol ?? place.block,
      good: fitted.goods[place.good],
      ...(place.column !== undefined && { column: names[place.column] }),
      estimate: fitted.theta[index],
      standardError: Math.sqrt(fitted.covariance[index][index]),
    };
  });
}

export function sampleSystem(fitted = sampleFitted()): FindingOf<"system"> {
  const elasticities = elasticitiesAt(fitted, NOUGHT);
  const logTotal = Array.from({ length: 25 }, (_, k) => -1.6 + (k * 2.9) / 24);
  const shares = logTotal.map(
    (log) => SYSTEMS.aids.slopes(fitted.theta, SIZE, { ...NOUGHT, total: Math.exp(log) }).shares,
  );
  return systemFinding.parse({
    kind: "system",
    dataFingerprint: sha256Hex("sample data"),
    fitted,
    coefficients: coefficientsOf(fitted),
    estimator: "maximum likelihood",
    standardErrors: "conventional",
    dropped: "other food",
    rows: ROWS,
    weighted: true,
    freeCoefficients: SYSTEMS.aids.free(SIZE, fitted.imposed).matrix[0].length,
    logLikelihood: 8055.71,
    aic: -16041.42,
    bic: -15873.34,
    convergence: { iterations: 5, gradient: 3e-11, largestStep: 2e-12, condition: 5400 },
    rSquared: [0.46, 0.06, 0.07, 0.4, 0.1, 0.07],
    systemRSquared: 0.36,
    residualCovariance: GOODS.map((_, i) => GOODS.map((_, j) => (i === j ? 0.004 : -0.0008))),
    tests: TESTS,
    points: { base: NOUGHT, mean: { ...NOUGHT, total: 0.83 } },
    expenditureElasticities: GOODS.map((good, i) => ({
      good,
      estimate: elasticities.expenditure[i],
      standardError: elasticities.expenditureErrors[i],
    })),
    engel: { logTotal, shares: GOODS.map((_, i) => shares.map((row) => row[i])) },
    checks: { ...theoryChecksAt(fitted, NOUGHT, "base point"), sample: overRows(fitted).checks },
  });
}

export function sampleSlutsky(form: "share" | "quantity" = "share", fitted = sampleFitted()): FindingOf<"slutsky"> {
  const { sample, brokenRows, checks } = overRows(fitted);
  const at = matrixAt(fitted, NOUGHT, { priceScale: PRICES, totalScale: MEAN_TOTAL, pointName: "base point" });
  return slutskyFinding.parse({
    kind: "slutsky",
    dataFingerprint: sha256Hex("sample data"),
    fitted,
    form,
    pointName: "base point",
    point: NOUGHT,
    priceScale: PRICES,
    totalScale: MEAN_TOTAL,
    at: { ...at, checks: { ...at.checks, sample: checks } },
    tests: TESTS,
    sample,
    brokenRows,
  });
}

const LEFT_OUT = [
  ["keep", "Left out by keep: members <= 12", 13],
  ["missing value", "Left out: a price missing", 8],
  ["price not positive", "Left out: a price of zero", 2],
] as const;

export function sampleData(): FindingOf<"data"> {
  const deviations = [0.0762, 0.0451, 0.0503, 0.0702, 0.0337, 0.0503];
  const logPrices = [0.226, 0.23, 0.223, 0.219, 0.201, 0.243];
  const none = [0, 0.003, 0, 0.003, 0.032, 0];
  const means = fill([0.2515, 0.1263, 0.1706, 0.2071, 0.0641], 1);
  return dataFinding.parse({
    kind: "data",
    dataFingerprint: sha256Hex("sample data"),
    upload: { name: "purchases-2031.csv", rows: ROWS + 23, columns: 31, sha256: sha256Hex("sample upload") },
    goods: GOODS.map((name, i) => ({
      name,
      meanShare: means[i],
      shareDeviation: deviations[i],
      boughtNone: none[i],
      meanPrice: PRICES[i],
      logPriceDeviation: logPrices[i],
      meanQuantity: (means[i] * MEAN_TOTAL) / PRICES[i],
    })),
    accounting: {
      uploaded: ROWS + 23,
      leftOut: LEFT_OUT.map(([reason, label, count], index) => {
        const rows = Array.from({ length: count }, (_, k) => (index === 1 ? 500 + k : 17 + 69 * k));
        const strip = new Array<number>(100).fill(0);
        for (const row of rows) strip[Math.floor(((row - 1) / (ROWS + 23)) * 100)]++;
        return { reason, label, count, rows, strip };
      }),
      used: ROWS,
    },
    normalise: "mean",
    priceScale: PRICES,
    totalScale: MEAN_TOTAL,
    meanTotal: MEAN_TOTAL,
    weighted: true,
    clusters: 212,
    timeColumn: "month",
    numericColumns: ["members", "urban", "log_size"],
    flags: [
      {
        about: "zeros",
        sentence: "sweet drinks are not bought in 3.2\u2009% of the rows; shares are taken as they are.",
        rows: [],
      },
      {
        about: "outliers",
        sentence: "9 unit values lie more than five median deviations from their village. They are kept.",
        rows: [4, 88, 131, 276, 300, 412, 555, 701, 866],
      },
      { about: "price variation", sentence: "Standard deviations of log prices run from 0.201 to 0.243.", rows: [] },
    ],
  });
}

const SOURCES = [
  {
    name: "survey",
    kind: "data",
    source:
      "upload: purchases-2031.csv\ngoods:\n  grains: {price: p_grains, expenditure: e_grains}\nweight: survey_weight\nkeep: members <= 12\n",
  },
  {
    name: "base",
    kind: "system",
    source: "data: survey\nform: aids\ndemographics: [log_size, urban]\nimpose: [homogeneity, symmetry]\n",
  },
  { name: "matrix", kind: "slutsky", source: "system: base\nat: base point\nform: share\n" },
];

export function sampleContent(): SealedContent {
  const { brokenRows: _, ...slutsky } = sampleSlutsky();
  const { accounting, meanTotal, weighted, dataFingerprint } = sampleData();
  return {
    format: "tangency referee copy 1",
    program: "Tangency 0.1.0",
    study: { title: "Food demand in Velmark, 2029–31" },
    note: "The Slutsky matrix of Table 4.",
    sealedAt: "2032-03-09T16:20:00.000Z",
    cells: { sources: SOURCES, matrix: "matrix", system: "base", data: "survey" },
    slutsky,
    system: sampleSystem(),
    accounting: {
      ...accounting,
      leftOut: accounting.leftOut.map(({ reason, label, count }) => ({ reason, label, count })),
    },
    data: { meanTotal, weighted, fingerprint: dataFingerprint },
  };
}

/** A referee copy whose fingerprint is that of its content. */
export function sampleCopy(content: SealedContent = sampleContent()): RefereeCopy {
  return refereeCopy.parse({ fingerprint: sha256Hex(canonicalJson(content)), content });
}
