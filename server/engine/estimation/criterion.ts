import type { RunControl } from "../run.ts";
import { expand } from "./coefficient-form.ts";
import { type Columns, dot, pickColumns, zeros } from "./columns.ts";
import type { Estimation } from "./estimation.ts";
import { asOneColumn, residualFactor, weightBlocks } from "./residuals.ts";
import { residualCovariance } from "./weighting.ts";

/**
 * "weighted": ½ Σ e'(V V')e at fixed V. "likelihood": (T/2) ln|Σ̂(φ)|, by Newton steps or, with
 * `update`, by generalised least squares at the Σ̂ of the last iterate (iterated SUR).
 */
export type Criterion =
  | { readonly kind: "weighted"; readonly weight: Columns }
  | { readonly kind: "likelihood"; readonly step: "newton" | "update" };

/** Where an iteration stands. */
export interface State {
  readonly free: number[];
  readonly residuals: Columns;
  /** V, g × g. */
  readonly weight: Columns;
  /** Ê = E V, r × g. */
  readonly weighted: Columns;
  readonly value: number;
}

/** 1 + ln 2π: what a normal equation adds to −2 lnL/T beside ln|Σ̂|. */
export const LOG_TWO_PI_E = 1 + Math.log(2 * Math.PI);

/** With so many rows for every coefficient Gauss–Newton converges as fast as Newton, which costs more. */
const ROWS_WITHOUT_NEWTON = 1000;

/** Residuals, weights and value of the criterion at φ. Errors: a singular residual covariance; `Cancelled`. */
export function evaluate(estimation: Estimation, criterion: Criterion, free: number[], control: RunControl): State {
  const { moments, form, equations } = estimation;
  const residuals = moments.local?.residuals(expand(form.expand, free), control) ?? residualFactor(moments, form, free);
  if (moments.local !== undefined && !residuals.values.every(Number.isFinite)) {
    // A trial so far off that an exponential of its terms overflows: no criterion is higher.
    const nothing = zeros(equations.length, equations.length);
    return { free, residuals, weight: nothing, weighted: nothing, value: Number.POSITIVE_INFINITY };
  }
  const { weight, logDeterminant } =
    criterion.kind === "weighted"
      ? { weight: criterion.weight, logDeterminant: 0 }
      : residualCovariance(residuals, moments.rows, equations, moments.responseLabels);
  const weighted = weightedResiduals(residuals, equations, weight);
  const value =
    criterion.kind === "weighted" ? 0.5 * dot(weighted.values, weighted.values) : (moments.rows / 2) * logDeterminant;
  return { free, residuals, weight, weighted, value };
}

/** Ê of the equations estimated. */
export function weightedResiduals(residuals: Columns, equations: readonly number[], weight: Columns): Columns {
  const chosen = asOneColumn(pickColumns(residuals, equations));
  const { values } = weightBlocks(chosen, residuals.rows, weight);
  return { rows: residuals.rows, columns: equations.length, values };
}

/** Whether the curvature of the likelihood itself is worth forming. */
export function wantsNewton(criterion: Criterion, { moments, form }: Estimation): boolean {
  return (
    criterion.kind === "likelihood" && criterion.step === "newton" && moments.rows < ROWS_WITHOUT_NEWTON * form.free
  );
}
