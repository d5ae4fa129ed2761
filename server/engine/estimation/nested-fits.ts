import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import type { NestedFits, RefusedFit } from "../inference/restriction-tests.ts";
import { unlessRefused } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { expand, systemForm } from "./coefficient-form.ts";
import type { Estimation } from "./estimation.ts";
import { maximumLikelihood } from "./estimators.ts";
import { fitMeasures } from "./fit-measures.ts";
import { minimise, type Solution } from "./minimise.ts";
import type { Moments } from "./moments.ts";
import { meanResponses } from "./responses.ts";
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

type Fit = Likelihood & { readonly theta: readonly number[] };

/**
 * Fits already made of the same terms, or why the data allow none. None depends on the specification that asked for
 * it first, so that no test can tell what was estimated before it.
 */
const known = new WeakMap<object, Map<string, Fit | RefusedFit>>();

const NESTED: Readonly<Record<Exclude<keyof NestedFits, "quadratic">, readonly RestrictionName[]>> = {
  unrestricted: [],
  homogeneity: ["homogeneity"],
  symmetry: ["homogeneity", "symmetry"],
};

/**
 * Maximum likelihood of the system homogeneous and symmetric, homogeneous, and unrestricted, each from the one
 * before and all from the moments at hand; kept for the next specification that asks. The last good is dropped,
 * whichever the specification drops: no likelihood depends on it. Where every iteration reads the rows they start
 * from θ of the specification instead, and are kept no longer than it.
 */
export function nestedFits(
  estimation: Estimation,
  system: DemandSystem,
  size: SystemSize,
  specification: SystemSpecification,
  theta: readonly number[],
  control: RunControl,
): NestedFits {
  const { moments } = estimation;
  const equations = allButLast(estimation);
  const under = (impose: readonly RestrictionName[], near: readonly number[] | undefined) =>
    remembered(moments, keyOf(specification, impose), () => {
      const form = systemForm(system, size, impose);
      const nested: Estimation = { ...estimation, equations, form };
      const from = near ?? system.start(size, meanResponses(nested));
      const start = form.expand.places.map((place) => from[place]);
      const solution = near
        ? fromNearby(nested, start, control, FOR_LIKELIHOOD)
        : maximumLikelihood(nested, true, start, "newton", control);
      return fitOf(nested, solution);
    });
  const near = moments.local && theta;
  const own = hasQuadraticTerms(system) ? under(specification.impose, near) : undefined;
  const symmetry = size.goods > 2 ? under(NESTED.symmetry, near) : undefined;
  const homogeneity = under(NESTED.homogeneity, near ?? thetaOf(symmetry));
  return {
    unrestricted: under(NESTED.unrestricted, near ?? thetaOf(homogeneity)),
    homogeneity,
    ...(symmetry && { symmetry }),
    ...(own && {
      quadratic: {
        wide: own,
        narrow: unlessRefused(() => fitWithoutLocal(estimation, system, size, specification, control)),
      },
    }),
  };
}

function fitOf(estimation: Estimation, solution: Solution): Fit {
  const { logLikelihood } = fitMeasures(estimation, solution);
  return { logLikelihood, freeCoefficients: estimation.form.free, theta: solution.theta };
}

const thetaOf = (fit: Fit | RefusedFit | undefined) => (fit && "theta" in fit ? fit.theta : undefined);

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

/** Keeps a fit of the specification for its tests, where `nestedFits` would make it the same way. */
export function rememberFit(estimation: Estimation, specification: SystemSpecification, solution: Solution): void {
  const { moments, equations } = estimation;
  if (specification.estimator !== "maximum likelihood" || equations.join() !== allButLast(estimation).join()) return;
  const key = keyOf(specification, specification.impose);
  if (moments.local === undefined && key !== keyOf(specification, NESTED.symmetry)) return;
  remembered(moments, key, () => fitOf(estimation, solution));
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
  return unlessRefused(
    () => minimise(nested, { kind: "likelihood", step: "newton" }, free, control, local ? tolerance : undefined),
    () => maximumLikelihood(nested, true, start, "newton", control),
  );
}

function remembered({ local, terms }: Moments, key: string, find: () => Fit): Fit | RefusedFit {
  const of = local ?? terms;
  const fits = known.get(of) ?? new Map<string, Fit | RefusedFit>();
  known.set(of, fits);
  // A wider model may not be identified where the one asked for is: then there is no test but a reason, and no failure.
  const fit = fits.get(key) ?? unlessRefused(find);
  fits.set(key, fit);
  return fit;
}

function keyOf({ form, alpha0 }: SystemSpecification, impose: readonly string[]): string {
  return JSON.stringify([form, alpha0, [...impose].sort()]);
}
