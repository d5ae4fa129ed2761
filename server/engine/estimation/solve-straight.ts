import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RunControl } from "../run.ts";
import type { Criterion } from "./criterion.ts";
import { bentForm, restAfter } from "./curvature/bent-form.ts";
import type { Estimation } from "./estimation.ts";
import { leastSquares, maximumLikelihood, seeminglyUnrelated } from "./estimators.ts";
import { minimise, type Solution } from "./minimise.ts";

/**
 * The estimator a specification names by way of the system's straight coordinates, where it has some: they lead to the
 * same solution where iterations in its coefficients creep along a bent valley. Undefined where there are none, or
 * where restrictions leave other coefficients free than they hold.
 *
 * Errors: those of estimating in coefficients.
 */
export function solveStraight(
  theta: readonly number[],
  specification: Pick<SystemSpecification, "estimator">,
  system: DemandSystem,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
): Solution | undefined {
  const map = system.straight?.(size);
  if (map === undefined) return undefined;
  const { expand } = estimation.form;
  const count = map.theta(new Array<number>(map.free).fill(0)).length;
  const own = expand.places.filter((place) => place < count);
  if (own.length !== map.free) return undefined;
  const rest = restAfter(expand, count);
  const start = [...map.of(theta.slice(0, count)), ...rest.places.map((place) => theta[count + place])];
  const form = bentForm(system, size, map, own, rest, start);
  const { solution, criterion } = solveIn({ ...estimation, form }, start, specification, control);
  // From there on in the coefficients themselves: what is reported of the solution stands in them.
  const near = minimise(
    estimation,
    criterion,
    expand.places.map((place) => solution.theta[place]),
    control,
  );
  return { ...near, iterations: near.iterations + solution.iterations };
}

function solveIn(
  estimation: Estimation,
  start: readonly number[],
  { estimator }: Pick<SystemSpecification, "estimator">,
  control: RunControl,
): { solution: Solution; criterion: Criterion } {
  if (estimator === "iterated seemingly unrelated" || estimator === "maximum likelihood") {
    const step = estimator === "maximum likelihood" ? "newton" : "update";
    return {
      solution: maximumLikelihood(estimation, true, start, step, control),
      criterion: { kind: "likelihood", step },
    };
  }
  const first = leastSquares(estimation, true, start, control);
  const solution =
    estimator === "least squares" ? first : seeminglyUnrelated(estimation, first, [...first.free], control);
  return { solution, criterion: { kind: "weighted", weight: solution.weight } };
}
