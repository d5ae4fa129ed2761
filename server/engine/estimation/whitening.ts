import { type Columns, zeros } from "./columns.ts";
import type { MomentSource } from "./moment-source.ts";

/**
 * The exactly known map between base columns b and whitened ones u: b_j = shift_j + Σ_{i≤j} u_i R_ij.
 * It need not whiten exactly; whatever it is, it is undone exactly, so that it costs no accuracy.
 */
export interface Whitening {
  /** Base columns, then responses. */
  readonly shift: Float64Array;
  /** R, upper triangular over the base columns; a zero on the diagonal marks a dependent column. */
  readonly triangle: Columns;
}

/** No whitening at all: base columns and responses as they are. */
export function plainWhitening({ columns, responses }: MomentSource): Whitening {
  const triangle = zeros(columns.length, columns.length);
  for (let j = 0; j < columns.length; j++) triangle.values[j * columns.length + j] = 1;
  return { shift: new Float64Array(columns.length + responses.length), triangle };
}

/** A base column that is an exact linear combination of the constant and others. */
export interface DependentColumn {
  readonly column: string;
  /** The others that take part; none when it is constant. */
  readonly on: readonly string[];
}
