import type { BootstrapSpecification } from "../../../shared/schemas/standard-errors.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { conventionalCovariance, leastSquaresCovariance } from "../estimation/covariance.ts";
import { polling, type RunControl } from "../run.ts";
import { estimateReplicates, summarise } from "./bootstrap/bootstrap.ts";
import { type Fitted, replicateWork } from "./bootstrap/of-system.ts";
import { clustersOfRows } from "./row-groups.ts";
import { clusteredCovariance, heteroskedasticCovariance } from "./sandwich.ts";

/** The covariance of θ̂ (k × k) and what a finding says of it. */
export interface CovarianceOfEstimates
  extends Pick<SystemFinding, "standardErrors" | "clusters" | "bootstrap" | "effectiveRows"> {
  readonly covariance: number[][];
}

/**
 * The covariance a specification asks for: conventional, heteroskedasticity-robust, cluster-robust, or of bootstrap
 * draws (methods section 5.1).
 *
 * @throws Refusal under "standard errors" for what the data do not have; where too many replicates fail
 */
export function covarianceOfEstimates(fitted: Fitted, control: RunControl): CovarianceOfEstimates {
  const { specification, data, estimation, solution } = fitted;
  const asked = specification["standard errors"];
  const effective = data.weights && { effectiveRows: effectiveRows(data.weights) };
  if (asked === "conventional") {
    const least = specification.estimator === "least squares";
    const covariance = (least ? leastSquaresCovariance : conventionalCovariance)(
      estimation,
      solution,
      polling(control, "forming the covariance"),
    );
    return { covariance, standardErrors: "conventional", ...effective };
  }
  if (asked === "heteroskedastic") {
    const covariance = heteroskedasticCovariance(estimation, solution, fitted.source(), control);
    return { covariance, standardErrors: "heteroskedastic", ...effective };
  }
  if ("bootstrap" in asked) return { ...bootstrapOf(fitted, asked, control), ...effective };
  const source = fitted.source();
  const { codes, finding } = clustersOfRows(data, source, asked.cluster, ["standard errors", "cluster"]);
  const named = { ...codes, column: finding.column };
  const covariance = clusteredCovariance(estimation, solution, source, named, control);
  return { covariance, standardErrors: "clustered", clusters: finding, ...effective };
}

/** The covariance of bootstrap draws. Errors: as those of `covarianceOfEstimates`. */
export function bootstrapOf(fitted: Fitted, asked: BootstrapSpecification, control: RunControl): CovarianceOfEstimates {
  const { work, clusters } = replicateWork(fitted, asked, control);
  const summary = summarise(estimateReplicates(work, asked.replicates, control), work.sampling);
  return { ...summary, standardErrors: "bootstrap", ...(clusters && { clusters }) };
}

/** (Σh)²/Σh² (Kish 1965, Survey Sampling): as many rows of one weight as tell as much. */
export function effectiveRows(weights: Float64Array): number {
  let sum = 0;
  let squares = 0;
  for (const weight of weights) {
    sum += weight;
    squares += weight * weight;
  }
  return sum ** 2 / squares;
}

/** What a finding says of it, of the first `own` coefficients: those of the system itself. */
export function inferenceFinding(
  { covariance: _, bootstrap, ...rest }: CovarianceOfEstimates,
  own: number,
): Omit<CovarianceOfEstimates, "covariance"> {
  if (bootstrap === undefined) return rest;
  const { intervals, draws } = bootstrap;
  return {
    ...rest,
    bootstrap: {
      ...bootstrap,
      intervals: intervals.slice(0, own),
      ...(draws && { draws: draws.map((theta) => theta.slice(0, own)) }),
    },
  };
}
