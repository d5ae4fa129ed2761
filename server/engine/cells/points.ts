import type { Point } from "../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { demographicColumn } from "../columns/seasonal-terms.ts";
import { weightedMean } from "../columns/weighted.ts";

/** p = 1 and x = 1 in units of estimation, demographics at their weighted means. */
export function basePoint(data: PreparedData, demographics: readonly string[]): Point {
  return { prices: data.goods.map(() => 1), total: 1, demographics: meanDemographics(data, demographics) };
}

/** Weighted geometric means of prices and total, weighted means of demographics. */
export function meanPoint(data: PreparedData, demographics: readonly string[]): Point {
  return {
    prices: data.logPrices.map((column) => Math.exp(weightedMean(column, data.weights))),
    total: Math.exp(weightedMean(data.logTotal, data.weights)),
    demographics: meanDemographics(data, demographics),
  };
}

/** The row's own prices, total and demographics; `t` counts the rows used from 0. */
export function pointOfRow(data: PreparedData, demographics: readonly string[], t: number): Point {
  return {
    prices: data.logPrices.map((column) => Math.exp(column[t])),
    total: Math.exp(data.logTotal[t]),
    demographics: demographicColumns(data, demographics).map((column) => column[t]),
  };
}

export function demographicColumns(data: PreparedData, names: readonly string[]): Float64Array[] {
  return names.map((name) => {
    const column = demographicColumn(data, name);
    if (!column) throw new RangeError(`the data have no numeric column ${name}`);
    return column;
  });
}

function meanDemographics(data: PreparedData, names: readonly string[]): number[] {
  return demographicColumns(data, names).map((column) => weightedMean(column, data.weights));
}
