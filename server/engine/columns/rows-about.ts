import { type DataSpecification, LEFT_OUT_REASONS } from "../../../shared/schemas/data.ts";
import { Refusal } from "../refusal.ts";
import { implausibleAt, outlyingAt, placesOf } from "./distances.ts";
import { readSubject } from "./flag-parts.ts";
import { draftBounds, draftPurchase } from "./keep-drafts.ts";
import { accountRows } from "./prepare.ts";
import type { PreparedData, UploadTable } from "./prepared-data.ts";
import { distinctPrices, partingRows } from "./price-structure.ts";
import type { RowList } from "./rows-page.ts";
import { columnsOfGoods, columnsOfSpecification, usedColumn } from "./shown-columns.ts";
import { weightedCorrelation } from "./weighted.ts";

type Accounted = ReturnType<typeof accountRows>;

interface About {
  readonly specification: DataSpecification;
  readonly table: UploadTable;
  readonly accounted: Accounted;
  readonly data: PreparedData;
}

/**
 * The rows that something found of a data cell is about, with the columns that matter to it.
 *
 * @param key as the flag, or the reason, names its rows
 * @param prepared the rows used, asked for only where they are needed
 * @throws Refusal for a key or a good that nothing is said of.
 */
export function rowsAbout(
  key: string,
  specification: DataSpecification,
  table: UploadTable,
  prepared: () => PreparedData,
): RowList {
  const subject = readSubject(key);
  const accounted = accountRows(specification, table);
  if (subject[0] === "left out") return rowsLeftOut(subject[1], { specification, table, accounted });
  const about = { specification, table, accounted, data: prepared() };
  if (subject[0] === "shares") return sharesOff(about);
  const good = goodOf(subject[1], about.data);
  if (subject[0] === "collinearity") return rowsParting(good, goodOf(subject[2], about.data), about);
  if (subject[0] === "zeros") return notBought(good, about);
  if (subject[0] === "price variation") return commonestPrice(good, about);
  return farFromMedian(subject[0], good, about);
}

function goodOf(name: string, { goods }: PreparedData): number {
  const good = goods.indexOf(name);
  if (good < 0) throw new Refusal(`The cell has no good called ${name}.`);
  return good;
}

/** Places among the rows used as rows of the upload. */
const uploadRows = (at: Int32Array, { rowNumbers }: PreparedData) => at.map((place) => rowNumbers[place] - 1);

function rowsLeftOut(reason: string, { specification, table, accounted }: Omit<About, "data">): RowList {
  const code = (LEFT_OUT_REASONS as readonly string[]).indexOf(reason) + 1;
  if (code === 0) throw new Refusal(`Rows are not left out for ${reason}.`);
  const rows: number[] = [];
  accounted.leftOut.reasonOf.forEach((one, row) => {
    if (one === code) rows.push(row);
  });
  return {
    rows: Int32Array.from(rows),
    count: rows.length,
    columns: columnsOfSpecification(specification, table, accounted),
  };
}

function notBought(good: number, about: About): RowList {
  const at = placesOf(about.data.shares[good], (share) => share === 0);
  const keep = draftPurchase(about.accounted.roles.goods[good], at.length);
  return {
    rows: uploadRows(at, about.data),
    count: at.length,
    columns: columnsOfGoods([good], about),
    ...(keep && { keep }),
  };
}

function farFromMedian(kind: "outliers" | "unit values", good: number, about: About): RowList {
  const { data } = about;
  const prices = data.logPrices[good];
  const { at, away } = kind === "outliers" ? outlyingAt(prices, data.clusters) : implausibleAt(prices);
  // The furthest first.
  at.sort((a, b) => Math.abs(away[b]) - Math.abs(away[a]) || a - b);
  const among = kind === "outliers" && data.clusters ? `the median of its ${data.clusters.column}` : "the median";
  const ratio = usedColumn("price ÷ median", away.map(Math.exp), about);
  const keep = draftBounds(
    about.accounted.roles.goods[good],
    about.accounted.goods[good].price,
    uploadRows(at, data),
    data,
  );
  return {
    rows: uploadRows(at, data),
    count: at.length,
    columns: [...columnsOfGoods([good], about), { column: ratio, says: `over ${among}` }],
    ...(keep && { keep }),
  };
}

function commonestPrice(good: number, about: About): RowList {
  const { data } = about;
  const at = distinctPrices(data.logPrices[good], Number.POSITIVE_INFINITY)?.at ?? new Int32Array();
  return { rows: uploadRows(at, data), count: at.length, columns: columnsOfGoods([good], about) };
}

function rowsParting(one: number, other: number, about: About): RowList {
  const { data } = about;
  const correlation = weightedCorrelation(data.logPrices[one], data.logPrices[other], data.weights);
  const { at, apart } = partingRows(data.logPrices[one], data.logPrices[other], data.weights, correlation);
  const column = usedColumn("apart", apart, about);
  return {
    rows: uploadRows(at, data),
    count: at.length,
    columns: [...columnsOfGoods([one, other], about), { column, says: "in standard deviations of the log prices" }],
  };
}

function sharesOff(about: About): RowList {
  const { accounted, data } = about;
  const total = accounted.roles.total?.values;
  const gap = Float64Array.from(data.rowNumbers, (number) => {
    const spent = accounted.goods.reduce((sum, { expenditure }) => sum + expenditure[number - 1], 0);
    return total ? Math.abs(spent / total[number - 1] - 1) : 0;
  });
  const at = placesOf(gap, (value) => value > 1e-12);
  return {
    rows: uploadRows(at, data),
    count: at.length,
    columns: [
      ...columnsOfSpecification(about.specification, about.table, accounted),
      { column: usedColumn("gap", gap, about), says: "by which shares miss one" },
    ],
  };
}
