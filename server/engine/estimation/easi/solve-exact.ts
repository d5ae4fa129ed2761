import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import { easi } from "../../../../shared/systems/easi.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import type { RunControl } from "../../run.ts";
import type { Estimation } from "../estimation.ts";
import { leastSquares } from "../estimators.ts";
import type { Reduction } from "../moments.ts";
import { meanResponses } from "../responses.ts";
import { type ExactProblem, type ExactSolution, exactProblem, iterateExact } from "./exact-iteration.ts";
import { type ExactMaximum, maximiseExact } from "./exact-maximum.ts";

/**
 * EASI with implicit utility, from the approximate form's least squares, by the estimator of the specification.
 * `estimation` holds the moments of the approximate form.
 *
 * Errors: those of `iterateExact` and `maximiseExact`; `Cancelled`.
 */
export function solveExact(
  specification: SystemSpecification,
  data: PreparedData,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
  reduction?: Reduction,
): { problem: ExactProblem; exact: ExactSolution | ExactMaximum } {
  const theta = easi.start(size, meanResponses(estimation));
  const start = estimation.form.expand.places.map((place) => theta[place]);
  const approximate = leastSquares(estimation, true, start, control);
  const problem = exactProblem(specification, data, size, estimation, control, reduction);
  const stages = iterateExact(problem, approximate);
  const likelihood = specification.estimator === "maximum likelihood";
  return { problem, exact: likelihood ? maximiseExact(problem, stages) : stages };
}
