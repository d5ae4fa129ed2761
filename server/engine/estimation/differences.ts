import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { placesOf } from "../../../shared/systems/almost-ideal.ts";
import type { DemandSystem, FreeForm, SystemSize } from "../../../shared/systems/demand-system.ts";
import type { MomentForm } from "../../../shared/systems/moment-form.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { demographicColumn } from "../columns/seasonal-terms.ts";
import { weightedMean } from "../columns/weighted.ts";
import { deflatedLogTotal } from "./deflated-total.ts";

/** Weighted means over the levels of every row used that has the columns. */
interface LevelMeans {
  readonly shares: readonly number[];
  readonly demographics: readonly number[];
  readonly logPrices: readonly number[];
  readonly real: number;
}

/**
 * LA-AIDS for changes from one period to the next:
 *
 *     Δw_i = Σ_k α_ik Δz_k + Σ_j γ_ij Δln p_j + β_i Δln(x/P)
 *
 * The intercepts α_i stand in no equation. They are those with which the system in levels passes through the
 * means of the rows used,
 *
 *     α_i = w̄_i − Σ_k α_ik z̄_k − Σ_j γ_ij mean(ln p_j) − β_i mean(ln(x/P)),
 *
 * linear in the other coefficients, so that their covariance follows from those; it takes the means as given.
 * A trend among the demographics is an intercept of the equations where periods follow one another.
 */
export function systemInDifferences(
  system: DemandSystem,
  specification: Pick<SystemSpecification, "demographics" | "index">,
  data: PreparedData,
): DemandSystem {
  const means = levelMeans(specification, data);
  return {
    ...system,
    moments: withoutIntercepts(system.moments),
    free: (size, impose) => throughMeans(system.free(size, impose), size, means),
  };
}

function levelMeans({ demographics, index }: Pick<SystemSpecification, "demographics" | "index">, data: PreparedData) {
  // The lagged Stone index has no value in the first period, which then counts in no mean.
  const real = deflatedLogTotal(data, index);
  const weights = real.map((value, t) => (Number.isNaN(value) ? 0 : (data.weights?.[t] ?? 1)));
  const mean = (column: Float64Array) => weightedMean(column, weights);
  return {
    shares: data.shares.map(mean),
    demographics: demographics.map((name) => mean(demographicColumn(data, name)!)),
    logPrices: data.logPrices.map(mean),
    real: mean(real.map((value) => (Number.isNaN(value) ? 0 : value))),
  };
}

/** The constant is the first term. */
function withoutIntercepts(moments: MomentForm): MomentForm {
  return {
    terms: moments.terms,
    coefficients: (theta, size) => moments.coefficients(theta, size).map(([, ...rest]) => [0, ...rest]),
    derivatives: (theta, size) =>
      moments.derivatives(theta, size).map((entries) => entries.filter(([, term]) => term !== 0)),
  };
}

/** θ = S φ + s with α no longer free: its rows are the means less the other rows times theirs. */
function throughMeans({ matrix, offset, places }: FreeForm, size: SystemSize, means: LevelMeans): FreeForm {
  const { goods: n, demographics: s } = size;
  const at = placesOf(size);
  const intercepts = new Set(Array.from({ length: n }, (_, i) => at.alpha(i)));
  const kept = places.map((_, f) => f).filter((f) => !intercepts.has(places[f]));
  const rows = matrix.map((row) => kept.map((f) => row[f]));
  const constants = [...offset];
  for (let i = 0; i < n; i++) {
    const parts: [place: number, mean: number][] = [
      ...means.demographics.map((mean, k): [number, number] => [at.demographic(i, k), mean]),
      ...means.logPrices.map((mean, j): [number, number] => [at.gamma(i, j), mean]),
      [at.beta(i), means.real],
    ];
    if (parts.length !== s + n + 1) throw new RangeError(`${means.demographics.length} means for ${s} demographics`);
    rows[at.alpha(i)] = kept.map((_, f) => -parts.reduce((sum, [place, mean]) => sum + mean * rows[place][f], 0));
    constants[at.alpha(i)] = parts.reduce((sum, [place, mean]) => sum - mean * offset[place], means.shares[i]);
  }
  return { matrix: rows, offset: constants, places: kept.map((f) => places[f]) };
}
