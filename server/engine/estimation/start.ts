import type { CoefficientPlace, DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import { unlessRefused } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { systemForm } from "./coefficient-form.ts";
import type { Estimation } from "./estimation.ts";
import { leastSquares, maximumLikelihood } from "./estimators.ts";
import type { Solution } from "./minimise.ts";
import { meanResponses } from "./responses.ts";

/**
 * θ where the iteration of a system starts: its own start or, where its terms move with θ, the maximum
 * likelihood of the form without such terms, which the moments at hand give without reading a row again
 * (after Blundell & Robin 1999, Journal of Applied Econometrics 14).
 *
 * Errors: `Cancelled`.
 */
export function startOf(
  system: DemandSystem,
  size: SystemSize,
  impose: readonly RestrictionName[],
  estimation: Estimation,
  control: RunControl,
): number[] {
  const nearby = nearbyEstimation(system, size, impose, estimation);
  if (nearby === undefined) return system.start(size, meanResponses(estimation));
  return system.moments.local!.from.embed(nearbyTheta(system, size, nearby, control), size);
}

/**
 * Maximum likelihood; least squares, then a start without any fit, where the data allow none: the larger system may
 * explain what the smaller one cannot, and refuses in its own words if it does not.
 */
function nearbyTheta(
  system: DemandSystem,
  size: SystemSize,
  nearby: Estimation,
  control: RunControl,
): readonly number[] {
  const theta = system.moments.local!.from.start(size, meanResponses(nearby));
  const start = nearby.form.expand.places.map((place) => theta[place]);
  return unlessRefused(
    () => fitNearby(system, size, nearby, control).theta,
    () =>
      unlessRefused(
        () => leastSquares(nearby, true, start, control).theta,
        () => theta,
      ),
  );
}

/**
 * The form without terms that move with θ as an estimation of its own, its coefficients named as those of the
 * larger system; absent where the system has no such terms.
 */
export function nearbyEstimation(
  system: DemandSystem,
  size: SystemSize,
  impose: readonly RestrictionName[],
  { equations, coefficientLabels, moments }: Pick<Estimation, "equations" | "coefficientLabels" | "moments">,
): Estimation | undefined {
  const from = system.moments.local?.from;
  if (from === undefined || moments.local === undefined) return undefined;
  const keyOf = ({ block, good, column }: CoefficientPlace) => [block, good, column].join();
  const labels = new Map(system.layout(size).map((place, a) => [keyOf(place), coefficientLabels[a]]));
  return {
    moments: moments.local.nearby,
    form: systemForm(from, size, impose),
    equations,
    coefficientLabels: from.layout(size).map((place) => labels.get(keyOf(place)) ?? place.block),
  };
}

/** Its maximum likelihood. */
export function fitNearby(system: DemandSystem, size: SystemSize, nearby: Estimation, control: RunControl): Solution {
  const theta = system.moments.local!.from.start(size, meanResponses(nearby));
  const start = nearby.form.expand.places.map((place) => theta[place]);
  return maximumLikelihood(nearby, true, start, "newton", control);
}
