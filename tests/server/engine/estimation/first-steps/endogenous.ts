import type { PreparedData } from "../../../../../server/engine/columns/prepared-data.ts";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { type Simulation, simulateShares } from "../../../../support/simulated-shares.ts";

/** What the shares' errors hold of the error of ln x, by good; they sum to zero. */
export const RHO = [0.06, -0.02, -0.04];

/**
 * Shares whose errors hold ρ_i v with v part of ln x, and an instrument that is ln x without v: with var(v) half that of
 * ln x and cov(instrument, v) = 0. `strength` times the instrument is left of it beside noise.
 */
export function endogenousShares({
  rho = RHO,
  seed = 5,
  strength = 1,
  ...more
}: Partial<Simulation> & { rho?: number[]; seed?: number; strength?: number } = {}): {
  data: PreparedData;
  theta: number[];
  residual: Float64Array;
} {
  const random = seededRandom(seed);
  const { data, theta } = simulateShares({
    form: "aids",
    goods: 3,
    rows: 3000,
    noise: 0.02,
    impose: ["homogeneity", "symmetry"],
    random,
    ...more,
  });
  const residual = data.logTotal.map((value) => 0.5 * value + 0.25 * random.normal());
  const instrument = data.logTotal.map((value, t) => strength * (value - residual[t]) + 0.02 * random.normal());
  const second = instrument.map((value) => value + 0.3 * random.normal());
  const shares = data.shares.map((share, i) => share.map((value, t) => value + rho[i] * residual[t]));
  const numeric = new Map([...data.numeric, ["earnings", instrument], ["rent", second]]);
  return { data: { ...data, shares, numeric }, theta, residual };
}
