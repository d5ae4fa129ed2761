import type { SystemFinding, SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import type { RunControl } from "../../run.ts";
import { durbinWatson } from "../durbin-watson.ts";
import type { Estimation } from "../estimation.ts";
import { fitMeasures } from "../fit-measures.ts";
import type { Reduction } from "../moments.ts";
import { covarianceOf } from "../weighting.ts";
import { exactInference } from "./exact-inference.ts";
import { ExactLikelihood } from "./exact-likelihood.ts";
import { solveExact } from "./solve-exact.ts";

const RESTRICTION_TESTS = ["homogeneity", "symmetry given homogeneity"] as const;
const UNTESTED =
  "Likelihood ratios would need the exact form's maximum under every restriction: a tests cell has Wald's test.";

/** What the exact form has of a system finding that the estimators of linear equations make otherwise. */
export type ExactEstimate = Pick<
  SystemFinding,
  | "implicit"
  | "standardErrors"
  | "clusters"
  | "bootstrap"
  | "effectiveRows"
  | "logLikelihood"
  | "rSquared"
  | "systemRSquared"
  | "convergence"
  | "durbinWatson"
  | "residualCovariance"
  | "tests"
  | "untested"
> & { readonly theta: number[]; readonly covariance: number[][] } & Partial<Pick<SystemFinding, "aic" | "bic">>;

const METHODS = {
  "least squares": "two-stage least squares, iterated on implicit utility",
  "seemingly unrelated": "three-stage least squares, iterated on implicit utility",
  "iterated seemingly unrelated": "iterated three-stage least squares, iterated on implicit utility",
  "maximum likelihood": "full information maximum likelihood, with the Jacobian of implicit utility",
} as const;

/**
 * EASI with implicit utility, from the approximate form's least squares. Instruments are the equations' own terms with
 * the sample's mean shares in y. `estimation` holds the moments of the approximate form.
 *
 * Errors: those of `iterateExact` and `maximiseExact`; `Cancelled`.
 */
export function estimateExactEasi(
  specification: SystemSpecification,
  data: PreparedData,
  size: SystemSize,
  estimation: Estimation,
  control: RunControl,
  reduction?: Reduction,
): ExactEstimate {
  const { problem, exact } = solveExact(specification, data, size, estimation, control, reduction);
  const likelihood = specification.estimator === "maximum likelihood";
  const { solution, equations } = exact;
  const { rSquared, systemRSquared } = fitMeasures(equations.estimation, solution);
  const logLikelihood = new ExactLikelihood(problem).value(solution.free);
  const free = estimation.form.free;
  const { iterations, gradient, largestStep, condition } = solution;
  const { source, turned } = equations;
  const coefficients = turned.form.coefficients(turned.turn(solution.free));
  const durbin =
    data.time &&
    durbinWatson({ ...source, terms: source.terms.slice(0, source.equationTerms) }, data.time, coefficients);
  return {
    theta: solution.theta,
    ...exactInference(problem, exact),
    implicit: { realExpenditure: "exact", method: METHODS[specification.estimator] },
    logLikelihood,
    // They speak of the likelihood's maximum.
    ...(likelihood && { aic: -2 * logLikelihood + 2 * free, bic: -2 * logLikelihood + free * Math.log(data.rows) }),
    rSquared,
    systemRSquared,
    convergence: { iterations, gradient, largestStep, condition },
    ...(durbin && { durbinWatson: durbin }),
    residualCovariance: covarianceOf(solution.residuals, data.rows),
    tests: [],
    untested: RESTRICTION_TESTS.map((restriction) => ({ restriction, reason: UNTESTED })),
  };
}
