import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import type { EasiSize } from "../../shared/systems/demand-system.ts";
import type { SystemName } from "../../shared/systems/names.ts";
import { type Interval, normalInterval } from "./coverage.ts";
import { estimated } from "./estimating.ts";
import { simulateEasi } from "./simulated-easi.ts";
import { type ErrorKind, madeRows } from "./simulated-errors.ts";
import { simulateRotterdam } from "./simulated-rotterdam.ts";
import { simulateShares } from "./simulated-shares.ts";

/** Systems with data of their own making. */
export const RECOVERED = ["la-aids", "aids", "quaids", "les", "rotterdam", "easi", "cubic easi"] as const;
export type RecoveredSystem = (typeof RECOVERED)[number];

export interface SampleDesign {
  readonly errors?: ErrorKind;
  readonly rows: number;
  readonly seed: number;
  readonly rowsOfACluster?: number;
}

/** Rows of a system at coefficients of their own, θ, and the specification that estimates it under symmetry. */
export interface Sample {
  readonly data: PreparedData;
  readonly theta: readonly number[];
  readonly specification: { readonly form: SystemName } & Record<string, unknown>;
}

const BOTH = ["homogeneity", "symmetry"] as const;
const GOODS = 3;

const EASI: Readonly<Record<string, EasiSize>> = {
  easi: { degree: 1, interactions: [] },
  "cubic easi": { degree: 3, interactions: ["prices with expenditure"] },
};

/** The index of LA-AIDS is Laspeyres', which holds no shares of its row: Stone's makes a regressor of the errors. */
export function drawSample(system: RecoveredSystem, design: SampleDesign): Sample {
  const { errors: kind = "independent", rows, seed, rowsOfACluster } = design;
  const random = seededRandom(seed);
  // Errors of contributions to volume build up in the shares, so that they must be small for shares to stay positive.
  const scale = system === "rotterdam" ? { noise: 0.0005, prices: 0.06 } : { noise: 0.025, prices: 0.25 };
  const made = madeRows({
    goods: GOODS,
    rows,
    random,
    errors: kind,
    ...scale,
    ...(rowsOfACluster && { rowsOfACluster }),
  });
  const { logPrices, errors, cluster } = made;
  const inColumns = (data: PreparedData): PreparedData => ({
    ...data,
    numeric: new Map([["cluster", cluster]]),
    time: Float64Array.from(cluster.keys()),
  });
  if (system === "rotterdam") {
    const { data, theta } = simulateRotterdam(logPrices, errors, random);
    return { data: inColumns(data), theta, specification: { form: system, impose: BOTH } };
  }
  const shape = { goods: GOODS, rows, random, noise: 0, logPrices };
  const easi = EASI[system];
  if (easi !== undefined) {
    const { data, theta } = simulateEasi({ ...shape, errors, easi });
    return { data: inColumns(data), theta, specification: { form: "easi", impose: BOTH, ...easi } };
  }
  const form = system as "aids" | "la-aids" | "quaids" | "les";
  const impose = form === "les" ? [] : BOTH;
  const { data, theta } = simulateShares({ ...shape, form, impose, index: "laspeyres" });
  const shares = data.shares.map((share, i) => share.map((value, t) => value + errors[i][t]));
  const index = form === "la-aids" && { index: "laspeyres" };
  return { data: inColumns({ ...data, shares }), theta, specification: { form, impose, ...index } };
}

/** The sample's own estimates, by maximum likelihood. */
export function estimateOf({ data, specification }: Sample, standardErrors: unknown) {
  return estimated(data, { ...specification, demographics: [], "standard errors": standardErrors });
}
export type Estimated = ReturnType<typeof estimateOf>;

/**
 * Intervals of the coefficients: percentile where there are draws, else normal. Percentile intervals of 39 draws cover as
 * often as those of more, 1 − 2k/(B + 1) with the k-th draw from either end, here the outermost: more draws steady
 * their ends (Davison & Hinkley 1997, Bootstrap Methods and their Application, section 2.5 and 4.2.5).
 */
export function coefficientIntervals({ theta }: Pick<Sample, "theta">, found: Estimated): Interval[] {
  return found.coefficients.map(({ estimate, standardError }, a) => {
    if (found.bootstrap === undefined) return normalInterval(theta[a], estimate, standardError);
    const [low, high] = found.bootstrap.intervals[a];
    return { truth: theta[a], low, high };
  });
}
