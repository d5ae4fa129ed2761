import type { CoefficientForm } from "./coefficient-form.ts";
import type { Moments } from "./moments.ts";

/** What is to be estimated: a model, its moments, and the equations estimated (all but the dropped one). */
export interface Estimation {
  /** Where the form's terms move with θ they say where to find those of any θ: `Solution.moments` are those at the solution. */
  readonly moments: Moments;
  readonly form: CoefficientForm;
  readonly equations: readonly number[];
  /** What a refusal calls each of the k coefficients: "γ of bread on the price of milk". */
  readonly coefficientLabels: readonly string[];
  /** Names among the columns that a cell asks for as demographics: where a refusal says that one is mended. */
  readonly demographics?: readonly string[];
}
