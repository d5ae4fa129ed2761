import type { Problem } from "../../../shared/schemas/problem.ts";
import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { nearestWord } from "../../../shared/study/nearest-word.ts";
import type { BaseColumn, MomentTerm, SystemSize } from "../../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import type { PriceIndexName } from "../../../shared/systems/names.ts";
import { logPriceIndex } from "../../../shared/systems/price-indices.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { type MomentSource, ordered, type TermPair } from "./moment-source.ts";
import { DEFAULT_INDEX, priceIndexFor } from "./price-index.ts";

/** Which moments a specification needs of its data. Plain data; equal keys on the same data, equal moments. */
export interface MomentsRequest {
  readonly key: string;
  readonly terms: readonly MomentTerm[];
  readonly demographics: readonly string[];
  /** The price index where a term is deflated by one. */
  readonly index?: PriceIndexName;
}

export function sizeOf(specification: SystemSpecification, data: PreparedData): SystemSize {
  return {
    goods: data.goods.length,
    demographics: specification.demographics.length,
    alpha0: specification.alpha0,
    ...(specification.form === "la-aids" && {
      index: priceIndexFor(data, specification.index),
    }),
  };
}

/**
 * The request of a specification. α₀, restrictions, estimator and dropped good do not enter: every
 * specification that differs only in those shares its moments.
 *
 * Errors: a demographic that is not a numeric column; demographics in a system that takes none.
 */
export function momentsRequest(specification: SystemSpecification, data: PreparedData): MomentsRequest {
  const system = SYSTEMS[specification.form];
  const { demographics } = specification;
  if (demographics.length > 0 && !system.takesDemographics) {
    const sentence = `The ${system.longName} takes no demographics, and ${demographics.length} are named.`;
    throw new Refusal([{ sentence, key: ["demographics"] }]);
  }
  const problems = demographics.filter((name) => !data.numeric.has(name)).map((name) => noDemographic(name, data));
  if (problems.length > 0) throw new Refusal(problems);
  const terms = system.moments.terms({ goods: data.goods.length, demographics: demographics.length, alpha0: 0 });
  const index = terms.some((term) => columnsOf(term).some((column) => column.kind === "deflated log total"))
    ? (specification.index ?? DEFAULT_INDEX)
    : undefined;
  return { key: JSON.stringify({ terms, demographics, index }), terms, demographics, ...(index && { index }) };
}

function noDemographic(name: string, data: PreparedData): Problem {
  const incomplete = data.incomplete?.get(name);
  const place = { key: ["demographics"], column: name };
  if (incomplete !== undefined) {
    const { missing, firstRow } = incomplete;
    const sentence = `demographics names "${name}", which has no value in ${missing} of the ${data.rows} rows used, first in row ${firstRow}: leave them out with keep, or name another column.`;
    return { sentence, ...place, row: firstRow };
  }
  const nearest = nearestWord(name, [...data.numeric.keys()]);
  const instead = nearest === undefined ? "" : ` The nearest is "${nearest}".`;
  const sentence = `demographics names "${name}", which is no numeric column of the data.${instead}`;
  return { sentence, ...place, ...(nearest !== undefined && { nearest }) };
}

/** The rows that a request speaks of. */
export function sourceOf(data: PreparedData, request: MomentsRequest): MomentSource {
  const columns = orderedColumns(request.terms);
  const place = new Map(columns.map((column, at) => [JSON.stringify(column), at + 1]));
  const placeOf = (column: BaseColumn) => place.get(JSON.stringify(column))!;
  const pairOf = (term: MomentTerm): TermPair => {
    if (term.kind === "constant") return [0, 0];
    if (term.kind === "column") return [0, placeOf(term.column)];
    return ordered(placeOf(term.left), placeOf(term.right));
  };
  return {
    rows: data.rows,
    columns: columns.map((column) => valuesOf(column, data, request)),
    columnLabels: columns.map((column) => labelOf(column, data, request)),
    terms: request.terms.map(pairOf),
    responses: data.shares,
    responseLabels: data.goods.map((good) => `the share of ${good}`),
    ...(data.weights && { weights: data.weights }),
  };
}

function columnsOf(term: MomentTerm): BaseColumn[] {
  if (term.kind === "constant") return [];
  return term.kind === "column" ? [term.column] : [term.left, term.right];
}

/**
 * Columns that take part in most products first: a whitened column is made of those before it, and
 * only in this order are products of whitened columns made of products that are terms anyway.
 */
function orderedColumns(terms: readonly MomentTerm[]): BaseColumn[] {
  const uses = new Map<string, { column: BaseColumn; products: number }>();
  for (const term of terms) {
    for (const column of columnsOf(term)) {
      const key = JSON.stringify(column);
      const use = uses.get(key) ?? { column, products: 0 };
      uses.set(key, { column, products: use.products + (term.kind === "product" ? 1 : 0) });
    }
  }
  return [...uses.values()].sort((one, two) => two.products - one.products).map((use) => use.column);
}

function valuesOf(column: BaseColumn, data: PreparedData, request: MomentsRequest): Float64Array {
  switch (column.kind) {
    case "log price":
      return data.logPrices[column.good];
    case "log total":
      return data.logTotal;
    case "demographic":
      return data.numeric.get(request.demographics[column.index])!;
    case "price over total": {
      const logPrice = data.logPrices[column.good];
      return data.logTotal.map((logTotal, t) => Math.exp(logPrice[t] - logTotal));
    }
    case "deflated log total": {
      const logIndex = logPriceIndex(priceIndexFor(data, request.index), data.shares, data.logPrices);
      return data.logTotal.map((logTotal, t) => logTotal - logIndex[t]);
    }
  }
}

function labelOf(column: BaseColumn, data: PreparedData, request: MomentsRequest): string {
  switch (column.kind) {
    case "log price":
      return `ln price of ${data.goods[column.good]}`;
    case "log total":
      return "ln total expenditure";
    case "demographic":
      return request.demographics[column.index];
    case "price over total":
      return `price of ${data.goods[column.good]} over total expenditure`;
    case "deflated log total":
      return `ln total expenditure over the ${request.index ?? DEFAULT_INDEX} index`;
  }
}
