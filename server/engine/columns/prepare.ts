import type { DataFinding, DataSpecification, RowAccounting } from "../../../shared/schemas/data.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import { groupThousands } from "../../../shared/study/words.ts";
import { Refusal } from "../refusal.ts";
import { Cancelled, QUIET, type RunControl } from "../run.ts";
import { clustersOf } from "./clusters.ts";
import { dataFingerprint } from "./data-fingerprint.ts";
import { type DerivedColumns, deriveColumns } from "./derive-columns.ts";
import { type FormedGood, formGood, sumOfGoods } from "./form-goods.ts";
import { labelledColumns } from "./labelled-columns.ts";
import { type LeftOut, leaveOut } from "./leave-out.ts";
import { numericColumns } from "./numeric-columns.ts";
import { pickRows } from "./pick-rows.ts";
import type { PreparedData, UploadTable } from "./prepared-data.ts";
import { qualityFlags } from "./quality-flags.ts";
import { type Roles, resolveRoles } from "./resolve-roles.ts";
import { mapColumn } from "./shared-memory.ts";
import { type Weights, weightedDeviation, weightedMean } from "./weighted.ts";

/**
 * The rows and columns of an upload that a data specification asks for, ready for estimation: shares
 * w_i = p_i q_i / x, logs of normalised prices and total, weights scaled to sum to T, and the finding with every
 * row accounted for (methods sections 1 and 6).
 *
 * @throws Refusal with every problem of the specification at once, each under its key; or, when no row is left,
 *   with what took the rows.
 */
export function prepareData(
  specification: DataSpecification,
  table: UploadTable,
  control: RunControl = QUIET,
): PreparedData {
  const step = (name: string, fraction: number) => {
    if (control.cancelled()) throw new Cancelled("Preparing the data was cancelled.");
    control.progress({ step: name, fraction });
  };
  step("reading columns", 0);
  const { derived, roles, goods, leftOut } = accountRows(specification, table, () => step("accounting for rows", 0.3));
  if (leftOut.accounting.used === 0) throw noRowLeft(leftOut.accounting, specification);
  step("forming shares", 0.5);
  const used = formColumns(specification, table, goods, roles, derived, leftOut);
  step("describing the data", 0.8);
  return describe(specification, table, roles, leftOut.accounting, used);
}

/** What a specification makes of an upload's columns, and what becomes of each of its rows. */
export function accountRows(specification: DataSpecification, table: UploadTable, onColumns: () => void = () => {}) {
  const problems: Problem[] = [];
  const derived = deriveColumns(specification, table, problems);
  const roles = resolveRoles(specification, derived.columns, problems);
  if (problems.length > 0) throw new Refusal(problems);
  onColumns();
  const goods = roles.goods.map((good) => formGood(good, table.rows));
  return { derived, roles, goods, leftOut: leaveOut(table.rows, goods, roles, derived) };
}

/** The columns of the rows used, in units of estimation, with what describing them still needs. */
type UsedColumns = Omit<PreparedData, "fingerprint" | "finding"> & {
  readonly prices: readonly Float64Array[];
  readonly meanTotal: number;
  readonly meanQuantities: readonly number[];
  readonly shareGaps?: Float64Array;
};

function formColumns(
  { normalise }: DataSpecification,
  table: UploadTable,
  goods: readonly FormedGood[],
  roles: Roles,
  derived: DerivedColumns,
  { reasonOf, accounting }: LeftOut,
): UsedColumns {
  const indices = new Int32Array(accounting.used);
  let next = 0;
  reasonOf.forEach((reason, row) => {
    if (reason === 0) indices[next++] = row;
  });
  const pick = (values: Float64Array) => pickRows(values, indices);
  const weights = roles.weight && scaledToCount(pick(roles.weight.values));
  const prices = goods.map(({ price }) => pick(price));
  const spent = goods.map(({ expenditure }) => pick(expenditure));
  const total = pick(roles.total?.values ?? sumOfGoods(goods, table.rows));
  const { shares, gaps } = formShares(spent, total);
  const scaleOf = (values: Float64Array) => (normalise === "mean" ? weightedMean(values, weights) : 1);
  const priceScale = prices.map(scaleOf);
  const totalScale = scaleOf(total);
  const logPrices = prices.map((values, at) =>
    logOf(values, priceScale[at], `the price of ${goods[at].name}`, indices),
  );
  const logTotal = logOf(total, totalScale, "total expenditure", indices);
  return {
    goods: goods.map(({ name }) => name),
    rows: accounting.used,
    rowNumbers: indices.map((row) => row + 1),
    shares,
    logPrices,
    logTotal,
    ...(weights && { weights }),
    ...(roles.cluster && { clusters: { column: roles.cluster.name, ...clustersOf(roles.cluster, indices) } }),
    ...(roles.time && { time: pick(roles.time.values) }),
    ...numericColumns(derived.columns, roles, indices),
    ...labelledColumns(derived.columns, roles.cluster?.name, indices),
    priceScale,
    totalScale,
    prices,
    meanTotal: weightedMean(total, weights),
    meanQuantities: spent.map((values, at) =>
      weightedMean(
        values.map((value, row) => value / prices[at][row]),
        weights,
      ),
    ),
    ...(roles.total && { shareGaps: gaps }),
  };
}

/** ln(v / scale); numbers at the edge of what doubles hold are refused rather than turned into infinities. */
function logOf(values: Float64Array, scale: number, what: string, indices: Int32Array): Float64Array {
  const logs = mapColumn(values, (value) => Math.log(value / scale));
  const spoiled = logs.findIndex((value) => !Number.isFinite(value));
  if (spoiled < 0) return logs;
  const row = indices[spoiled] + 1;
  const sentence = `In row ${row}, ${what} is ${values[spoiled]} and its mean over the rows used is ${scale}: their ratio has no finite logarithm.`;
  throw new Refusal([{ sentence, key: ["goods"], row }]);
}

function scaledToCount(weights: Float64Array): Float64Array {
  const scale = weights.length / weights.reduce((sum, weight) => sum + weight, 0);
  return mapColumn(weights, (weight) => weight * scale);
}

/** Shares of the goods' own sum, which exactly add to one, and by how much those of the total would have missed it. */
function formShares(spent: readonly Float64Array[], total: Float64Array) {
  const gaps = new Float64Array(total.length);
  const sums = new Float64Array(total.length);
  for (const values of spent) for (let row = 0; row < sums.length; row++) sums[row] += values[row];
  for (let row = 0; row < sums.length; row++) gaps[row] = Math.abs(sums[row] / total[row] - 1);
  return { shares: spent.map((values) => mapColumn(values, (value, row) => value / sums[row])), gaps };
}

function noRowLeft({ uploaded, leftOut }: RowAccounting, { weight, keep }: DataSpecification): Refusal {
  const count = groupThousands;
  const whole = `No row is left: ${leftOut.map(({ label, count: rows }) => `${count(rows)} ${label.replace("Left", "left")}`).join("; ")}.`;
  const problems: Problem[] = [{ sentence: `${whole} The upload has ${count(uploaded)}.` }];
  const largest = leftOut.reduce((most, entry) => (entry.count > most.count ? entry : most), leftOut[0]);
  const keys: Partial<Record<typeof largest.reason, string>> = { keep: "keep", "weight not positive": "weight" };
  const key = keys[largest.reason] ?? "goods";
  if (largest.reason === "weight not positive" && largest.count === uploaded) {
    const sentence = `${weight} is zero or below in all ${count(uploaded)} rows, so none of them counts.`;
    return new Refusal([{ sentence, key: ["weight"], column: weight, row: 1 }]);
  }
  if (largest.reason === "keep" && largest.count === uploaded) {
    return new Refusal([{ sentence: `None of the ${count(uploaded)} rows satisfies keep: ${keep}.`, key: ["keep"] }]);
  }
  return new Refusal(problems.map((problem) => ({ ...problem, key: [key], row: largest.rows[0] })));
}

function describe(
  specification: DataSpecification,
  table: UploadTable,
  roles: Roles,
  accounting: RowAccounting,
  used: UsedColumns,
): PreparedData {
  const { prices, meanTotal, meanQuantities, shareGaps, ...columns } = used;
  const fingerprint = dataFingerprint(columns);
  const goods = columns.goods.map((name, at) => describeGood(name, at, used, columns.weights));
  const flagged = { ...columns, goods, weights: columns.weights, shareGaps, clusterColumn: roles.cluster?.name };
  const finding: DataFinding = {
    kind: "data",
    dataFingerprint: fingerprint,
    upload: { name: table.name, rows: table.rows, columns: table.columns.length, sha256: table.sha256 },
    goods,
    accounting,
    normalise: specification.normalise,
    priceScale: [...columns.priceScale],
    totalScale: columns.totalScale,
    meanTotal,
    weighted: columns.weights !== undefined,
    ...(columns.clusters && { clusters: columns.clusters.labels.length }),
    ...(roles.time && { timeColumn: roles.time.name }),
    numericColumns: [...columns.numeric.keys()],
    flags: qualityFlags(flagged),
  };
  return { ...columns, fingerprint, finding };
}

function describeGood(name: string, at: number, used: UsedColumns, weights: Weights): DataFinding["goods"][number] {
  const shares = used.shares[at];
  const none = shares.map((share) => (share === 0 ? 1 : 0));
  return {
    name,
    meanShare: weightedMean(shares, weights),
    shareDeviation: weightedDeviation(shares, weights),
    boughtNone: weightedMean(none, weights),
    meanPrice: weightedMean(used.prices[at], weights),
    logPriceDeviation: weightedDeviation(used.logPrices[at], weights),
    meanQuantity: used.meanQuantities[at],
  };
}
