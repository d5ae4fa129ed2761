import type { CoefficientForm } from "./coefficient-form.ts";
import type { Moments } from "./moments.ts";

/** What is to be estimated: a model, its moments, and the equations estimated (all but the dropped one). */
export interface Estimation {
  readonly moments: Moments;
  readonly form: CoefficientForm;
  readonly equations: readonly number[];
  /** What a refusal calls each of the k coefficients: "γ of bread on the price of milk". */
  readonly coefficientLabels: readonly string[];
}
