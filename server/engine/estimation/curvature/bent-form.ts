import type { Matrix } from "../../../../shared/numerics/matrix.ts";
import type { DemandSystem, FreeForm, SystemSize } from "../../../../shared/systems/demand-system.ts";
import { type CoefficientForm, type Expansion, expand, throughRestrictions } from "../coefficient-form.ts";
import type { CurvatureMap } from "./curvature-map.ts";

/**
 * Share equations whose curvature holds at a point, or in bent coordinates: the first k coefficients follow from the
 * map, those that stand after them (a control function's) from their own linear restrictions. `at` is where S of the
 * expansion is formed.
 */
export function bentForm(
  system: DemandSystem,
  size: SystemSize,
  map: Omit<CurvatureMap, "triangle">,
  places: readonly number[],
  rest: FreeForm,
  at: readonly number[],
): CoefficientForm {
  const own = (free: readonly number[]) => free.slice(0, map.free);
  const theta = (free: readonly number[]) => [...map.theta(own(free)), ...expand(rest, free.slice(map.free))];
  const slope = (free: readonly number[]): Matrix => [
    ...map.jacobian(own(free)).map((row) => [...row, ...rest.places.map(() => 0)]),
    ...rest.matrix.map((row) => [...new Array<number>(map.free).fill(0), ...row]),
  ];
  const k = map.theta(own(at)).length;
  const allPlaces = [...places, ...rest.places.map((place) => k + place)];
  const matrix = slope(at);
  const centre = theta(at);
  const expansion: Expansion = {
    matrix,
    offset: centre.map((value, a) => matrix[a].reduce((left, weight, f) => left - weight * at[f], value)),
    places: allPlaces,
    bent: theta,
  };
  return {
    free: map.free + rest.places.length,
    expand: expansion,
    coefficients: (free) => system.moments.coefficients(theta(free), size),
    derivatives: (free) =>
      throughRestrictions(system.moments.derivatives(theta(free), size), { matrix: slope(free), places: allPlaces }),
  };
}

/** What stands after the first k coefficients, with restrictions among themselves only. */
export function restAfter({ matrix, offset, places }: FreeForm, k: number): FreeForm {
  const columns = places.flatMap((place, f) => (place >= k ? [f] : []));
  return {
    matrix: matrix.slice(k).map((row) => columns.map((f) => row[f])),
    offset: offset.slice(k),
    places: columns.map((f) => places[f] - k),
  };
}
