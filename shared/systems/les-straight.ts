import { zeros } from "../numerics/matrix.ts";
import type { SystemSize } from "./demand-system.ts";
import { lesPlaces } from "./les-parts.ts";
import type { StraightCoordinates } from "./straight-coordinates.ts";

/**
 * The linear expenditure system in coordinates in which its likelihood has no bent valley: ψ holds for every column k of
 * committed quantities (c_i, then each c_ik) what is beyond marginal shares of their sum, d_ik = c_ik − b_i s_k of all
 * goods but the last, and the sum s_k = Σ_i c_ik; then b of all goods but the last. Since
 *
 *     Σ_j (δ_ij − b_i) c_j p_j = d_i p_i − b_i Σ_j d_j p_j + s b_i (p_i − Σ_j b_j p_j)
 *
 * s stands beside relative prices only. Where prices move nearly as one it may lie anywhere, and steps of c and b that
 * do not hold d end where the linearisation does.
 */
export function lesStraight(size: SystemSize): StraightCoordinates {
  const { goods: n, demographics: s } = size;
  const places = lesPlaces(size);
  const columns = Array.from({ length: s + 1 }, (_, k) => k);
  const others = Array.from({ length: n - 1 }, (_, i) => i);
  const placeOf = (i: number, k: number) => (k === 0 ? places.committed(i) : places.demographic(i, k - 1));
  const sumAt = (k: number) => k * n + n - 1;
  const marginalAt = (i: number) => n * (s + 1) + i;
  const free = n * (s + 1) + n - 1;
  const marginals = (straight: readonly number[]) => {
    const own = others.map((i) => straight[marginalAt(i)]);
    return [...own, 1 - own.reduce((sum, b) => sum + b, 0)];
  };
  return {
    free,
    theta(straight) {
      const theta = new Array<number>(places.count).fill(0);
      const b = marginals(straight);
      b.forEach((value, i) => {
        theta[places.marginal(i)] = value;
      });
      for (const k of columns) {
        const beyond = others.map((i) => straight[k * n + i]);
        beyond.push(-beyond.reduce((sum, d) => sum + d, 0));
        beyond.forEach((d, i) => {
          theta[placeOf(i, k)] = d + b[i] * straight[sumAt(k)];
        });
      }
      return theta;
    },
    jacobian(straight) {
      const matrix = zeros(places.count, free);
      const b = marginals(straight);
      for (const i of others) {
        matrix[places.marginal(i)][marginalAt(i)] = 1;
        matrix[places.marginal(n - 1)][marginalAt(i)] = -1;
      }
      for (const k of columns) {
        const sum = straight[sumAt(k)];
        b.forEach((value, i) => {
          matrix[placeOf(i, k)][sumAt(k)] = value;
        });
        for (const i of others) {
          matrix[placeOf(i, k)][k * n + i] = 1;
          matrix[placeOf(n - 1, k)][k * n + i] = -1;
          matrix[placeOf(i, k)][marginalAt(i)] = sum;
          matrix[placeOf(n - 1, k)][marginalAt(i)] = -sum;
        }
      }
      return matrix;
    },
    of(theta) {
      const straight = new Array<number>(free).fill(0);
      for (const i of others) straight[marginalAt(i)] = theta[places.marginal(i)];
      for (const k of columns) {
        let sum = 0;
        for (let i = 0; i < n; i++) sum += theta[placeOf(i, k)];
        straight[sumAt(k)] = sum;
        for (const i of others) straight[k * n + i] = theta[placeOf(i, k)] - theta[places.marginal(i)] * sum;
      }
      return straight;
    },
  };
}
