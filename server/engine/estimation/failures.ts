import { Refusal } from "../refusal.ts";
import type { Estimation } from "./estimation.ts";
import type { NormalFactor } from "./normal-factor.ts";
import type { DependentColumn } from "./whitening.ts";

const digits = (value: number) => value.toPrecision(3);

export function refuseNotConverged(
  iterations: number,
  gradient: number,
  largestStep: number,
  condition: number,
): never {
  throw new Refusal(
    `The estimation did not converge: after ${iterations} iterations the largest gradient per observation is ${digits(gradient)}, ` +
      `the largest step ${digits(largestStep)} where 1e-10 was wanted, and the condition number ${digits(condition)}.`,
  );
}

/** The data do not tell some coefficients apart: names the columns where they are collinear, else the coefficients. */
export function refuseNotIdentified({ moments, form, coefficientLabels }: Estimation, factor: NormalFactor): never {
  if (moments.dependent.length > 0) {
    throw new Refusal(
      moments.dependent.map((column) => ({ sentence: `The moments are singular: ${dependence(column)}.` })),
    );
  }
  const names = factor.dependent.map((f) => coefficientLabels[form.expand.places[f]]);
  throw new Refusal(
    `The moments are singular: the data do not tell ${names.slice(0, 5).join(", ")} apart from the other coefficients ` +
      `(${factor.dependent.length} of ${form.free} free coefficients are not identified).`,
  );
}

function dependence({ column, on }: DependentColumn): string {
  if (on.length === 0) return `${column} is constant`;
  return `${column} is an exact linear combination of ${on.join(", ")}${on.length === 1 ? " and the constant" : ""}`;
}

/**
 * Each equation needs as many rows as it has coefficients before restrictions across equations, and
 * one more for every equation, or some combination of equations fits exactly and no likelihood exists.
 */
export function refuseTooFewRows(rows: number, free: number, equations: number, freeWithinEquations: number): void {
  const needed = Math.ceil(freeWithinEquations / equations) + equations;
  if (rows >= needed) return;
  throw new Refusal(
    `The data have ${rows} rows used; ${free} free coefficients in ${equations} equations need at least ${needed}.`,
  );
}
