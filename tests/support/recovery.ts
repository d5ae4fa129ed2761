import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { normalQuantile } from "../../shared/numerics/normal.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { estimated } from "./estimating.ts";
import { simulateEasi } from "./simulated-easi.ts";
import { simulateShares } from "./simulated-shares.ts";

/** A simulated sample with what was put into it, and what estimation found: one number a coefficient each. */
export interface Recovered {
  readonly truth: readonly number[];
  readonly estimates: readonly number[];
  readonly standardErrors: readonly number[];
}

export interface Coverage {
  readonly samples: number;
  readonly intervals: number;
  /** Of all intervals, those that cover the truth. */
  readonly covered: number;
  /** Half width of the 95 % Monte Carlo interval around 0.95, from how coverage varies between samples. */
  readonly monteCarloError: number;
}

/**
 * How often 95 % intervals (estimate ± 1.96 standard errors) cover the truth over repeated samples. Coefficients of
 * one sample are dependent, so the Monte Carlo error comes from the spread of whole samples' coverage. Coefficients
 * without an error (fixed by restrictions) are left out.
 */
export function coverageOf(samples: number, draw: (sample: number) => Recovered): Coverage {
  const critical = normalQuantile(0.975);
  const shares: number[] = [];
  let intervals = 0;
  for (let sample = 0; sample < samples; sample++) {
    const { truth, estimates, standardErrors } = draw(sample);
    const counted = truth.map((_, a) => a).filter((a) => standardErrors[a] > 1e-7);
    const inside = counted.filter((a) => Math.abs(estimates[a] - truth[a]) <= critical * standardErrors[a]);
    intervals += counted.length;
    shares.push(inside.length / counted.length);
  }
  const covered = shares.reduce((sum, share) => sum + share, 0) / samples;
  const variance = shares.reduce((sum, share) => sum + (share - covered) ** 2, 0) / (samples - 1);
  return { samples, intervals, covered, monteCarloError: critical * Math.sqrt(variance / samples) };
}

/** Systems with data of their own making; the index of LA-AIDS is Laspeyres', which holds no shares of the rows. */
export const RECOVERED = ["la-aids", "aids", "quaids", "les", "easi"] as const;
export type RecoveredSystem = (typeof RECOVERED)[number];

/** "conventional": independent errors. The others: rows in villages that share prices and an error. */
export type ErrorsUnder = "conventional" | "conventional in villages" | "clustered" | "bootstrap";

const ROWS_OF_A_VILLAGE = 4;

/** One sample of a system at coefficients of its own, estimated by maximum likelihood under symmetry. */
export function recover(form: RecoveredSystem, errors: ErrorsUnder, rows: number, seed: number): Recovered {
  const random = seededRandom(seed);
  const impose = form === "les" ? [] : (["homogeneity", "symmetry"] as const);
  const inVillages = errors !== "conventional";
  const shape = { goods: 3, rows, random, noise: 0.02, impose };
  const made =
    form === "easi"
      ? simulateEasi({ ...shape, easi: { degree: 1, interactions: [] } })
      : simulateShares({
          ...shape,
          form,
          index: "laspeyres",
          ...(inVillages && { logPrices: villagePrices(3, rows, () => 0.25 * random.normal()) }),
        });
  const data = inVillages ? withVillageErrors(made.data, () => 0.03 * random.normal()) : made.data;
  const standardErrors = {
    conventional: "conventional",
    "conventional in villages": "conventional",
    clustered: { cluster: "village" },
    bootstrap: { bootstrap: "clusters", cluster: "village", replicates: 60, seed },
  }[errors];
  const { coefficients } = estimated(data, {
    form,
    impose,
    demographics: [],
    ...(form === "la-aids" && { index: "laspeyres" }),
    ...(form === "easi" && { degree: 1 }),
    "standard errors": standardErrors,
  });
  return {
    truth: made.theta,
    estimates: coefficients.map(({ estimate }) => estimate),
    standardErrors: coefficients.map(({ standardError }) => standardError),
  };
}

function villagePrices(goods: number, rows: number, draw: () => number): Float64Array[] {
  return Array.from({ length: goods }, () => {
    const column = new Float64Array(rows);
    for (let t = 0; t < rows; t++) column[t] = t % ROWS_OF_A_VILLAGE === 0 ? draw() : column[t - 1];
    return column;
  });
}

/** The same error in every row of a village, adding to nothing over goods. */
function withVillageErrors(data: PreparedData, draw: () => number): PreparedData {
  const village = Float64Array.from({ length: data.rows }, (_, t) => Math.floor(t / ROWS_OF_A_VILLAGE));
  const shares = data.shares.map((share) => share.slice());
  let errors: number[] = [];
  for (let t = 0; t < data.rows; t++) {
    if (t % ROWS_OF_A_VILLAGE === 0) {
      const drawn = shares.map(draw);
      const mean = drawn.reduce((sum, value) => sum + value, 0) / drawn.length;
      errors = drawn.map((value) => value - mean);
    }
    shares.forEach((share, i) => {
      share[t] += errors[i];
    });
  }
  return { ...data, shares, numeric: new Map([["village", village]]) };
}
