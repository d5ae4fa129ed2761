import type { FreeForm } from "../../../shared/systems/demand-system.ts";
import { type Columns, columnOf, dot, zeros } from "../estimation/columns.ts";

/**
 * θ with the coefficients at `zero` set to nought: their free coefficients go, and with them all that depends on
 * these alone. Errors: a coefficient that other restrictions tie to one that stays.
 */
export function withoutCoefficients(form: FreeForm, zero: ReadonlySet<number>): FreeForm {
  const kept = form.places.flatMap((place, f) => (zero.has(place) ? [] : [f]));
  const matrix = form.matrix.map((row) => kept.map((f) => row[f]));
  for (const place of zero) {
    if (form.offset[place] !== 0 || matrix[place].some((weight) => weight !== 0)) {
      throw new RangeError(`coefficient ${place} does not vanish with the free coefficients named`);
    }
  }
  return { matrix, offset: form.offset, places: kept.map((f) => form.places[f]) };
}

/** Under the narrow form φ of the wide one satisfies N'(φ − origin) = 0. */
export interface NestedForm {
  /** F_w. */
  readonly origin: readonly number[];
  /** N, F_w × q with orthonormal columns: what is restricted. */
  readonly normals: Columns;
}

/** A direction is new where more than this is left of it beside those before. */
const NEW = 1e-8;

/** How the restrictions of a narrow form read in the free coefficients of a wide one: φ = φ(θ), θ = S_n ψ + s_n. */
export function nestedForm(wide: FreeForm, narrow: FreeForm): NestedForm {
  const free = wide.places.length;
  const basis: Float64Array[] = [];
  const add = (direction: Float64Array): boolean => {
    const size = Math.sqrt(dot(direction, direction));
    // Twice is enough (Kahan; Parlett 1980).
    for (let round = 0; round < 2; round++) {
      for (const known of basis) {
        const along = dot(known, direction);
        for (let f = 0; f < free; f++) direction[f] -= along * known[f];
      }
    }
    const left = Math.sqrt(dot(direction, direction));
    if (!(left > NEW * size)) return false;
    basis.push(direction.map((entry) => entry / left));
    return true;
  };
  for (let g = 0; g < narrow.places.length; g++)
    add(Float64Array.from(wide.places, (place) => narrow.matrix[place][g]));
  const kept = basis.length;
  for (let f = 0; f < free && basis.length < free; f++) {
    const unit = new Float64Array(free);
    unit[f] = 1;
    add(unit);
  }
  const normals = zeros(free, free - kept);
  for (let q = 0; q < normals.columns; q++) columnOf(normals, q).set(basis[kept + q]);
  return { origin: wide.places.map((place) => narrow.offset[place]), normals };
}
