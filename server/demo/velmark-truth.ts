/**
 * The demand system from which the Velmark survey is simulated: an almost ideal demand system (Deaton & Muellbauer
 * 1980) in normalised units, p = x = 1 at the sample means and α₀ = 0, so that estimation on the normalised data
 * aims at exactly these numbers. Adding-up, homogeneity and symmetry hold; the Slutsky matrix at the base point
 * is negative semidefinite with the price vector its only null direction.
 */
export const VELMARK_GOODS = ["Grains", "Dairy", "Produce", "Meat & fish", "Sweet drinks", "Other food"] as const;

/** Shares at the base point, demographics at `REFERENCE`. */
const BASE_SHARES = [0.248, 0.127, 0.171, 0.209, 0.065, 0.18];

/** Where the demographics stand near the middle of the survey: a household of 3.3, 43 % urban. */
const REFERENCE = { log_size: 1.2, urban: 0.43 };

const EXPENDITURE = [-0.08, 0.006, -0.008, 0.07, 0.009, 0.003];

/** Compensated effects between two goods at the base point, share form: above zero for net substitutes. */
const COMPENSATED: readonly (readonly number[])[] = [
  [],
  [0.018],
  [0.024, 0.013],
  [0.01, 0.03, 0.036],
  [0.002, 0.004, -0.003, 0.024],
  [0.012, 0.012, 0.018, 0.038, 0.022],
];

const DEMOGRAPHICS = {
  log_size: [0.023, -0.009, -0.011, 0.009, 0.006, -0.018],
  urban: [-0.029, 0.012, 0.006, 0.004, 0.01, -0.003],
};

export interface AlmostIdealTruth {
  /** Constant α_i: the intercept where every demographic is zero. */
  readonly alpha: readonly number[];
  readonly demographics: { readonly log_size: readonly number[]; readonly urban: readonly number[] };
  readonly beta: readonly number[];
  readonly gamma: readonly (readonly number[])[];
  /** K at the base point in share form. */
  readonly slutsky: readonly (readonly number[])[];
}

/** γ_ij = k_ij + w_i δ_ij − w_i w_j at the base point, where ln(x/P) = 0. */
export function velmarkTruth(): AlmostIdealTruth {
  const goods = BASE_SHARES.map((_, i) => i);
  const between = (i: number, j: number) => COMPENSATED[Math.max(i, j)][Math.min(i, j)];
  // Rows sum to zero (homogeneity), so the own effect is what the others leave.
  const own = (i: number) => -goods.reduce((sum, j) => (j === i ? sum : sum + between(i, j)), 0);
  const slutsky = goods.map((i) => goods.map((j) => (i === j ? own(i) : between(i, j))));
  const gamma = goods.map((i) =>
    goods.map((j) => slutsky[i][j] + (i === j ? BASE_SHARES[i] : 0) - BASE_SHARES[i] * BASE_SHARES[j]),
  );
  const alpha = goods.map(
    (i) => BASE_SHARES[i] - DEMOGRAPHICS.log_size[i] * REFERENCE.log_size - DEMOGRAPHICS.urban[i] * REFERENCE.urban,
  );
  return { alpha, demographics: DEMOGRAPHICS, beta: EXPENDITURE, gamma, slutsky };
}

/** w(p, x, z) of the almost ideal system; `logPrices` and `logTotal` in normalised units. */
export function trueShares(
  truth: AlmostIdealTruth,
  logPrices: readonly number[],
  logTotal: number,
  logSize: number,
  urban: number,
): number[] {
  const { alpha, demographics, beta, gamma } = truth;
  const intercept = alpha.map((a, i) => a + demographics.log_size[i] * logSize + demographics.urban[i] * urban);
  const response = gamma.map((row) => row.reduce((sum, value, j) => sum + value * logPrices[j], 0));
  const logIndex = logPrices.reduce((sum, price, i) => sum + price * (intercept[i] + response[i] / 2), 0);
  return intercept.map((a, i) => a + response[i] + beta[i] * (logTotal - logIndex));
}
