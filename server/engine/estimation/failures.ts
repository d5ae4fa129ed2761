import type { Problem } from "../../../shared/schemas/problem.ts";
import { printQuantity, printSize } from "../../../shared/tables/numbers.ts";
import { countedRows, everyRow } from "../../../shared/tables/phrases.ts";
import { Refusal } from "../refusal.ts";
import { columnOf, dot } from "./columns.ts";
import type { Estimation } from "./estimation.ts";
import type { NormalFactor } from "./normal-factor.ts";
import { centredResponses, meanResponses } from "./responses.ts";
import type { DependentColumn } from "./whitening.ts";

/** An iteration that did not end; `ranOut` says that it was still lowering its criterion when its iterations were used up. */
export class NotConverged extends Refusal {
  override name = "NotConverged";
  readonly condition: number;
  readonly ranOut: boolean;

  constructor(sentence: string, condition: number, ranOut: boolean) {
    super(sentence);
    this.condition = condition;
    this.ranOut = ranOut;
  }
}

export function refuseNotConverged(
  iterations: number,
  gradient: number,
  largestStep: number,
  condition: number,
  ranOut = false,
): never {
  throw new NotConverged(
    `The estimation did not converge: after ${iterations} iterations the largest gradient per observation is ${printSize(gradient)}, ` +
      `the largest step ${printSize(largestStep)} where 10⁻¹⁰ was wanted, and the condition number ${printSize(condition)}.`,
    condition,
    ranOut,
  );
}

/** The data do not tell some coefficients apart: names the columns where they are collinear, else the coefficients. */
export function refuseNotIdentified(estimation: Estimation, factor: NormalFactor): never {
  const { moments, form, coefficientLabels, demographics = [] } = estimation;
  if (moments.dependent.length > 0) {
    throw new Refusal(
      moments.dependent.map((one) => ({
        sentence: `The moments are singular: ${dependence(one)}.`,
        ...placeOf(one, demographics),
      })),
    );
  }
  const names = factor.dependent.map((f) => coefficientLabels[form.expand.places[f]]);
  throw new Refusal(
    `The moments are singular: the data do not tell ${names.slice(0, 5).join(", ")} apart from the other coefficients ` +
      `(${factor.dependent.length} of ${form.free} free coefficients are not identified).`,
  );
}

/** Where it is mended: among the demographics of the cell, or in the data beneath it. */
function placeOf({ column, on }: DependentColumn, demographics: readonly string[]): Pick<Problem, "key" | "column"> {
  const mine = [column, ...on].find((name) => demographics.includes(name));
  return mine === undefined ? { key: ["data"] } : { key: ["demographics"], column: mine };
}

function dependence({ column, on }: DependentColumn): string {
  if (on.length === 0) return `${column} is constant`;
  return `${column} is an exact linear combination of ${on.join(", ")}${on.length === 1 ? " and the constant" : ""}`;
}

/** Deviations below this, relative to the largest mean share, are rounding. */
const ROUNDING = 1e-13;

/** Shares that never vary leave their equations nothing to explain, and rounding to be taken for residuals. */
export function refuseConstantShares({ moments, equations }: Pick<Estimation, "moments" | "equations">): void {
  const centred = centredResponses({ moments });
  const means = meanResponses({ moments });
  const least = ROUNDING * Math.max(...means.map(Math.abs)) * Math.sqrt(moments.rows);
  const constant = means.flatMap((mean, i) => (lengthOf(columnOf(centred, i)) <= least ? [{ mean, i }] : []));
  if (constant.length === 0) return;
  throw new Refusal(
    constant.map(({ mean, i }) => ({
      sentence: `The residual covariance is singular: ${moments.responseLabels[i]} is ${printShare(mean)} in ${everyRow(moments.rows)} used, so that its equation (one of ${equations.length + 1}) has nothing to explain.`,
      key: ["data"],
    })),
  );
}

const lengthOf = (column: Float64Array) => Math.sqrt(dot(column, column));
const printShare = (share: number) => printQuantity(Math.abs(share) < ROUNDING ? 0 : share, "share");

/** As many as each equation has coefficients before restrictions across equations, and one for every equation. */
export function rowsForEquations(freeWithinEquations: number, equations: number): number {
  return Math.ceil(freeWithinEquations / equations) + equations;
}

/**
 * Each equation needs as many rows as it has coefficients before restrictions across equations, and
 * one more for every equation, or some combination of equations fits exactly and no likelihood exists. Where the
 * form itself restricts across equations, `combined` is what a combination of them needs (`rowsNeeded`).
 */
export function refuseTooFewRows(
  rows: number,
  free: number,
  equations: number,
  freeWithinEquations: number,
  combined = 0,
): void {
  const needed = Math.max(rowsForEquations(freeWithinEquations, equations), combined);
  if (rows >= needed) return;
  throw new Refusal(
    `The data have ${countedRows(rows)} used; ${free} free coefficients in ${equations} equations need at least ${needed}.`,
  );
}
