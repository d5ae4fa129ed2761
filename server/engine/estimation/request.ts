import type { Problem } from "../../../shared/schemas/problem.ts";
import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { nearestWord } from "../../../shared/study/nearest-word.ts";
import type { SystemSize } from "../../../shared/systems/demand-system.ts";
import type { BaseColumn, LocalColumns, MomentForm, MomentTerm } from "../../../shared/systems/moment-form.ts";
import type { PriceIndexName } from "../../../shared/systems/names.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { demographicColumn } from "../columns/seasonal-terms.ts";
import { mapColumn } from "../columns/shared-memory.ts";
import { Refusal } from "../refusal.ts";
import { deflatedLogTotal } from "./deflated-total.ts";
import { realExpenditureByMeans } from "./easi/real-expenditure.ts";
import { easiSizeOf } from "./easi/specification.ts";
import { type FirstSteps, firstStepsOf } from "./first-steps/asked.ts";
import { withFirstStepColumns } from "./first-steps/extend-source.ts";
import { type MomentSource, ordered, type TermPair, termOf } from "./moment-source.ts";
import { DEFAULT_INDEX, priceIndexFor } from "./price-index.ts";
import {
  arranged,
  arrangedWeights,
  arrangementOf,
  logVolume,
  responseLabel,
  responsesOf,
  type SampleRequest,
} from "./sample.ts";
import { needsPeriods, sampleOf, specifiedSystem } from "./specified-system.ts";
import { requirePeriods } from "./time-order.ts";

/** Which moments a specification needs of its data. Plain data; equal keys on the same data, equal moments. */
export interface MomentsRequest {
  readonly key: string;
  readonly terms: readonly MomentTerm[];
  readonly demographics: readonly string[];
  /** The price index where a term is deflated by one. */
  readonly index?: PriceIndexName;
  /** Which rows and responses; absent where they are the shares at every row used. */
  readonly sample?: SampleRequest;
  /** What the columns that move with θ are called, where there are any. */
  readonly local?: readonly string[];
  /** What is estimated first and enters as further columns. */
  readonly firstSteps?: FirstSteps;
}

export function sizeOf(specification: SystemSpecification, data: PreparedData): SystemSize {
  return {
    goods: data.goods.length,
    demographics: specification.demographics.length,
    alpha0: specification.alpha0,
    ...(specification.form === "la-aids" && {
      index: priceIndexFor(data, specification.index),
    }),
    ...(specification.form === "easi" && { easi: easiSizeOf(specification) }),
  };
}

/**
 * The request of a specification. α₀, restrictions, estimator and dropped good do not enter: every
 * specification that differs only in those shares its moments. Where terms move with θ the moments are those of
 * the form that is estimated first.
 *
 * Errors: a demographic that is not a numeric column; demographics in a system that takes none.
 */
export function momentsRequest(specification: SystemSpecification, data: PreparedData): MomentsRequest {
  const periods = needsPeriods(specification);
  if (periods !== undefined) requirePeriods(data, periods.what, periods.key);
  const system = specifiedSystem(specification, data);
  const { demographics } = specification;
  if (demographics.length > 0 && !system.takesDemographics) {
    const sentence = `The ${system.longName} takes no demographics, and ${demographics.length} are named.`;
    throw new Refusal([{ sentence, key: ["demographics"] }]);
  }
  const problems = demographics
    .filter((name) => !demographicColumn(data, name))
    .map((name) => noDemographic(name, data));
  if (problems.length > 0) throw new Refusal(problems);
  const form = system.moments.local?.from.moments ?? system.moments;
  const terms = form.terms(sizeOf(specification, data));
  const index = terms.some((term) => columnsOf(term).some((column) => column.kind === "deflated log total"))
    ? (specification.index ?? DEFAULT_INDEX)
    : undefined;
  const sample = sampleOf(specification);
  const firstSteps = firstStepsOf(specification);
  const key = JSON.stringify({ terms, demographics, index, sample, firstSteps });
  return {
    key,
    terms,
    demographics,
    ...(index && { index }),
    ...(sample && { sample }),
    ...(firstSteps && { firstSteps }),
  };
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

/** The request of a form whose terms move with θ, on the rows of `nearby`, that of the form estimated first. */
export function localRequest(form: MomentForm, local: LocalColumns, size: SystemSize, nearby: MomentsRequest) {
  const terms = form.terms(size);
  const labels = local.labels;
  return { ...nearby, key: JSON.stringify({ terms, labels, nearby: nearby.key }), terms, local: labels };
}

/** The rows that a request speaks of; `local` are the columns that move with θ, at some θ. */
export function sourceOf(
  data: PreparedData,
  request: MomentsRequest,
  local: readonly Float64Array[] = [],
): MomentSource {
  const { columns, groups } = orderedColumns(request.terms);
  const place = new Map(columns.map((column, at) => [JSON.stringify(column), at + 1]));
  const placeOf = (column: BaseColumn) => place.get(JSON.stringify(column))!;
  const pairOf = (term: MomentTerm): TermPair => {
    if (term.kind === "constant") return [0, 0];
    if (term.kind === "column") return [0, placeOf(term.column)];
    if (term.kind === "monomial") return termOf(term.factors.map(placeOf));
    return ordered(placeOf(term.left), placeOf(term.right));
  };
  const arrangement = arrangementOf(data, request.sample);
  const source: MomentSource = {
    rows: arrangement?.rows.length ?? data.rows,
    ...(arrangement && { dataRows: arrangement.rows }),
    columns: columns.map((column) => arranged(valuesOf(column, data, request, local), arrangement)),
    ...(groups && { groups }),
    columnLabels: columns.map((column) => labelOf(column, data, request)),
    terms: request.terms.map(pairOf),
    responses: responsesOf(data, request.sample, arrangement),
    responseLabels: data.goods.map((good) => responseLabel(good, request.sample)),
    ...(data.weights && { weights: arrangedWeights(data.weights, arrangement) }),
  };
  if (request.firstSteps === undefined) return source;
  return withFirstStepColumns(source, data, request.firstSteps, request.demographics, (column) =>
    arranged(column, arrangement),
  );
}

function columnsOf(term: MomentTerm): BaseColumn[] {
  if (term.kind === "constant") return [];
  if (term.kind === "monomial") return [...term.factors];
  return term.kind === "column" ? [term.column] : [term.left, term.right];
}

/**
 * Columns that take part in most products first: a whitened column is made of those before it, and
 * only in this order are products of whitened columns made of products that are terms anyway. Columns that
 * move with θ and take part in products are a group of their own, after the others.
 */
function orderedColumns(terms: readonly MomentTerm[]): { columns: BaseColumn[]; groups?: number[] } {
  const uses = new Map<string, { column: BaseColumn; products: number }>();
  for (const term of terms) {
    for (const column of columnsOf(term)) {
      const key = JSON.stringify(column);
      const use = uses.get(key) ?? { column, products: 0 };
      uses.set(key, { column, products: use.products + (term.kind === "product" || term.kind === "monomial" ? 1 : 0) });
    }
  }
  const sorted = [...uses.values()].sort((one, two) => two.products - one.products);
  const apart = sorted.filter(({ column, products }) => column.kind === "local" && products > 0);
  if (apart.length === 0) return { columns: sorted.map((use) => use.column) };
  const together = sorted.filter((use) => !apart.includes(use));
  return {
    columns: [...together, ...apart].map((use) => use.column),
    groups: [...together.map(() => 0), ...apart.map(() => 1)],
  };
}

function valuesOf(
  column: BaseColumn,
  data: PreparedData,
  request: MomentsRequest,
  local: readonly Float64Array[],
): Float64Array {
  switch (column.kind) {
    case "log price":
      return data.logPrices[column.good];
    case "log total":
      return data.logTotal;
    case "demographic":
      return demographicColumn(data, request.demographics[column.index])!;
    case "price over total": {
      const logPrice = data.logPrices[column.good];
      return mapColumn(data.logTotal, (logTotal, t) => Math.exp(logPrice[t] - logTotal));
    }
    case "deflated log total":
      return deflatedLogTotal(data, request.index);
    case "price":
      return data.logPrices[column.good].map(Math.exp);
    case "total":
      return data.logTotal.map(Math.exp);
    case "log volume":
      return logVolume(data);
    case "real expenditure":
      return realExpenditureByMeans(data).map((real) => real ** column.power);
    case "local":
      return local[column.index];
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
    case "price":
      return `price of ${data.goods[column.good]}`;
    case "total":
      return "total expenditure";
    case "log volume":
      return "ln volume of all goods";
    case "deflated log total":
      return `ln total expenditure over the ${request.index ?? DEFAULT_INDEX} index`;
    case "real expenditure":
      return column.power === 1 ? "real expenditure" : `real expenditure to the power ${column.power}`;
    case "local":
      return request.local![column.index];
  }
}
