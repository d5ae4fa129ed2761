import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { bootstrapOf, effectiveRows } from "../../inference/covariance-of-estimates.ts";
import { clustersOfRows } from "../../inference/row-groups.ts";
import { exactCovariance, type Groups } from "./exact-covariance.ts";
import type { ExactProblem, ExactSolution } from "./exact-iteration.ts";
import type { ExactMaximum } from "./exact-maximum.ts";
import { maximumCovariance } from "./maximum-covariance.ts";

type Inference = Pick<SystemFinding, "standardErrors" | "clusters" | "bootstrap" | "effectiveRows"> & {
  covariance: number[][];
};

/** The covariance of θ̂ that the specification asks for, and what the finding says of it. */
export function exactInference(problem: ExactProblem, exact: ExactSolution | ExactMaximum): Inference {
  const { data, specification } = problem;
  const asked = specification["standard errors"];
  const covarianceBy = (groups?: Groups) =>
    "information" in exact ? maximumCovariance(problem, exact, groups) : exactCovariance(problem, exact, groups);
  const effective = data.weights && { effectiveRows: effectiveRows(data.weights) };
  if (asked === "conventional") {
    return { covariance: covarianceBy(), standardErrors: "conventional", ...effective };
  }
  if (asked === "heteroskedastic") {
    const groups = { of: Int32Array.from({ length: data.rows }, (_, t) => t), count: data.rows };
    return { covariance: covarianceBy(groups), standardErrors: "heteroskedastic", ...effective };
  }
  if ("bootstrap" in asked) {
    const { size, estimation, control } = problem;
    const source = () => exact.equations.source;
    const fitted = { specification, data, size, estimation, solution: exact.solution, source };
    return { ...bootstrapOf(fitted, asked, control), ...effective };
  }
  const { source } = exact.equations;
  const { codes, finding } = clustersOfRows(data, source, asked.cluster, ["standard errors", "cluster"]);
  const groups = { of: codes.codes, count: codes.count };
  return {
    covariance: covarianceBy(groups),
    standardErrors: "clustered",
    clusters: finding,
    ...effective,
  };
}
