import { zeros } from "../../../../shared/numerics/matrix.ts";
import type {
  CoefficientPlace,
  DemandSystem,
  FreeForm,
  Matrix,
  SystemSize,
} from "../../../../shared/systems/demand-system.ts";
import type { LocalColumns, MomentEntry, MomentForm } from "../../../../shared/systems/moment-form.ts";

/** Coefficients and terms that stand in the share equations beside C(θ)Z, never in the price index. */
export interface Extension {
  readonly block: { readonly name: string; readonly symbol: string };
  /** The good whose equation each further coefficient belongs to. */
  readonly goods: readonly number[];
  /** Whether they sum to zero over goods. */
  readonly sumToZero: boolean;
  /** How many terms there are where the system itself has K. */
  width(terms: number): number;
  /** Where the term `term` of the system stands in the equation of a good. */
  place(good: number, term: number, terms: number): number;
  /** Which term the further coefficient a multiplies. */
  extra(coefficient: number, terms: number): number;
  /**
   * Predictions that need not sum to one over goods are each given an equal part of what they miss it by:
   * ŵ_i − (Σ_j ŵ_j − 1)/n. Residuals then add up, and are those of all n equations but for their mean over goods.
   */
  readonly centred?: boolean;
}

/**
 * The system as the estimator is to see it: θ followed by the further coefficients. What is evaluated at a point is
 * the system itself at the first k of them.
 */
export function extendedSystem(system: DemandSystem, extension: Extension): DemandSystem {
  const { block, goods } = extension;
  const more = goods.map((good): CoefficientPlace => ({ block: block.name, good }));
  const own = (theta: readonly number[], size: SystemSize) => theta.slice(0, system.layout(size).length);
  return {
    ...system,
    // At a point the system is itself: what the first steps add is nought there.
    evaluator: (theta, size) => system.evaluator(own(theta, size), size),
    slopes: (theta, size, point) => system.slopes(own(theta, size), size, point),
    blocks: [...system.blocks, { ...block, columns: "one" }],
    layout: (size) => [...system.layout(size), ...more],
    free: (size, impose) => extendedForm(system.free(size, impose), extension),
    start: (size, means) => [...system.start(size, means), ...goods.map(() => 0)],
    moments: extendedMoments(system.moments, extension, (size) => system.layout(size).length),
  };
}

/** Block diagonal: what restricts θ leaves the further coefficients alone. */
function extendedForm({ matrix, offset, places }: FreeForm, { goods, sumToZero }: Extension): FreeForm {
  const free = sumToZero ? goods.length - 1 : goods.length;
  const none = new Array<number>(free).fill(0);
  const further = goods.map((_, a) => [
    ...places.map(() => 0),
    ...none.map((_, f) => (a < free ? (a === f ? 1 : 0) : -1)),
  ]);
  return {
    matrix: [...matrix.map((row) => [...row, ...none]), ...further],
    offset: [...offset, ...goods.map(() => 0)],
    places: [...places, ...none.map((_, f) => matrix.length + f)],
  };
}

function extendedMoments(moments: MomentForm, extension: Extension, count: (size: SystemSize) => number): MomentForm {
  const { goods } = extension;
  const own = (theta: readonly number[], size: SystemSize) => theta.slice(0, count(size));
  return {
    terms: (size) => moments.terms(size),
    coefficients: (theta, size) => {
      const inner = moments.coefficients(own(theta, size), size);
      const terms = inner[0].length;
      const wide = zeros(inner.length, extension.width(terms));
      inner.forEach((row, good) => {
        row.forEach((value, term) => {
          wide[good][extension.place(good, term, terms)] += value;
        });
      });
      const further = theta.slice(count(size));
      goods.forEach((good, a) => {
        wide[good][extension.extra(a, terms)] += further[a];
      });
      return extension.centred ? centred(wide) : wide;
    },
    derivatives: (theta, size) => {
      const terms = moments.terms(size).length;
      const moved = ([good, term, value]: MomentEntry): MomentEntry => [
        good,
        extension.place(good, term, terms),
        value,
      ];
      const entries = [
        ...moments.derivatives(own(theta, size), size).map((list) => list.map(moved)),
        ...goods.map((good, a): MomentEntry[] => [[good, extension.extra(a, terms), 1]]),
      ];
      return extension.centred ? entries.map((list) => centredEntries(list, size.goods)) : entries;
    },
    ...(moments.local && { local: extendedLocal(moments.local, extension, count) }),
  };
}

/** C − ιι'C/n, and 1/n on the constant, the first term. */
function centred(coefficients: Matrix): Matrix {
  const n = coefficients.length;
  const means = coefficients[0].map((_, term) => coefficients.reduce((sum, row) => sum + row[term], 0) / n);
  means[0] -= 1 / n;
  return coefficients.map((row) => row.map((value, term) => value - means[term]));
}

/** The derivatives of the centred coefficients, entries at the same place put together. */
function centredEntries(entries: readonly MomentEntry[], n: number): MomentEntry[] {
  const means = new Map<number, number>();
  for (const [, term, value] of entries) means.set(term, (means.get(term) ?? 0) + value / n);
  const shared = [...means].filter(([, mean]) => mean !== 0);
  return [
    ...entries,
    ...Array.from({ length: n }, (_, good) => shared.map(([term, mean]): MomentEntry => [good, term, -mean])).flat(),
  ];
}

function extendedLocal(local: LocalColumns, extension: Extension, count: (size: SystemSize) => number): LocalColumns {
  const { from } = local;
  const nearby = (size: SystemSize) => from.layout(size).length;
  const more = extension.goods.map((good): CoefficientPlace => ({ block: extension.block.name, good }));
  return {
    ...local,
    filler: (theta, size) => local.filler(theta.slice(0, count(size)), size),
    ...(local.combinations && {
      combinations: (theta, size) => local.combinations!(theta.slice(0, count(size)), size),
    }),
    from: {
      ...from,
      moments: extendedMoments(from.moments, extension, nearby),
      layout: (size) => [...from.layout(size), ...more],
      free: (size, impose) => extendedForm(from.free(size, impose), extension),
      start: (size, means) => [...from.start(size, means), ...more.map(() => 0)],
      embed: (theta, size) => [...from.embed(theta.slice(0, nearby(size)), size), ...theta.slice(nearby(size))],
    },
  };
}
