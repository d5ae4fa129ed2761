import type { DemandSystem, FreeForm, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";

/** A non-zero derivative ∂C_{equation, term}/∂φ_f. */
export type Entry = readonly [equation: number, term: number, value: number];

/**
 * A system of equations linear in the terms: responses = C(φ) Z + e, with φ the free coefficients.
 * All that the estimators know of a model.
 */
export interface CoefficientForm {
  /** F, the length of φ. */
  readonly free: number;
  /** C(φ), equations × |Z|. */
  coefficients(free: readonly number[]): number[][];
  /** ∂C/∂φ_f for every f; entries at the same place add up. */
  derivatives(free: readonly number[]): Entry[][];
  /** All k coefficients from the free ones. */
  readonly expand: Expansion;
}

/**
 * θ = S φ + s; or, where curvature is imposed, a bent function of φ, whose derivative at the φ it was formed
 * at is S. `places` then name the coefficient of θ that a free one speaks of most nearly.
 */
export interface Expansion extends FreeForm {
  readonly bent?: (free: readonly number[]) => number[];
}

export function expand({ matrix, offset, bent }: Expansion, free: readonly number[]): number[] {
  if (bent) return bent(free);
  return matrix.map((row, a) =>
    row.reduce((sum, weight, f) => (weight === 0 ? sum : sum + weight * free[f]), offset[a]),
  );
}

/** The share equations of a demand system under the restrictions imposed. */
export function systemForm(
  system: Pick<DemandSystem, "free" | "moments">,
  size: SystemSize,
  impose: readonly RestrictionName[],
): CoefficientForm {
  return constrainedForm(system, size, system.free(size, impose));
}

/** The share equations of a demand system under any linear restrictions θ = S φ + s. */
export function constrainedForm(
  system: Pick<DemandSystem, "moments">,
  size: SystemSize,
  form: FreeForm,
): CoefficientForm {
  const links = linksOf(form);
  return {
    free: form.places.length,
    expand: form,
    coefficients: (free) => system.moments.coefficients(expand(form, free), size),
    derivatives: (free) => throughRestrictions(system.moments.derivatives(expand(form, free), size), form, links),
  };
}

/**
 * Seemingly unrelated regressions: coefficient a multiplies term `places[a][1]` in equation
 * `places[a][0]`, and θ = S φ + s where restrictions are given.
 */
export function linearForm(
  equations: number,
  terms: number,
  places: readonly (readonly [equation: number, term: number])[],
  restrictions: FreeForm = unrestricted(places.length),
): CoefficientForm {
  const entries = throughRestrictions(
    places.map(([equation, term]) => [[equation, term, 1] as const]),
    restrictions,
  );
  return {
    free: restrictions.places.length,
    expand: restrictions,
    coefficients: (free) => {
      const c = Array.from({ length: equations }, () => new Array<number>(terms).fill(0));
      const theta = expand(restrictions, free);
      places.forEach(([equation, term], a) => {
        c[equation][term] += theta[a];
      });
      return c;
    },
    derivatives: () => entries,
  };
}

export function throughRestrictions(
  byCoefficient: readonly (readonly Entry[])[],
  form: Pick<FreeForm, "matrix" | "places">,
  links: Links = linksOf(form),
): Entry[][] {
  const byFree: Entry[][] = form.places.map(() => []);
  byCoefficient.forEach((entries, a) => {
    for (const [f, weight] of links[a]) {
      if (weight === 1) for (const entry of entries) byFree[f].push(entry);
      else for (const [equation, term, value] of entries) byFree[f].push([equation, term, weight * value]);
    }
  });
  return byFree;
}

/** By coefficient of θ the free ones it depends on, each with its weight. */
type Links = readonly (readonly (readonly [free: number, weight: number])[])[];

function linksOf({ matrix }: Pick<FreeForm, "matrix">): Links {
  return matrix.map((row) => row.flatMap((weight, f) => (weight === 0 ? [] : [[f, weight] as const])));
}

function unrestricted(count: number): FreeForm {
  const places = Array.from({ length: count }, (_, place) => place);
  return { matrix: places.map((a) => places.map((b) => (a === b ? 1 : 0))), offset: places.map(() => 0), places };
}
