import type { MomentSource } from "../estimation/moment-source.ts";
import { closure } from "../estimation/moments.ts";
import { BLOCK_ROWS, termBlock } from "../estimation/term-block.ts";
import { plainWhitening } from "../estimation/whitening.ts";
import type { Combination, ScoreStructure } from "./score-structure.ts";

/** Scores h_t s_t of a block of rows: that of coefficient f of row t stands at f·BLOCK_ROWS + t − from. */
export interface RowScores {
  readonly scores: Float64Array;
  fill(from: number, rows: number): void;
}

/** Weighted scores of every row of a source, a block at a time; nothing is allocated per row. */
export function rowScores(source: MomentSource, structure: ScoreStructure): RowScores {
  const { coefficients, equations, mixes, sums } = structure;
  const base = source.columns.length;
  const responses = equations.map((equation) => [0, base + 1 + equation] as const);
  const formed = closure(source);
  const { block, fill } = termBlock(source, plainWhitening(source), [...formed, ...responses]);
  const columnAt = (place: number) => block.subarray(place * BLOCK_ROWS, (place + 1) * BLOCK_ROWS);
  const placeOf = new Map(formed.map((term, place) => [term.join(), place]));
  const terms = source.terms.map((term) => columnAt(placeOf.get(term.join())!));
  const residuals = equations.map((_, place) => columnAt(formed.length + place));
  const mixed = mixes.map(() => new Float64Array(BLOCK_ROWS));
  const summed = sums.map(() => new Float64Array(BLOCK_ROWS));
  const weighted = equations.map(() => new Float64Array(BLOCK_ROWS));
  const weightingOf = structure.weighting.map((row): Combination => row.map((factor, i) => [i, factor] as const));
  const lessExplained = coefficients.map(
    (row): Combination => row.flatMap((factor, term) => (factor === 0 ? [] : [[term, -factor] as const])),
  );
  const scores = new Float64Array(structure.scores.length * BLOCK_ROWS);
  return {
    scores,
    fill(from, rows) {
      fill(from, rows);
      residuals.forEach((column, i) => {
        addCombination(column, terms, lessExplained[i], rows);
      });
      weighted.forEach((column, i) => {
        addCombination(column.fill(0), residuals, weightingOf[i], rows);
      });
      mixed.forEach((column, at) => {
        addCombination(column.fill(0), weighted, mixes[at], rows);
      });
      summed.forEach((column, at) => {
        addCombination(column.fill(0), terms, sums[at], rows);
      });
      scores.fill(0);
      structure.scores.forEach((pairs, f) => {
        const column = scores.subarray(f * BLOCK_ROWS, (f + 1) * BLOCK_ROWS);
        for (const [mix, sum] of pairs) addProduct(column, mixed[mix], summed[sum], rows);
      });
    },
  };
}

function addCombination(target: Float64Array, columns: readonly Float64Array[], parts: Combination, rows: number) {
  // Four columns at a time: the target is read and written a quarter as often.
  let at = 0;
  for (; at + 3 < parts.length; at += 4) {
    const [p0, f0] = parts[at];
    const [p1, f1] = parts[at + 1];
    const [p2, f2] = parts[at + 2];
    const [p3, f3] = parts[at + 3];
    const [c0, c1, c2, c3] = [columns[p0], columns[p1], columns[p2], columns[p3]];
    for (let t = 0; t < rows; t++) target[t] += f0 * c0[t] + f1 * c1[t] + f2 * c2[t] + f3 * c3[t];
  }
  for (; at < parts.length; at++) {
    const [place, factor] = parts[at];
    const column = columns[place];
    for (let t = 0; t < rows; t++) target[t] += factor * column[t];
  }
}

function addProduct(target: Float64Array, left: Float64Array, right: Float64Array, rows: number): void {
  for (let t = 0; t < rows; t++) target[t] += left[t] * right[t];
}
