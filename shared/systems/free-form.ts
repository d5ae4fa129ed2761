import { zeros } from "../numerics/matrix.ts";
import type { FreeForm } from "./demand-system.ts";

/** A coefficient as a combination of free ones: θ_place = constant + Σ weight · θ_free. */
export interface Dependence {
  readonly place: number;
  readonly constant: number;
  readonly on: readonly (readonly [place: number, weight: number])[];
}

/**
 * θ = S φ + s from the coefficients that depend on others; all those not named are free, in the order
 * of θ. A coefficient may depend on one that itself depends on others: chains are followed.
 */
export function freeForm(coefficients: number, dependences: readonly Dependence[]): FreeForm {
  const bound = new Map(dependences.map((dependence) => [dependence.place, dependence]));
  const places = Array.from({ length: coefficients }, (_, place) => place).filter((place) => !bound.has(place));
  const columnOf = new Map(places.map((place, column) => [place, column]));
  const matrix = zeros(coefficients, places.length);
  const offset = new Array<number>(coefficients).fill(0);
  for (let place = 0; place < coefficients; place++) {
    const row = matrix[place];
    const add = (of: number, weight: number): void => {
      const dependence = bound.get(of);
      if (dependence === undefined) {
        row[columnOf.get(of)!] += weight;
        return;
      }
      offset[place] += weight * dependence.constant;
      for (const [next, factor] of dependence.on) add(next, weight * factor);
    };
    add(place, 1);
  }
  return { matrix, offset, places };
}

/** The last of `places` as the remainder that makes them sum to `total`. */
export function remainder(places: readonly number[], total: number): Dependence {
  return {
    place: places[places.length - 1],
    constant: total,
    on: places.slice(0, -1).map((place) => [place, -1] as const),
  };
}
