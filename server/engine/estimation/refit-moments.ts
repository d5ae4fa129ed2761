import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import { polling, type RunControl } from "../run.ts";
import { systemForm } from "./coefficient-form.ts";
import { coefficientNames, labelOfCoefficient } from "./coefficient-labels.ts";
import { conventionalCovariance, leastSquaresCovariance } from "./covariance.ts";
import type { Moments } from "./moments.ts";
import { solve } from "./solve.ts";

interface Known {
  readonly system: DemandSystem;
  readonly size: SystemSize;
  readonly goods: readonly string[];
  readonly dropped: string;
  readonly moments: Moments;
}

/**
 * The coefficients of a specification from moments alone, and their covariance where it is the conventional one (methods
 * sections 4.1 to 4.4, 5.1): every other covariance needs the rows.
 * Errors: `Refusal` where the moments identify no solution or the iteration does not end; `Cancelled`.
 */
export function refitMoments(
  specification: SystemSpecification,
  { system, size, goods, dropped, moments }: Known,
  control: RunControl,
): { readonly theta: readonly number[]; readonly covariance?: readonly (readonly number[])[] } {
  const estimation = {
    moments,
    form: systemForm(system, size, specification.impose),
    equations: goods.map((_, good) => good).filter((good) => goods[good] !== dropped),
    coefficientLabels: coefficientNames(system, size, goods, specification.demographics).map(labelOfCoefficient),
  };
  const solution = solve(specification, system, size, estimation, control);
  const { theta } = solution;
  if (specification["standard errors"] !== "conventional") return { theta };
  const least = specification.estimator === "least squares";
  const poll = polling(control, "forming the covariance");
  return { theta, covariance: (least ? leastSquaresCovariance : conventionalCovariance)(estimation, solution, poll) };
}
