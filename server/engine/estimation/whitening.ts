import type { Columns } from "./columns.ts";

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

/** A base column that is an exact linear combination of the constant and others. */
export interface DependentColumn {
  readonly column: string;
  /** The others that take part; none when it is constant. */
  readonly on: readonly string[];
}
