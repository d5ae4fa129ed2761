import {
  type EquivalenceScaleSpecification,
  EXPENDITURE_PER_ADULT,
  type PriceChangeSpecification,
} from "../../../shared/schemas/price-change.ts";
import { nearestWord } from "../../../shared/study/nearest-word.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { mapColumn } from "../columns/shared-memory.ts";
import { Refusal } from "../refusal.ts";
import { type RowGroup, rowGroups } from "./elasticity-groups.ts";

/** The rows parted as a price change asks, and the equivalent adults of each row where a scale is declared. */
export interface IncidenceRows {
  readonly groups: readonly RowGroup[];
  readonly adults?: Float64Array;
}

/** Errors: `Refusal` for a scale that is no column of positive numbers, and as for `rowGroups`. */
export function incidenceRows(
  { groups, "equivalence scale": scale }: Pick<PriceChangeSpecification, "groups" | "equivalence scale">,
  data: PreparedData,
): IncidenceRows {
  const adults = scale === undefined ? undefined : equivalentAdults(scale, data);
  const parted = groups === undefined ? [allRows(data)] : rowGroups(groups, withPerAdult(data, adults));
  return { groups: parted, ...(adults && { adults }) };
}

function allRows({ rows }: PreparedData): RowGroup {
  return { name: "all rows", rows: Int32Array.from({ length: rows }, (_, t) => t) };
}

/** Total expenditure by equivalent adult, as a column that rows can be parted by. */
function withPerAdult(data: PreparedData, adults: Float64Array | undefined): PreparedData {
  if (adults === undefined || data.numeric.has(EXPENDITURE_PER_ADULT)) return data;
  const perAdult = data.logTotal.map((logTotal, t) => Math.exp(logTotal) / adults[t]);
  return { ...data, numeric: new Map([...data.numeric, [EXPENDITURE_PER_ADULT, perAdult]]) };
}

/**
 * Needs of each row's household in equivalent adults: as declared, or the square root of its members (the scale of the
 * OECD's income distribution studies since 2008).
 */
function equivalentAdults(scale: EquivalenceScaleSpecification, data: PreparedData): Float64Array {
  const isRoot = typeof scale !== "string";
  const column = isRoot ? scale["square root of"] : scale;
  const key = isRoot ? ["equivalence scale", "square root of"] : ["equivalence scale"];
  const values = data.numeric.get(column);
  if (values === undefined) throw new Refusal([{ ...noColumn(column, data), key, column }]);
  const bad = values.findIndex((value) => !(value > 0));
  if (bad >= 0) {
    const row = data.rowNumbers[bad];
    const sentence = `${column} is ${values[bad]} in row ${row}, and an equivalence scale is above 0 in every row used: leave such rows out with keep, or name another column.`;
    throw new Refusal([{ sentence, key, column, row }]);
  }
  return mapColumn(values, (value) => (isRoot ? Math.sqrt(value) : value));
}

function noColumn(column: string, data: PreparedData) {
  const lacking = data.incomplete?.get(column);
  if (lacking !== undefined) {
    return {
      sentence: `${column} has no value in ${lacking.missing} of the ${data.rows} rows used, first in row ${lacking.firstRow}: leave them out with keep, or name another column.`,
      row: lacking.firstRow,
    };
  }
  const nearest = nearestWord(column, [...data.numeric.keys()]);
  const instead = nearest === undefined ? "" : ` The nearest is ${nearest}.`;
  const sentence = `The data have no column of numbers ${column} to be an equivalence scale.${instead}`;
  return { sentence, ...(nearest !== undefined && { nearest }) };
}
