import type { Matrix } from "../numerics/matrix.ts";

/** Other coordinates ψ of a system's coefficients, in which the valleys of its likelihood are not bent. */
export interface StraightCoordinates {
  /** F, the length of ψ. */
  readonly free: number;
  theta(straight: readonly number[]): number[];
  /** ∂θ/∂ψ, k × F. */
  jacobian(straight: readonly number[]): Matrix;
  /** ψ of a θ that adds up. */
  of(theta: readonly number[]): number[];
}
