import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import type { NestedFits, RefusedFit } from "../inference/restriction-tests.ts";
import { Refusal } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { systemForm } from "./coefficient-form.ts";
import type { Estimation } from "./estimation.ts";
import { maximumLikelihood } from "./estimators.ts";
import { fitMeasures } from "./fit-measures.ts";
import { minimise, type Solution } from "./minimise.ts";
import type { Moments } from "./moments.ts";

interface Likelihood {
  readonly logLikelihood: number;
  readonly freeCoefficients: number;
}

/** Likelihoods already found from the same moments, or why the data allow no such fit. */
const known = new WeakMap<Moments, Map<string, Likelihood | RefusedFit>>();

const NESTED: Readonly<Record<keyof NestedFits, readonly RestrictionName[]>> = {
  unrestricted: [],
  homogeneity: ["homogeneity"],
  symmetry: ["homogeneity", "symmetry"],
};

/**
 * Maximum likelihood of the system unrestricted, homogeneous, and homogeneous and symmetric, all from
 * the moments at hand; likelihoods only, kept for the next specification that asks. The last good is
 * dropped, whichever the specification drops: no likelihood depends on it.
 */
export function nestedFits(
  estimation: Estimation,
  system: DemandSystem,
  size: SystemSize,
  specification: SystemSpecification,
  theta: readonly number[],
  control: RunControl,
): NestedFits {
  const equations = allButLast(estimation);
  const under = (impose: readonly RestrictionName[]) =>
    remembered(estimation.moments, keyOf(specification, impose), () => {
      const form = systemForm(system, size, impose);
      const start = form.expand.places.map((place) => theta[place]);
      const nested: Estimation = { ...estimation, equations, form };
      const solution = fromNearby(nested, start, control);
      return { logLikelihood: fitMeasures(nested, solution).logLikelihood, freeCoefficients: form.free };
    });
  return {
    unrestricted: under(NESTED.unrestricted),
    homogeneity: under(NESTED.homogeneity),
    ...(size.goods > 2 && { symmetry: under(NESTED.symmetry) }),
  };
}

/** Keeps the likelihood of a fit by maximum likelihood, so that the tests need not find it again. */
export function rememberFit(estimation: Estimation, specification: SystemSpecification, logLikelihood: number): void {
  if (estimation.equations.join() !== allButLast(estimation).join()) return;
  remembered(estimation.moments, keyOf(specification, specification.impose), () => ({
    logLikelihood,
    freeCoefficients: estimation.form.free,
  }));
}

function allButLast({ moments }: Estimation): number[] {
  return Array.from({ length: moments.responses.columns - 1 }, (_, equation) => equation);
}

/**
 * Maximum likelihood straight from a fit that is near; the long way round only where that fails.
 * Errors: as `maximumLikelihood`.
 */
export function fromNearby(nested: Estimation, start: readonly number[], control: RunControl): Solution {
  try {
    return minimise(nested, { kind: "likelihood", step: "newton" }, start, control);
  } catch (error) {
    if (error instanceof Refusal) return maximumLikelihood(nested, true, start, "newton", control);
    throw error;
  }
}

function remembered(moments: Moments, key: string, find: () => Likelihood): Likelihood | RefusedFit {
  if (!known.has(moments)) known.set(moments, new Map());
  const fits = known.get(moments)!;
  if (!fits.has(key)) fits.set(key, unlessRefused(find));
  return fits.get(key)!;
}

/** A wider model may not be identified where the one asked for is: then there is no test but a reason, and no failure. */
export function unlessRefused<T>(find: () => T): T | RefusedFit {
  try {
    return find();
  } catch (error) {
    if (error instanceof Refusal) return { refused: error.message };
    throw error;
  }
}

function keyOf({ form, alpha0 }: SystemSpecification, impose: readonly string[]): string {
  return JSON.stringify([form, alpha0, [...impose].sort()]);
}
