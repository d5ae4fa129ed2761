import type { Entry } from "../coefficient-form.ts";
import type { TermPair } from "../moment-source.ts";
import type { ExactSource } from "./exact-source.ts";

/** The value of a term in row t of a source. */
export function termValue({ columns }: Pick<ExactSource, "columns">, [left, right]: TermPair, t: number): number {
  if (right === 0) return 1;
  return (left === 0 ? 1 : columns[left - 1][t]) * columns[right - 1][t];
}

/** The entries of every free coefficient one after another; those of φ_f from `starts[f]` to before `starts[f + 1]`. */
export interface PackedEntries {
  readonly starts: Int32Array;
  readonly equations: Int32Array;
  readonly terms: Int32Array;
  readonly values: Float64Array;
}

/**
 * Entries in the equations named, numbered by their places among these; all of them where none are named. Flat, as
 * every row goes through them.
 */
export function packedEntries(byFree: readonly (readonly Entry[])[], among?: readonly number[]): PackedEntries {
  const kept = byFree.map((entries) =>
    among === undefined
      ? entries
      : entries.flatMap(([equation, term, value]): Entry[] => {
          const place = among.indexOf(equation);
          return place < 0 ? [] : [[place, term, value]];
        }),
  );
  const starts = new Int32Array(byFree.length + 1);
  kept.forEach((entries, f) => {
    starts[f + 1] = starts[f] + entries.length;
  });
  const flat = kept.flat();
  return {
    starts,
    equations: Int32Array.from(flat, ([equation]) => equation),
    terms: Int32Array.from(flat, ([, term]) => term),
    values: Float64Array.from(flat, ([, , value]) => value),
  };
}

/** Σ value · terms[term] · equations[equation] of each free coefficient: (∂C/∂φ_f Z)'u. */
export function loadEntries(
  entries: PackedEntries,
  terms: Float64Array,
  equations: Float64Array,
  into: Float64Array,
): void {
  const { starts } = entries;
  for (let f = 0; f + 1 < starts.length; f++) {
    let sum = 0;
    for (let at = starts[f]; at < starts[f + 1]; at++) {
      sum += entries.values[at] * terms[entries.terms[at]] * equations[entries.equations[at]];
    }
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
