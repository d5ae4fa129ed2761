import { symmetricEigen, withPositiveLargest } from "../numerics/eigen.ts";
import { type Matrix, standardError } from "../numerics/matrix.ts";
import { overGoods, withoutNullDirection } from "./null-direction.ts";

export interface SlutskyEigenvalue {
  readonly value: number;
  readonly standardError: number;
  /** Unit eigenvector over the n goods, orthogonal to ι, largest entry positive. */
  readonly vector: number[];
  /** Its largest entries in words: "sweet drinks against grains". */
  readonly direction: string;
}

/**
 * The n − 1 eigenvalues of ½(K + K') away from the null direction ι, largest first.
 *
 * Standard errors by the delta method with dλ = v'dK v (Magnus 1985, Econometric Theory 1, 179–191),
 * which is exact where the eigenvalue is simple; `derivatives` is ∂k_ij/∂θ, `covariance` that of θ.
 */
export function slutskyEigenvalues(
  matrix: Matrix,
  derivatives: readonly (readonly (readonly number[])[])[],
  covariance: Matrix,
  goods: readonly string[],
): SlutskyEigenvalue[] {
  const { values, vectors } = symmetricEigen(withoutNullDirection(matrix));
  return values.map((value, r) => {
    const vector = withPositiveLargest(overGoods(vectors[r]));
    return {
      value,
      standardError: standardError(covariance, eigenvalueGradient(vector, derivatives)),
      vector,
      direction: directionInWords(vector, goods),
    };
  });
}

/** Σ_ij v_i v_j ∂k_ij/∂θ. */
function eigenvalueGradient(
  vector: readonly number[],
  derivatives: readonly (readonly (readonly number[])[])[],
): number[] {
  const gradient = new Array<number>(derivatives[0][0].length).fill(0);
  for (let i = 0; i < vector.length; i++) {
    for (let j = 0; j < vector.length; j++) {
      const weight = vector[i] * vector[j];
      const entry = derivatives[i][j];
      for (let a = 0; a < gradient.length; a++) gradient[a] += weight * entry[a];
    }
  }
  return gradient;
}

/** An entry is named beside its side's largest when it is at least this part of it. */
const NAMED_BESIDE = 0.8;
const MOST_NAMED = 2;

/**
 * "sweet drinks against grains": on each side the good with the largest entry, and a second one that is
 * nearly as large.
 */
export function directionInWords(vector: readonly number[], goods: readonly string[]): string {
  const positive = leadingGoods(vector, goods);
  const negative = leadingGoods(
    vector.map((entry) => -entry),
    goods,
  );
  return negative.length === 0 ? positive.join(" and ") : `${positive.join(" and ")} against ${negative.join(" and ")}`;
}

function leadingGoods(vector: readonly number[], goods: readonly string[]): string[] {
  const order = vector.map((entry, i) => ({ entry, i })).filter(({ entry }) => entry > 0);
  order.sort((a, b) => b.entry - a.entry || a.i - b.i);
  return order
    .filter(({ entry }) => entry >= NAMED_BESIDE * order[0].entry)
    .slice(0, MOST_NAMED)
    .map(({ i }) => goods[i]);
}

/** The goods that carry a direction: those with the largest entries, whatever their sign. */
export function goodsOfDirection(vector: readonly number[], goods: readonly string[]): string[] {
  const sizes = vector.map(Math.abs);
  return leadingGoods(sizes, goods);
}
