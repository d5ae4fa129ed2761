import { multiply, transpose, zeros } from "../../shared/numerics/matrix.ts";
import type { Random } from "../../shared/numerics/random.ts";
import type { FreeForm, SystemSize } from "../../shared/systems/demand-system.ts";
import type { FittedCoefficients } from "../../shared/systems/index.ts";
import type { RestrictionName, SystemName } from "../../shared/systems/names.ts";

/** A system with given coefficients and no uncertainty, for checks of the economics alone. */
export function exactly(
  form: SystemName,
  goods: readonly string[],
  theta: readonly number[],
  more: Partial<FittedCoefficients> = {},
): FittedCoefficients {
  return {
    form,
    goods,
    demographics: [],
    alpha0: 0,
    imposed: ["homogeneity", "symmetry"],
    theta,
    covariance: zeros(theta.length, theta.length),
    ...more,
  };
}

/** A fitted system whose covariance is a random one of the free coefficients, carried to all of θ: S V_φ S'. */
export function fittedFrom(
  random: Random,
  form: SystemName,
  size: SystemSize,
  imposed: readonly RestrictionName[],
  free: FreeForm,
  theta: readonly number[],
): FittedCoefficients {
  const root = free.places.map(() => free.places.map(() => 0.01 * random.normal()));
  const carried = multiply(free.matrix, root);
  return {
    form,
    goods: Array.from({ length: size.goods }, (_, i) => `good ${i + 1}`),
    demographics: Array.from({ length: size.demographics }, (_, k) => `z${k + 1}`),
    alpha0: size.alpha0,
    imposed,
    theta,
    covariance: multiply(carried, transpose(carried)),
    ...(size.easi && { easi: size.easi }),
    ...(size.meanShares && { meanShares: size.meanShares }),
    ...(size.index && {
      index: size.index.name,
      indexMeans: { shares: size.index.meanShares, prices: size.index.meanPrices },
    }),
  };
}
