import { whyNoCost } from "../../../shared/economics/price-change/exact-welfare.ts";
import { isTax } from "../../../shared/economics/price-change/question.ts";
import type {
  Incidence,
  PriceChangeSpecification,
  PriceQuestion,
  UnseenPrice,
} from "../../../shared/schemas/price-change.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { onSharedMemory } from "../columns/shared-memory.ts";
import { Refusal } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { mapInOrder } from "../threads/map-in-order.ts";
import type { RowGroup } from "./elasticity-groups.ts";
import { demographicColumns } from "./points.ts";
import { type MeanDerivatives, meanDerivatives } from "./price-change-derivatives.ts";
import { describedGroup, gapInWords, gapsInWords, type Told } from "./price-change-group.ts";
import { type IncidenceRows, incidenceRows } from "./price-change-groups.ts";
import { mergeNamed } from "./price-change-named.ts";
import {
  type ChangedRows,
  type ChangedSums,
  newUnseen,
  sumChangedRows,
  sumPlace,
  sumsOf,
} from "./price-change-rows.ts";

/** Rows summed by themselves; what is summed with what depends on nothing else. */
const CHUNK_ROWS = 16384;
/** Multiplications a row comes to, by the square of the number of goods: seven evaluations of shares or cost. */
const PRODUCTS = 14;

/** Lowest and highest price of each good among the rows used, units of estimation. */
export type PriceRange = ChangedRows["priceRange"];

/**
 * Who bears a price change: every row at its own prices, total and demographics, keeping its residual, by group and over
 * all (methods 3.4). Standard errors by the delta method from the rows' mean derivatives.
 * Errors: `Refusal` of groups or an equivalence scale that are none, and where no row has an answer; `Cancelled`.
 */
export function incidenceOver(
  specification: PriceChangeSpecification,
  system: SystemFinding,
  data: PreparedData,
  priceRange: PriceRange,
  control: RunControl,
): Incidence {
  const { fitted } = system;
  const question: PriceQuestion = { prices: specification.prices, expenditure: specification.expenditure };
  const parted = incidenceRows(specification, data);
  const noCost = whyNoCost(fitted);
  const { threads, ...alone } = control;
  const divided = threads !== undefined && data.rows * PRODUCTS * data.goods.length ** 2 >= threads.worthDividing;
  const running: RunControl = divided ? control : alone;
  const rows = changedRows(question, system, data, parted, priceRange, noCost === undefined);
  const { groupSums, named, unseen } = summed(rows, data.rows, running);
  const members = parted.groups.map((group) => group.rows);
  const { means, used } = meanDerivatives(rows, members, running);
  const told: Told = {
    fitted,
    question,
    data,
    level: specification.level,
    weight: groupSums.reduce((sum, own) => sum + own[sumPlace.weight] + own[sumPlace.undefinedWeight], 0),
    taxed: Object.values(question.prices).some(isTax),
    hasScale: parted.adults !== undefined,
    noCost,
  };
  const total = added(groupSums);
  if (total[sumPlace.rows] === 0) {
    throw new Refusal(`No row has an answer: ${gapsInWords(total, fitted.form)}.`);
  }
  const found = parted.groups.map((group, g) => ({ group, sums: groupSums[g], means: means[g] }));
  const described = found.filter(({ sums }) => sums[sumPlace.rows] > 0);
  return {
    ...(specification.groups && { groupedBy: specification.groups }),
    groups: specification.groups
      ? described.map(({ group, sums, means: own }) => describedGroup(group.name, sums, own, told))
      : [],
    all: describedGroup("all rows", total, allDerivatives(described), told),
    without: found.flatMap(({ group, sums }) => withoutAnswer(group, sums, fitted.form)),
    brokenRows: named.worst.map(({ named: { gap, ...row } }) => ({
      ...row,
      ...(gap && { notDefined: gapInWords(gap, fitted.form) }),
    })),
    namedRows: named.count,
    unseen: unseenOf(unseen, fitted.goods, priceRange, data.priceScale),
    ...(used < total[sumPlace.rows] && { derivativeRows: { used, of: total[sumPlace.rows] } }),
  };
}

function withoutAnswer({ name, rows }: RowGroup, sums: Float64Array, form: SystemFinding["fitted"]["form"]) {
  if (sums[sumPlace.rows] > 0) return [];
  return [{ name, rows: rows.length, undefined: `${capital(gapsInWords(sums, form))}.` }];
}

function changedRows(
  question: PriceQuestion,
  { fitted }: SystemFinding,
  data: PreparedData,
  { groups, adults }: IncidenceRows,
  priceRange: PriceRange,
  exact: boolean,
): ChangedRows {
  const codes = new Int32Array(new SharedArrayBuffer(4 * data.rows));
  groups.forEach((group, g) => {
    for (const t of group.rows) codes[t] = g;
  });
  return {
    fitted,
    question,
    priceScale: data.priceScale,
    totalScale: data.totalScale,
    logPrices: data.logPrices.map(onSharedMemory),
    logTotal: onSharedMemory(data.logTotal),
    demographics: demographicColumns(data, fitted.demographics).map(onSharedMemory),
    shares: data.shares.map(onSharedMemory),
    ...(data.weights && { weights: onSharedMemory(data.weights) }),
    ...(adults && { adults: onSharedMemory(adults) }),
    rowNumbers: data.rowNumbers,
    exact,
    codes,
    groups: groups.length,
    priceRange,
  };
}

/** Sums of every chunk of rows, added in the order of the rows. */
function summed(rows: ChangedRows, count: number, control: RunControl) {
  const chunks = Array.from({ length: Math.ceil(count / CHUNK_ROWS) }, (_, at) => ({
    from: at * CHUNK_ROWS,
    to: Math.min((at + 1) * CHUNK_ROWS, count),
  }));
  const parts: ChangedSums[] = mapInOrder(control, sumChangedRows, rows, chunks, (done) =>
    control.progress({ step: "going over the rows", fraction: Math.min(1, (done * CHUNK_ROWS) / count) }),
  );
  const n = rows.logPrices.length;
  const width = sumsOf(n);
  const sums = added(parts.map((part) => part.sums));
  const unseen = newUnseen(n);
  for (const part of parts) {
    for (let at = 0; at < unseen.length; at += 4) {
      unseen[at] += part.unseen[at];
      unseen[at + 1] = Math.max(unseen[at + 1], part.unseen[at + 1]);
      unseen[at + 2] += part.unseen[at + 2];
      unseen[at + 3] = Math.min(unseen[at + 3], part.unseen[at + 3]);
    }
  }
  return {
    groupSums: Array.from({ length: rows.groups }, (_, g) => sums.subarray(g * width, (g + 1) * width)),
    named: mergeNamed(parts.map((part) => part.named)),
    unseen,
  };
}

/** Σ, with compensation, so that the error does not grow with the number of chunks (Neumaier 1974). */
function added(parts: readonly Float64Array[]): Float64Array {
  const total = new Float64Array(parts[0].length);
  const lost = new Float64Array(total.length);
  for (const part of parts) {
    for (let at = 0; at < total.length; at++) {
      const sum = total[at] + part[at];
      lost[at] += Math.abs(total[at]) >= Math.abs(part[at]) ? total[at] - sum + part[at] : part[at] - sum + total[at];
      total[at] = sum;
    }
  }
  return total.map((sum, at) => sum + lost[at]);
}

/** The mean derivatives of all rows: those of the groups by their weight. */
function allDerivatives(groups: readonly { sums: Float64Array; means: MeanDerivatives }[]): MeanDerivatives {
  const all = new Float64Array(groups[0].means.length);
  const weight = groups.reduce((sum, { sums }) => sum + sums[sumPlace.weight], 0);
  for (const { sums, means } of groups) {
    const part = sums[sumPlace.weight] / weight;
    for (let a = 0; a < all.length; a++) all[a] += part * means[a];
  }
  return all;
}

function unseenOf(
  unseen: Float64Array,
  goods: readonly string[],
  { low, high }: PriceRange,
  scale: readonly number[],
): UnseenPrice[] {
  return goods.flatMap((good, i): UnseenPrice[] => {
    const [above, highest, below, lowest] = unseen.subarray(4 * i, 4 * i + 4);
    return [
      ...(above > 0
        ? [{ good, price: highest * scale[i], bound: high[i] * scale[i], side: "above" as const, rows: above }]
        : []),
      ...(below > 0
        ? [{ good, price: lowest * scale[i], bound: low[i] * scale[i], side: "below" as const, rows: below }]
        : []),
    ];
  });
}
