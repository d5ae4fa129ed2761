import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import { Refusal } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { systemForm } from "./coefficient-form.ts";
import type { Estimation } from "./estimation.ts";
import { leastSquares, maximumLikelihood, seeminglyUnrelated } from "./estimators.ts";
import { minimise, type Solution } from "./minimise.ts";
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
  if (estimation.moments.local !== undefined) {
    // Every iteration reads the rows: from the maximum of the form estimated first it goes straight on.
    const step = specification.estimator === "iterated seemingly unrelated" ? "update" : "newton";
    const straight = straightToLikelihood(theta, specification, estimation, step, control);
    if (straight !== undefined) return straight;
  }
  return solveFrom(theta, specification, system, size, estimation, control);
}

/** Absent where the estimator does not maximise the likelihood, or where the straight way fails. */
function straightToLikelihood(
  theta: readonly number[],
  { estimator }: SystemSpecification,
  estimation: Estimation,
  step: "newton" | "update",
  control: RunControl,
): Solution | undefined {
  if (estimator === "least squares" || estimator === "seemingly unrelated") return undefined;
  try {
    const start = estimation.form.expand.places.map((place) => theta[place]);
    return minimise(estimation, { kind: "likelihood", step }, start, control);
  } catch (error) {
    if (error instanceof Refusal) return undefined;
    throw error;
  }
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
      const first = leastSquares({ ...estimation, form }, true, from, control);
      return seeminglyUnrelated(estimation, first, start, control);
    }
    case "iterated seemingly unrelated":
      return maximumLikelihood(estimation, true, start, "update", control);
    case "maximum likelihood":
      return maximumLikelihood(estimation, true, start, "newton", control);
  }
}

/**
 * The same estimator from a solution nearby, θ: straight to the likelihood (iterated seemingly unrelated
 * regressions end at the same solution as maximum likelihood), and the long way only where that fails.
 */
export function solveNear(
  theta: readonly number[],
  specification: SystemSpecification,
  system: DemandSystem,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
): Solution {
  const { estimator } = specification;
  try {
    if (estimator === "least squares" || estimator === "seemingly unrelated") {
      return solveFrom(theta, specification, system, size, estimation, control);
    }
    const start = estimation.form.expand.places.map((place) => theta[place]);
    return minimise(estimation, { kind: "likelihood", step: "newton" }, start, control);
  } catch (error) {
    if (error instanceof Refusal) return solve(specification, system, size, estimation, control);
    throw error;
  }
}
