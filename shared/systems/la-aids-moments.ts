import { leadingTerms, partsOf, placesOf } from "./almost-ideal.ts";
import { requireTheta } from "./evaluation.ts";
import type { MomentForm } from "./moment-form.ts";

type Entry = [good: number, term: number, value: number];

/** w = C Z with Z = (1, z, ln p, ln(x/P)) and C the coefficients themselves. */
export const linearApproximateMoments: MomentForm = {
  terms: (size) => [...leadingTerms(size), { kind: "column", column: { kind: "deflated log total" } }],
  coefficients: (theta, size) => {
    const { goods: n, demographics: s } = size;
    const { alpha, demographic, gamma, beta } = partsOf(theta, size);
    return Array.from({ length: n }, (_, i) => [
      alpha[i],
      ...demographic.subarray(i * s, (i + 1) * s),
      ...gamma.subarray(i * n, (i + 1) * n),
      beta[i],
    ]);
  },
  derivatives: (theta, size) => {
    const { goods: n, demographics: s } = size;
    const places = placesOf(size);
    requireTheta(theta, places.count);
    const list: Entry[][] = Array.from({ length: places.count }, () => []);
    for (let i = 0; i < n; i++) {
      list[places.alpha(i)] = [[i, 0, 1]];
      for (let d = 0; d < s; d++) list[places.demographic(i, d)] = [[i, 1 + d, 1]];
      for (let j = 0; j < n; j++) list[places.gamma(i, j)] = [[i, 1 + s + j, 1]];
      list[places.beta(i)] = [[i, 1 + s + n, 1]];
    }
    return list;
  },
};
