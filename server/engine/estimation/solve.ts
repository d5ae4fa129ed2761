import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import { type Refusal, unlessRefused } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { systemForm } from "./coefficient-form.ts";
import type { Estimation } from "./estimation.ts";
import { firstLeastSquares, leastSquares, maximumLikelihood, seeminglyUnrelated } from "./estimators.ts";
import { NotConverged } from "./failures.ts";
import { minimise, type Solution } from "./minimise.ts";
import { solveStraight } from "./solve-straight.ts";
import { startOf } from "./start.ts";

/** The restrictions that act within equations only. */
export function withinEquations({ impose }: SystemSpecification) {
  return impose.filter((restriction) => restriction !== "symmetry");
}

/**
 * The estimator a specification names, from the system's own start.
 *
 * Errors: moments that identify no solution, a singular residual covariance, no convergence; `Cancelled`.
 */
export function solve(
  specification: SystemSpecification,
  system: DemandSystem,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
): Solution {
  const theta = startOf(system, size, specification.impose, estimation, control);
  if (estimation.moments.local !== undefined && maximisesLikelihood(specification)) {
    // Every iteration reads the rows: from the maximum of the form estimated first it goes straight on.
    const step = specification.estimator === "iterated seemingly unrelated" ? "update" : "newton";
    const straight = unlessRefused(
      () => straightToLikelihood(theta, estimation, step, control),
      (refusal) => {
        if (isCreeping(refusal)) throw refusal;
        return undefined;
      },
    );
    if (straight !== undefined) return straight;
  }
  return unlessRefused(
    () => solveFrom(theta, specification, system, size, estimation, control),
    (refusal) => {
      const straight =
        refusal instanceof NotConverged && solveStraight(theta, specification, system, size, estimation, control);
      if (!straight) throw refusal;
      return straight;
    },
  );
}

/** Of derivatives scaled to unit length; where prices are normalised it is about ten. */
const ILL_CONDITIONED = 100;

/** Still going down a long valley when its iterations were used up: least squares first would lead into the same valley. */
function isCreeping(refusal: Refusal): boolean {
  return refusal instanceof NotConverged && refusal.ranOut && refusal.condition > ILL_CONDITIONED;
}

/** Iterated seemingly unrelated regressions end where maximum likelihood does. */
function maximisesLikelihood({ estimator }: SystemSpecification): boolean {
  return estimator === "iterated seemingly unrelated" || estimator === "maximum likelihood";
}

function straightToLikelihood(
  theta: readonly number[],
  estimation: Estimation,
  step: "newton" | "update",
  control: RunControl,
): Solution {
  const start = estimation.form.expand.places.map((place) => theta[place]);
  return minimise(estimation, { kind: "likelihood", step }, start, control);
}

function solveFrom(
  theta: readonly number[],
  specification: SystemSpecification,
  system: DemandSystem,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
): Solution {
  const start = estimation.form.expand.places.map((place) => theta[place]);
  switch (specification.estimator) {
    case "least squares":
      return leastSquares(estimation, true, start, control);
    case "seemingly unrelated": {
      // With symmetry in the first step, Σ̂ would depend on the dropped good.
      const form = systemForm(system, size, withinEquations(specification));
      const from = form.expand.places.map((place) => theta[place]);
      const first = firstLeastSquares({ ...estimation, form }, true, from, control);
      return seeminglyUnrelated(estimation, first, start, control);
    }
    case "iterated seemingly unrelated":
      return maximumLikelihood(estimation, true, start, "update", control);
    case "maximum likelihood":
      return maximumLikelihood(estimation, true, start, "newton", control);
  }
}

/**
 * The same estimator from a solution nearby, θ: straight to the likelihood where the estimator maximises it, and the
 * long way only where that fails.
 */
export function solveNear(
  theta: readonly number[],
  specification: SystemSpecification,
  system: DemandSystem,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
): Solution {
  return unlessRefused(
    () =>
      maximisesLikelihood(specification)
        ? straightToLikelihood(theta, estimation, "newton", control)
        : solveFrom(theta, specification, system, size, estimation, control),
    () => solve(specification, system, size, estimation, control),
  );
}
