import { cholesky } from "../../../../shared/numerics/cholesky.ts";
import { chiSquareTail } from "../../../../shared/numerics/distributions.ts";
import type { Endogeneity } from "../../../../shared/schemas/first-steps.ts";
import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { DemandSystem, SystemSize } from "../../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { withoutCoefficients } from "../../inference/nested-form.ts";
import { unlessRefused } from "../../refusal.ts";
import type { RunControl } from "../../run.ts";
import { constrainedForm } from "../coefficient-form.ts";
import type { Estimation } from "../estimation.ts";
import { fitMeasures } from "../fit-measures.ts";
import { minimise, type Solution } from "../minimise.ts";
import { askedFirstStage } from "./asked.ts";

/** A fit of a system with first steps: the extended system, and the covariance of all its coefficients. */
export interface ExtendedFit {
  readonly specification: SystemSpecification;
  readonly data: PreparedData;
  readonly system: DemandSystem;
  readonly size: SystemSize;
  readonly estimation: Estimation;
  readonly solution: Solution;
  /** (k + n) × (k + n). */
  readonly covariance: readonly (readonly number[])[];
  /** Where the further coefficients begin: the k of the system itself. */
  readonly own: number;
}

/** What the first stage found, what its residual does in the share equations, and the test that it does nothing. */
export function endogeneityOf(fit: ExtendedFit, instruments: readonly string[], control: RunControl): Endogeneity {
  const { specification, data, solution, covariance, own } = fit;
  const { coefficients, f, partialRSquared } = askedFirstStage(data, instruments, specification.demographics);
  const wald = waldOf(fit);
  const ratio = likelihoodRatioOf(fit, control);
  return {
    instruments: [...instruments],
    firstStage: { coefficients: [...coefficients], f, partialRSquared, rows: data.rows },
    residual: furtherCoefficients(data.goods, solution.theta.slice(own), covariance, own),
    exogeneity: {
      degreesOfFreedom: data.goods.length - 1,
      ...(wald && { wald }),
      ...(ratio && { likelihoodRatio: ratio }),
    },
    firstStageIgnored: takesFirstStepsAsData(specification),
  };
}

/** The bootstrap alone draws the rows of the first steps again. */
export function takesFirstStepsAsData({ "standard errors": errors }: SystemSpecification): boolean {
  return typeof errors === "string" || !("bootstrap" in errors);
}

export function furtherCoefficients(
  goods: readonly string[],
  estimates: readonly number[],
  covariance: readonly (readonly number[])[],
  own: number,
) {
  return estimates.map((estimate, a) => ({
    good: goods[a],
    estimate,
    standardError: Math.sqrt(covariance[own + a][own + a]),
  }));
}

/** ρ'V⁻¹ρ over n − 1 goods, V the covariance of whatever kind; the same whichever good is left out. */
function waldOf({ data, solution, covariance, own }: ExtendedFit): { statistic: number; pValue: number } | undefined {
  const free = data.goods.length - 1;
  const block = covariance.slice(own, own + free).map((row) => row.slice(own, own + free));
  const scale = block.map((row, a) => Math.sqrt(row[a]));
  const factor = cholesky(block.map((row, a) => row.map((entry, b) => entry / (scale[a] * scale[b]))));
  if (factor === undefined) return undefined;
  const scaled = scale.map((error, a) => [solution.theta[own + a] / error]);
  const statistic = factor.solve(scaled).reduce((sum, [value], a) => sum + value * scaled[a][0], 0);
  return Number.isFinite(statistic) ? { statistic, pValue: chiSquareTail(statistic, free) } : undefined;
}

/** 2(ln L − ln L₀), both by maximum likelihood from the same rows; absent where either has none. */
function likelihoodRatioOf(fit: ExtendedFit, control: RunControl): { statistic: number; pValue: number } | undefined {
  const { data, system, size, estimation, solution, own, specification } = fit;
  // With curvature imposed the fit without the residual would be one of another kind.
  if (specification.curvature !== undefined) return undefined;
  const zero = new Set(data.goods.map((_, a) => own + a));
  const restricted = constrainedForm(system, size, withoutCoefficients(estimation.form.expand, zero));
  const start = restricted.expand.places.map((place) => solution.theta[place]);
  const likely = { kind: "likelihood", step: "newton" } as const;
  return unlessRefused(
    () => {
      const isMaximum = specification.estimator === "maximum likelihood";
      const wide = isMaximum ? solution : minimise(estimation, likely, solution.free, control);
      const narrow = { ...estimation, form: restricted };
      const difference =
        fitMeasures(estimation, wide).logLikelihood -
        fitMeasures(narrow, minimise(narrow, likely, start, control)).logLikelihood;
      // A difference below zero is rounding of two equal likelihoods.
      const statistic = Math.max(0, 2 * difference);
      return { statistic, pValue: chiSquareTail(statistic, data.goods.length - 1) };
    },
    () => undefined,
  );
}
