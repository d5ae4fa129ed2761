import { aids } from "./aids.ts";
import type { DemandSystem, EasiSize, SystemSize } from "./demand-system.ts";
import { easi } from "./easi.ts";
import { laAids } from "./la-aids.ts";
import { les } from "./les.ts";
import type { PriceIndexName, RestrictionName, SystemName } from "./names.ts";
import { quaids } from "./quaids.ts";
import { rotterdam } from "./rotterdam.ts";

/** Every demand system by its name; a record over the names, so none can be forgotten. */
export const SYSTEMS: Readonly<Record<SystemName, DemandSystem>> = {
  "la-aids": laAids,
  aids,
  quaids,
  les,
  easi,
  rotterdam,
};

/** What a fitted system says of itself: the part of a finding that evaluation needs. */
export interface FittedCoefficients {
  readonly form: SystemName;
  readonly index?: PriceIndexName;
  /** Required where there is an index: weighted sample means, prices in units of estimation. */
  readonly indexMeans?: { readonly shares: readonly number[]; readonly prices: readonly number[] };
  /** Required of easi. */
  readonly easi?: EasiSize;
  /** Required of systems in differences: weighted means of the observed shares, n. */
  readonly meanShares?: readonly number[];
  readonly goods: readonly string[];
  readonly demographics: readonly string[];
  readonly alpha0: number;
  readonly imposed: readonly RestrictionName[];
  /** θ in the order of the system's layout, k. */
  readonly theta: readonly number[];
  /** Covariance of θ, k × k. */
  readonly covariance: number[][];
}

/** The system of a fitted one and the size its functions are called with. */
export function systemOf(fitted: Omit<FittedCoefficients, "covariance">): { system: DemandSystem; size: SystemSize } {
  const system = SYSTEMS[fitted.form];
  const size: SystemSize = {
    goods: fitted.goods.length,
    demographics: fitted.demographics.length,
    alpha0: fitted.alpha0,
    ...(fitted.meanShares && { meanShares: fitted.meanShares }),
    ...(fitted.easi && { easi: fitted.easi }),
    ...(fitted.index !== undefined &&
      fitted.indexMeans !== undefined && {
        index: {
          name: fitted.index,
          meanShares: fitted.indexMeans.shares,
          meanPrices: fitted.indexMeans.prices,
        },
      }),
  };
  return { system, size };
}

/** Why a system is not defined in some places, as a clause; of one that names no such places, that its formula has no value. */
export function whyNotDefined(form: SystemName): string {
  return SYSTEMS[form].notDefined ?? "its formula has no value there";
}
