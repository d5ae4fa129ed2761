import type { Entry } from "../coefficient-form.ts";
import type { TermPair } from "../moment-source.ts";
import type { ExactSource } from "./exact-source.ts";

/** The value of a term in row t of a source. */
export function termValue({ columns }: Pick<ExactSource, "columns">, [left, right]: TermPair, t: number): number {
  if (right === 0) return 1;
  return (left === 0 ? 1 : columns[left - 1][t]) * columns[right - 1][t];
}

/** The entries of each free coefficient, their equations numbered by their places among `equations`. */
export function entriesOf(byFree: readonly (readonly Entry[])[], equations: readonly number[]): Entry[][] {
  const placeOf = new Map(equations.map((equation, place) => [equation, place]));
  return byFree.map((entries) =>
    entries.flatMap(([equation, term, value]): Entry[] => {
      const place = placeOf.get(equation);
      return place === undefined ? [] : [[place, term, value]];
    }),
  );
}

/** Σ value · terms[term] · equations[equation] of each free coefficient: (∂C/∂φ_f Z)'u. */
export function loadEntries(
  entries: readonly (readonly Entry[])[],
  terms: Float64Array,
  equations: Float64Array,
  into: Float64Array,
): void {
  for (let f = 0; f < entries.length; f++) {
    let sum = 0;
    for (const [equation, term, value] of entries[f]) sum += value * terms[term] * equations[equation];
    into[f] = sum;
  }
}

/** M u for M symmetric, g × g by columns. */
export function timesSymmetric(matrix: Float64Array, vector: Float64Array, into: Float64Array): void {
  const size = vector.length;
  for (let i = 0; i < size; i++) {
    let sum = 0;
    for (let j = 0; j < size; j++) sum += matrix[j * size + i] * vector[j];
    into[i] = sum;
  }
}
