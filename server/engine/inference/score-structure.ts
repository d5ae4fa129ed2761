import type { CoefficientForm } from "../estimation/coefficient-form.ts";

/** A linear combination of terms (or of residuals): places and factors. */
export type Combination = readonly (readonly [place: number, factor: number])[];

/**
 * The scores of a row, s_f = ∂(½ e'Ωe)/∂φ_f = −Σ_i (Ωe)_i Σ_z ∂C_iz/∂φ_f Z_z, as sums of products of a few
 * combinations of residuals with a few combinations of terms: coefficients of a price index share theirs, so that
 * a row costs little more than its residuals.
 */
export interface ScoreStructure {
  /** Places of the responses whose equations are estimated, g. */
  readonly equations: readonly number[];
  /** C of those equations, g × |Z|. */
  readonly coefficients: readonly (readonly number[])[];
  /** −Ω, g × g. */
  readonly weighting: readonly (readonly number[])[];
  /** Combinations of the g weighted residuals −Ωe. */
  readonly mixes: readonly Combination[];
  /** Combinations of the terms. */
  readonly sums: readonly Combination[];
  /** For each free coefficient the pairs (mix, sum) whose products add up to its score. */
  readonly scores: readonly (readonly (readonly [mix: number, sum: number])[])[];
}

/** @param omega Ω, g × g, of the criterion e'Ωe */
export function scoreStructure(
  form: CoefficientForm,
  free: readonly number[],
  equations: readonly number[],
  omega: readonly (readonly number[])[],
): ScoreStructure {
  const placeOf = new Map(equations.map((equation, place) => [equation, place]));
  const coefficients = form.coefficients(free);
  const mixes = new Numbered<Combination>();
  const sums = new Numbered<Combination>();
  const scores = form.derivatives(free).map((entries) => {
    const byTerm = new Map<number, Float64Array>();
    for (const [equation, term, value] of entries) {
      const place = placeOf.get(equation);
      if (place === undefined) continue;
      if (!byTerm.has(term)) byTerm.set(term, new Float64Array(equations.length));
      byTerm.get(term)![place] += value;
    }
    return pairsOf(byTerm, mixes, sums);
  });
  return {
    equations,
    coefficients: equations.map((equation) => coefficients[equation]),
    weighting: omega.map((row) => row.map((value) => -value)),
    mixes: mixes.list,
    sums: sums.list,
    scores,
  };
}

/** Terms met with the same direction over the equations go together. */
function pairsOf(
  byTerm: ReadonlyMap<number, Float64Array>,
  mixes: Numbered<Combination>,
  sums: Numbered<Combination>,
): [number, number][] {
  const byMix = new Map<number, [number, number][]>();
  for (const [term, values] of byTerm) {
    const head = values.find((value) => value !== 0);
    if (head === undefined) continue;
    const mix = mixes.place(
      Array.from(values, (value, i) => [i, value / head] as const).filter(([, part]) => part !== 0),
    );
    if (!byMix.has(mix)) byMix.set(mix, []);
    byMix.get(mix)!.push([term, head]);
  }
  return [...byMix].map(([mix, terms]) => [mix, sums.place(terms)]);
}

/** Different values in the order met, each once. */
class Numbered<T extends Combination> {
  readonly list: T[] = [];
  private readonly places = new Map<string, number>();

  place(value: T): number {
    const key = value.join();
    const known = this.places.get(key);
    if (known !== undefined) return known;
    this.places.set(key, this.list.length);
    this.list.push(value);
    return this.list.length - 1;
  }
}
