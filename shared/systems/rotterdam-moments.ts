import { leadingTerms } from "./almost-ideal.ts";
import { requireTheta } from "./evaluation.ts";
import type { MomentForm } from "./moment-form.ts";
import { rotterdamPlaces } from "./rotterdam-places.ts";

type Entry = [good: number, term: number, value: number];

/**
 * w̄ Δln q = C Z with Z = (1, Δz, Δln p, Δln Q) and C the coefficients themselves; the constant, there for the
 * means of the rows, stands in no equation. The estimator forms the changes.
 */
export const rotterdamMoments: MomentForm = {
  terms: (size) => [...leadingTerms(size), { kind: "column", column: { kind: "log volume" } }],
  coefficients: (theta, size) => {
    const { goods: n, demographics: s } = size;
    const places = rotterdamPlaces(size);
    requireTheta(theta, places.count);
    return Array.from({ length: n }, (_, i) => [
      0,
      ...Array.from({ length: s }, (_, k) => theta[places.demographic(i, k)]),
      ...Array.from({ length: n }, (_, j) => theta[places.slutsky(i, j)]),
      theta[places.marginal(i)],
    ]);
  },
  derivatives: (theta, size) => {
    const { goods: n, demographics: s } = size;
    const places = rotterdamPlaces(size);
    requireTheta(theta, places.count);
    const list: Entry[][] = Array.from({ length: places.count }, () => []);
    for (let i = 0; i < n; i++) {
      for (let k = 0; k < s; k++) list[places.demographic(i, k)] = [[i, 1 + k, 1]];
      for (let j = 0; j < n; j++) list[places.slutsky(i, j)] = [[i, 1 + s + j, 1]];
      list[places.marginal(i)] = [[i, 1 + s + n, 1]];
    }
    return list;
  },
};
