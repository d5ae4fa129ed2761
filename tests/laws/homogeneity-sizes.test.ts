import { expect, it } from "vitest";
import { seededRandom } from "../../shared/numerics/random.ts";
import { EXACT_SIZES, rejectionRates } from "../support/homogeneity-sizes.ts";

/** Half-width of a 99.9 % interval of a rate. */
const band = (size: number, replicates: number) => 3.3 * Math.sqrt((size * (1 - size)) / replicates);

it.each([
  [EXACT_SIZES[0], 300],
  [EXACT_SIZES[1], 60],
])(
  "tests of a true homogeneity reject as often as Laitinen's distribution says: %o, %d samples",
  (sizes, replicates) => {
    const rates = rejectionRates(sizes.goods, replicates, seededRandom(78));
    expect(Math.abs(rates.corrected - sizes.corrected)).toBeLessThan(band(sizes.corrected, replicates));
    expect(Math.abs(rates.likelihood - sizes.likelihood)).toBeLessThan(band(sizes.likelihood, replicates));
    expect(Math.abs(rates.exact - 0.05)).toBeLessThan(band(0.05, replicates));
  },
);
