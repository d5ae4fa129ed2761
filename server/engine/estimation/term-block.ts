import type { MomentSource, TermPair } from "./moment-source.ts";
import type { Whitening } from "./whitening.ts";

/** Rows formed at a time: a block of a hundred columns stays in the second-level cache. */
export const BLOCK_ROWS = 256;

/**
 * Forms the whitened term columns of rows `from` … `from + rows`: `fill` writes them into `block`,
 * column c at c·BLOCK_ROWS. Places of `terms` count the base columns first, the responses after them;
 * a row's weight enters as its square root in every column. Nothing is allocated per row.
 */
export interface TermBlock {
  readonly block: Float64Array;
  fill(from: number, rows: number): void;
}

export function termBlock(source: MomentSource, whitening: Whitening, terms: readonly TermPair[]): TermBlock {
  const base = source.columns.length;
  const inputs = [...source.columns, ...source.responses];
  const whitened = inputs.map(() => new Float64Array(BLOCK_ROWS));
  const scaled = source.weights === undefined ? whitened : inputs.map(() => new Float64Array(BLOCK_ROWS));
  const roots = new Float64Array(BLOCK_ROWS).fill(1);
  const block = new Float64Array(terms.length * BLOCK_ROWS);
  const columns = terms.map((_, term) => block.subarray(term * BLOCK_ROWS, (term + 1) * BLOCK_ROWS));

  function fill(from: number, rows: number): void {
    for (let input = 0; input < inputs.length; input++) {
      shiftInto(whitened[input], inputs[input], from, rows, whitening.shift[input]);
      if (input < base) whiten(whitened, input, rows, whitening);
    }
    if (source.weights !== undefined) {
      for (let t = 0; t < rows; t++) roots[t] = Math.sqrt(source.weights[from + t]);
      for (let input = 0; input < inputs.length; input++) multiplyInto(scaled[input], whitened[input], roots, rows);
    }
    for (let term = 0; term < terms.length; term++) {
      const [left, right] = terms[term];
      if (right === 0) copyInto(columns[term], roots, rows);
      else if (left === 0) copyInto(columns[term], scaled[right - 1], rows);
      else multiplyInto(columns[term], whitened[left - 1], scaled[right - 1], rows);
    }
  }
  return { block, fill };
}

function shiftInto(target: Float64Array, column: Float64Array, from: number, rows: number, shift: number): void {
  for (let t = 0; t < rows; t++) target[t] = column[from + t] - shift;
}

/** u_j = (b_j − Σ_{i<j} u_i R_ij) / R_jj; a dependent column becomes zero. */
function whiten(columns: readonly Float64Array[], place: number, rows: number, { triangle }: Whitening): void {
  const target = columns[place];
  const offset = place * triangle.rows;
  const diagonal = triangle.values[offset + place];
  if (diagonal === 0) {
    target.fill(0);
    return;
  }
  for (let i = 0; i < place; i++) {
    const factor = triangle.values[offset + i];
    if (factor === 0) continue;
    const earlier = columns[i];
    for (let t = 0; t < rows; t++) target[t] -= factor * earlier[t];
  }
  for (let t = 0; t < rows; t++) target[t] /= diagonal;
}

function multiplyInto(target: Float64Array, left: Float64Array, right: Float64Array, rows: number): void {
  for (let t = 0; t < rows; t++) target[t] = left[t] * right[t];
}

function copyInto(target: Float64Array, column: Float64Array, rows: number): void {
  for (let t = 0; t < rows; t++) target[t] = column[t];
}
