import { leadingTerms } from "./almost-ideal.ts";
import type { SystemSize } from "./demand-system.ts";
import { easiPlaces } from "./easi-layout.ts";
import { requireTheta } from "./evaluation.ts";
import type { BaseColumn, MomentForm, MomentTerm } from "./moment-form.ts";

type Entry = [good: number, term: number, value: number];

const real = (power: number): BaseColumn => ({ kind: "real expenditure", power });

/**
 * w = C Z with Z = (1, z, ln p, y, …, y^R, {z_k y}, {z_k ln p_j}, {y ln p_j}) and C the coefficients themselves. Only
 * y is special: ln x less mean shares times log prices in the approximate form, where it is given; implicit utility in
 * the exact one, where it depends on θ and on the shares observed.
 */
export const easiMoments: MomentForm = {
  terms: (size) => {
    const { goods: n } = size;
    const { degree, crossed, shifted, tilted } = easiPlaces(size);
    const list: MomentTerm[] = leadingTerms(size);
    const cross = (left: BaseColumn, right: BaseColumn) => list.push({ kind: "product", left, right });
    for (let r = 1; r <= degree; r++) list.push({ kind: "column", column: real(r) });
    for (let index = 0; index < crossed; index++) cross({ kind: "demographic", index }, real(1));
    for (let index = 0; index < shifted; index++) {
      for (let good = 0; good < n; good++) cross({ kind: "demographic", index }, { kind: "log price", good });
    }
    if (tilted > 0) for (let good = 0; good < n; good++) cross(real(1), { kind: "log price", good });
    return list;
  },
  coefficients: (theta, size) => {
    const places = placesOverTerms(size);
    requireTheta(theta, easiPlaces(size).count);
    return places.map((row) => row.map((place) => theta[place]));
  },
  derivatives: (theta, size) => {
    const list: Entry[][] = theta.map(() => []);
    placesOverTerms(size).forEach((row, good) => {
      row.forEach((place, term) => {
        list[place] = [[good, term, 1]];
      });
    });
    return list;
  },
};

/** Where in θ the coefficient of every term stands, n × |Z|. */
function placesOverTerms(size: SystemSize): number[][] {
  const { goods: n, demographics: s } = size;
  const at = easiPlaces(size);
  const upTo = (count: number) => Array.from({ length: count }, (_, index) => index);
  return upTo(n).map((i) => [
    at.power(i, 0),
    ...upTo(s).map((k) => at.demographic(i, k)),
    ...upTo(n).map((j) => at.price(i, j)),
    ...upTo(at.degree).map((r) => at.power(i, r + 1)),
    ...upTo(at.crossed).map((k) => at.cross(i, k)),
    ...upTo(at.shifted).flatMap((k) => upTo(n).map((j) => at.shift(i, k, j))),
    ...(at.tilted > 0 ? upTo(n).map((j) => at.tilt(i, j)) : []),
  ]);
}
