import { seededRandom } from "../../shared/numerics/random.ts";
import { EXACT_SIZES, rejectionRates } from "../support/homogeneity-sizes.ts";
import { fastest, say } from "./timing.ts";

/** Rejections of a true homogeneity in Laitinen's four systems; large ones take longer, and are farther from 5 %. */
const REPLICATES: Readonly<Record<number, number>> = { 5: 4000, 8: 1000, 11: 300, 14: 100 };

for (const sizes of EXACT_SIZES) {
  const replicates = REPLICATES[sizes.goods];
  const { ms, result } = fastest(1, () => rejectionRates(sizes.goods, replicates, seededRandom(1978)));
  say({
    figure: "size of homogeneity tests",
    goods: sizes.goods,
    rows: 31,
    replicates,
    ms,
    corrected: result.corrected,
    correctedExactly: sizes.corrected,
    likelihood: result.likelihood,
    likelihoodExactly: sizes.likelihood,
    laitinen: result.exact,
    laitinenExactly: 0.05,
    monteCarloError: Math.sqrt((sizes.corrected * (1 - sizes.corrected)) / replicates),
  });
}
