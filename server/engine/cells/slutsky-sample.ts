import { statesNegativity, TOLERANCE } from "../../../shared/economics/checks.ts";
import { goodsOfDirection } from "../../../shared/economics/eigenvalues.ts";
import type { RowChecker } from "../../../shared/economics/sample.ts";
import type { SlutskyFinding } from "../../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { type FittedCoefficients, whyNotDefined } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { RunControl } from "../run.ts";
import { forEachRow } from "./rows.ts";
import { tenths } from "./weighted.ts";

type Sample = NonNullable<SlutskyFinding["sample"]>;
type BrokenRow = SlutskyFinding["brokenRows"][number];

const MOST_BROKEN_ROWS = 500;
const BINS = 40;

/**
 * Negativity over the sample: the largest eigenvalue at every row used, where it breaks, by which goods and
 * in which tenth of expenditure (methods 3.1). `sample` is absent where negativity is not stated; rows whose
 * predicted shares leave [0, 1], and rows in which the system is not defined, are listed all the same.
 */
export function negativityOverRows(
  fitted: SystemFinding["fitted"],
  data: PreparedData,
  control: RunControl,
): { sample?: Sample; brokenRows: BrokenRow[] } {
  const largest = new Float64Array(data.rows);
  const broken: BrokenRow[] = [];
  const carriers = new Map<string, number>();
  const stated = statesNegativity(fitted);
  forEachRow(fitted, data, control, (row, t) => {
    if (!row.isDefined()) {
      largest[t] = Number.NaN;
      broken.push(undefinedRow(row, t, data, fitted.form));
      if (broken.length > 4 * MOST_BROKEN_ROWS) keepWorst(broken);
      return;
    }
    if (stated) largest[t] = row.largestEigenvalue();
    const breaksNegativity = stated && largest[t] > TOLERANCE;
    if (!breaksNegativity && row.monotonicityHolds()) return;
    const goods = breaksNegativity ? goodsOfDirection(row.vector(), fitted.goods) : outside(row, fitted.goods);
    if (breaksNegativity) for (const good of goods) carriers.set(good, (carriers.get(good) ?? 0) + 1);
    broken.push(brokenRow(row, t, data, goods, stated ? largest[t] : undefined));
    if (broken.length > 4 * MOST_BROKEN_ROWS) keepWorst(broken);
  });
  keepWorst(broken);
  if (!stated) return { brokenRows: broken };
  const goods = [...carriers].sort((a, b) => b[1] - a[1] || fitted.goods.indexOf(a[0]) - fitted.goods.indexOf(b[0]));
  return {
    sample: summary(
      largest,
      data,
      goods.map(([good]) => good),
      whyNotDefined(fitted.form),
    ),
    brokenRows: broken,
  };
}

function brokenRow(row: RowChecker, t: number, data: PreparedData, goods: string[], eigenvalue?: number): BrokenRow {
  return {
    row: data.rowNumbers[t],
    total: Math.exp(data.logTotal[t]) * data.totalScale,
    ...(eigenvalue !== undefined && { largestEigenvalue: eigenvalue }),
    goods,
    lowestShare: row.lowestShare(),
    highestShare: row.highestShare(),
    breaks: [
      ...(eigenvalue !== undefined && eigenvalue > TOLERANCE ? (["negativity"] as const) : []),
      ...(row.monotonicityHolds() ? [] : (["monotonicity"] as const)),
    ],
  };
}

/** Where no law is judged; shares are told where there are some (QUAIDS). */
function undefinedRow(row: RowChecker, t: number, data: PreparedData, form: FittedCoefficients["form"]): BrokenRow {
  const [lowestShare, highestShare] = [row.lowestShare(), row.highestShare()];
  return {
    row: data.rowNumbers[t],
    total: Math.exp(data.logTotal[t]) * data.totalScale,
    goods: [],
    ...(Number.isFinite(lowestShare) && { lowestShare, highestShare }),
    notDefined: whyNotDefined(form),
    breaks: [],
  };
}

/** Goods whose predicted share is none. */
function outside(row: RowChecker, goods: readonly string[]): string[] {
  return goods.filter((_, i) => row.shares[i] < 0 || row.shares[i] > 1);
}

/** Where nothing is defined first, then the largest eigenvalues, then the shares furthest below nought; the first `MOST_BROKEN_ROWS` of them. */
function keepWorst(broken: BrokenRow[]): void {
  const size = ({ breaks, largestEigenvalue, notDefined }: BrokenRow) => {
    if (notDefined !== undefined) return Number.POSITIVE_INFINITY;
    return breaks.includes("negativity") ? (largestEigenvalue ?? 0) : Number.NEGATIVE_INFINITY;
  };
  broken.sort((a, b) => {
    const [left, right] = [size(a), size(b)];
    return left === right ? (a.lowestShare ?? 0) - (b.lowestShare ?? 0) || a.row - b.row : right - left;
  });
  broken.length = Math.min(broken.length, MOST_BROKEN_ROWS);
}

function summary(largest: Float64Array, data: PreparedData, goods: string[], reason: string): Sample {
  const tenth = tenths(data.logTotal, data.weights);
  const weightOf = (t: number) => (data.weights ? data.weights[t] : 1);
  const holding = new Array<number>(10).fill(0);
  const weight = new Array<number>(10).fill(0);
  const breaks = new Array<number>(10).fill(0);
  const without = new Array<number>(10).fill(0);
  let weightWithout = 0;
  for (let t = 0; t < data.rows; t++) {
    const holds = largest[t] <= TOLERANCE;
    weight[tenth[t]] += weightOf(t);
    if (Number.isNaN(largest[t])) {
      without[tenth[t]]++;
      weightWithout += weightOf(t);
    } else if (holds) holding[tenth[t]] += weightOf(t);
    else breaks[tenth[t]]++;
  }
  const all = weight.reduce((sum, one) => sum + one, 0);
  const rows = without.reduce((sum, count) => sum + count, 0);
  return {
    rows: data.rows,
    ...(rows > 0 && { undefined: { rows, weightedShare: weightWithout / all, reason } }),
    histogram: histogramOf(largest, weightOf),
    // A tenth without a row (fewer than ten rows, or one row of great weight) breaks nothing.
    byTenth: weight.map((ofTenth, i) => (breaks[i] + without[i] === 0 ? 1 : holding[i] / ofTenth)),
    breaksInRichestTenth: breaks[9],
    breaks: breaks.reduce((sum, count) => sum + count, 0),
    goods,
  };
}

/**
 * Equal bins of which nought is an edge, so that no bin holds rows of both signs; shares of the weight of all rows, also
 * of those without a value.
 */
function histogramOf(values: Float64Array, weightOf: (t: number) => number): Sample["histogram"] {
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    lowest = Math.min(lowest, value);
    highest = Math.max(highest, value);
  }
  if (highest < lowest) return { edges: [-1, 0], shares: [0] };
  const width = (highest - lowest) / (BINS - 1) || Math.abs(highest) || 1;
  const first = Math.floor(lowest / width);
  const count = Math.max(1, Math.floor(highest / width) - first + 1);
  const shares = new Array<number>(count).fill(0);
  let total = 0;
  for (let t = 0; t < values.length; t++) {
    total += weightOf(t);
    if (Number.isNaN(values[t])) continue;
    const bin = Math.min(count - 1, Math.max(0, Math.floor(values[t] / width) - first));
    shares[bin] += weightOf(t);
  }
  return {
    edges: Array.from({ length: count + 1 }, (_, i) => (first + i) * width),
    shares: shares.map((share) => share / total),
  };
}
