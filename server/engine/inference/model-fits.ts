import type { DemandSystem, FreeForm, SystemSize } from "../../../shared/systems/demand-system.ts";
import { constrainedForm } from "../estimation/coefficient-form.ts";
import type { Estimation } from "../estimation/estimation.ts";
import { fitMeasures } from "../estimation/fit-measures.ts";
import type { Solution } from "../estimation/minimise.ts";
import type { Moments } from "../estimation/moments.ts";
import { fromNearby } from "../estimation/nested-fits.ts";
import { unlessRefused } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import type { RefusedFit } from "./restriction-tests.ts";

/** A system and its moments: what every nested model of it is fitted from. */
export interface Model {
  readonly system: DemandSystem;
  readonly size: SystemSize;
  readonly moments: Moments;
  readonly coefficientLabels: readonly string[];
  /** θ of a fit that is near all others: where they start. */
  readonly theta: readonly number[];
}

export interface ModelFit {
  readonly estimation: Estimation;
  readonly solution: Solution;
  readonly logLikelihood: number;
}

/** Fits by maximum likelihood under any linear restrictions, each made once. */
export class ModelFits {
  readonly #model: Model;
  readonly #control: RunControl;
  readonly #known = new Map<FreeForm, ModelFit | RefusedFit>();

  constructor(model: Model, control: RunControl) {
    this.#model = model;
    this.#control = control;
  }

  /** All but the last equation: no likelihood depends on which. */
  estimation(form: FreeForm): Estimation {
    const { system, size, moments, coefficientLabels } = this.#model;
    const equations = Array.from({ length: moments.responses.columns - 1 }, (_, equation) => equation);
    return { moments, form: constrainedForm(system, size, form), equations, coefficientLabels };
  }

  /** Errors: `Cancelled`; a refusal is told as such. */
  under(form: FreeForm): ModelFit | RefusedFit {
    const known = this.#known.get(form) ?? unlessRefused(() => this.#fit(form));
    this.#known.set(form, known);
    return known;
  }

  #fit(form: FreeForm): ModelFit {
    const estimation = this.estimation(form);
    const start = form.places.map((place) => this.#model.theta[place]);
    const solution = fromNearby(estimation, start, this.#control);
    return { estimation, solution, logLikelihood: fitMeasures(estimation, solution).logLikelihood };
  }
}
