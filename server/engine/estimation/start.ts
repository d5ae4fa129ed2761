import type { CoefficientPlace, DemandSystem, NearbyForm, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import type { RunControl } from "../run.ts";
import { systemForm } from "./coefficient-form.ts";
import type { Estimation } from "./estimation.ts";
import { maximumLikelihood } from "./estimators.ts";
import type { Moments } from "./moments.ts";
import { meanResponses } from "./responses.ts";

/**
 * θ where the iteration of a system starts: its own start or, where its terms move with θ, the maximum
 * likelihood of the form without such terms, which the moments at hand give without reading a row again
 * (after Blundell & Robin 1999, Journal of Applied Econometrics 14).
 *
 * Errors: those of the form without such terms, which the larger one would meet too; `Cancelled`.
 */
export function startOf(
  system: DemandSystem,
  size: SystemSize,
  impose: readonly RestrictionName[],
  estimation: Estimation,
  control: RunControl,
): number[] {
  const from = system.moments.local?.from;
  const moments = estimation.moments.local?.nearby;
  if (from === undefined || moments === undefined) return system.start(size, meanResponses(estimation));
  const nearby = nearbyEstimation(system, from, size, impose, estimation, moments);
  const theta = from.start(size, meanResponses(nearby));
  const start = nearby.form.expand.places.map((place) => theta[place]);
  return from.embed(maximumLikelihood(nearby, true, start, "newton", control).theta, size);
}

/** The form estimated first as an estimation of its own, its coefficients named as those of the larger system. */
function nearbyEstimation(
  system: DemandSystem,
  from: NearbyForm,
  size: SystemSize,
  impose: readonly RestrictionName[],
  { equations, coefficientLabels }: Estimation,
  moments: Moments,
): Estimation {
  const keyOf = ({ block, good, column }: CoefficientPlace) => [block, good, column].join();
  const labels = new Map(system.layout(size).map((place, a) => [keyOf(place), coefficientLabels[a]]));
  return {
    moments,
    form: systemForm(from, size, impose),
    equations,
    coefficientLabels: from.layout(size).map((place) => labels.get(keyOf(place)) ?? place.block),
  };
}
