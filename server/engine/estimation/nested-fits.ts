import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import type { NestedFits, RefusedFit } from "../inference/restriction-tests.ts";
import { Refusal } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { expand, systemForm } from "./coefficient-form.ts";
import type { Estimation } from "./estimation.ts";
import { maximumLikelihood } from "./estimators.ts";
import { fitMeasures } from "./fit-measures.ts";
import { minimise, type Solution } from "./minimise.ts";
import type { Moments } from "./moments.ts";
import { fitNearby, nearbyEstimation } from "./start.ts";

/**
 * Where each iteration reads the rows, steps are carried this far for a likelihood alone: it errs by the square of
 * what the next would have been.
 */
const FOR_LIKELIHOOD = 1e-6;

interface Likelihood {
  readonly logLikelihood: number;
  readonly freeCoefficients: number;
}

/** Likelihoods already found from the same moments, or why the data allow no such fit. */
const known = new WeakMap<Moments, Map<string, Likelihood | RefusedFit>>();

const NESTED: Readonly<Record<Exclude<keyof NestedFits, "quadratic">, readonly RestrictionName[]>> = {
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
      const solution = fromNearby(nested, start, control, FOR_LIKELIHOOD);
      return { logLikelihood: fitMeasures(nested, solution).logLikelihood, freeCoefficients: form.free };
    });
  const own = under(specification.impose);
  return {
    unrestricted: under(NESTED.unrestricted),
    homogeneity: under(NESTED.homogeneity),
    ...(size.goods > 2 && { symmetry: under(NESTED.symmetry) }),
    ...(hasQuadraticTerms(system) && {
      quadratic: {
        wide: own,
        narrow: unlessRefused(() => fitWithoutLocal(estimation, system, size, specification, control)),
      },
    }),
  };
}

const hasQuadraticTerms = (system: DemandSystem) => system.blocks.some(({ name }) => name === "lambda");

/**
 * Maximum likelihood of the form that the system contains and that is estimated first (the almost ideal system in
 * the quadratic one), under what the specification imposes.
 */
function fitWithoutLocal(
  estimation: Estimation,
  system: DemandSystem,
  size: SystemSize,
  { impose }: Pick<SystemSpecification, "impose">,
  control: RunControl,
): Likelihood {
  const nearby = nearbyEstimation(system, size, impose, { ...estimation, equations: allButLast(estimation) });
  if (nearby === undefined) throw new RangeError(`the ${system.longName} has no form that is estimated first`);
  const { logLikelihood } = fitMeasures(nearby, fitNearby(system, size, nearby, control));
  return { logLikelihood, freeCoefficients: nearby.form.free };
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
export function fromNearby(
  nested: Estimation,
  start: readonly number[],
  control: RunControl,
  tolerance?: number,
): Solution {
  const { local } = nested.moments;
  const { expand: form } = nested.form;
  // Moments that move with θ are kept where the fit nearby ended, all but its last step.
  const from = local ? local.kept(expand(form, start)) : undefined;
  const free = from ? form.places.map((place) => from[place]) : start;
  try {
    return minimise(nested, { kind: "likelihood", step: "newton" }, free, control, local ? tolerance : undefined);
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
