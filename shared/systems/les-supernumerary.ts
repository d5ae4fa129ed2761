import type { Point, SystemSize } from "./demand-system.ts";
import { committedAt, lesParts, lesPlaces } from "./les-parts.ts";

/** The share of supernumerary expenditure at a point, 1 − Σ_j c_j(z) p_j/x, and its gradient in θ. */
export interface Supernumerary {
  readonly share: number;
  readonly gradient: number[];
}

/** What the linear expenditure system leaves beyond committed quantities at a point. */
export function supernumeraryAt(theta: readonly number[], size: SystemSize, point: Point): Supernumerary {
  const places = lesPlaces(size);
  const committed = new Float64Array(size.goods);
  committedAt(lesParts(theta, size), point.demographics, committed);
  const gradient = new Array<number>(places.count).fill(0);
  let share = 1;
  for (let j = 0; j < size.goods; j++) {
    const ratio = point.prices[j] / point.total;
    share -= committed[j] * ratio;
    gradient[places.committed(j)] = -ratio;
    point.demographics.forEach((z, k) => {
      gradient[places.demographic(j, k)] = -ratio * z;
    });
  }
  return { share, gradient };
}
