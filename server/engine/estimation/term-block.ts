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
  const shorter = shorterTerms(terms);

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
      const [left, right, ...more] = terms[term];
      if (more.length > 0) {
        multiplyInto(columns[term], columns[shorter[term]], whitened[more[more.length - 1] - 1], rows);
      } else if (right === 0) copyInto(columns[term], roots, rows);
      else if (left === 0) copyInto(columns[term], scaled[right - 1], rows);
      else multiplyInto(columns[term], whitened[left - 1], scaled[right - 1], rows);
    }
  }
  return { block, fill };
}

/** For each product of more than two columns, the place of the one without its last: formed before it. */
function shorterTerms(terms: readonly TermPair[]): number[] {
  const places = new Map(terms.map((term, at) => [term.join(), at]));
  return terms.map((term, at) => {
    if (term.length === 2) return -1;
    const place = places.get(term.slice(0, -1).join());
    if (place === undefined || place > at) throw new RangeError(`the product ${term} stands before its factors`);
    return place;
  });
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
  // Four columns at a time: the target is read and written a quarter as often.
  let i = 0;
  for (; i + 3 < place; i += 4) {
    const [f0, f1, f2, f3] = triangle.values.subarray(offset + i, offset + i + 4);
    if (f0 === 0 && f1 === 0 && f2 === 0 && f3 === 0) continue;
    const [c0, c1, c2, c3] = columns.slice(i, i + 4);
    for (let t = 0; t < rows; t++) target[t] -= f0 * c0[t] + f1 * c1[t] + f2 * c2[t] + f3 * c3[t];
  }
  for (; i < place; i++) {
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
