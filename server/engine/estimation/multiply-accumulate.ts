import { TILE, type TilePlan } from "./tile-plan.ts";

/**
 * Adds to `sums` every product the plan asks for, over one block of rows. Column c of the block is
 * `block[c·stride … c·stride + rows)`. Sixteen sums at a time stay in registers: this loop is where
 * the time of an estimation goes.
 */
export function multiplyAccumulate(
  block: Float64Array,
  stride: number,
  rows: number,
  plan: TilePlan,
  sums: Float64Array,
): void {
  const { left, right, tiles } = plan;
  for (let tile = 0; tile < tiles; tile++) {
    const at = tile * TILE;
    tileOfFour(
      block,
      rows,
      left[at] * stride,
      left[at + 1] * stride,
      left[at + 2] * stride,
      left[at + 3] * stride,
      right[at] * stride,
      right[at + 1] * stride,
      right[at + 2] * stride,
      right[at + 3] * stride,
      sums,
      at * TILE,
    );
  }
}

function tileOfFour(
  block: Float64Array,
  rows: number,
  a0: number,
  a1: number,
  a2: number,
  a3: number,
  b0: number,
  b1: number,
  b2: number,
  b3: number,
  sums: Float64Array,
  at: number,
): void {
  let s00 = 0;
  let s01 = 0;
  let s02 = 0;
  let s03 = 0;
  let s10 = 0;
  let s11 = 0;
  let s12 = 0;
  let s13 = 0;
  let s20 = 0;
  let s21 = 0;
  let s22 = 0;
  let s23 = 0;
  let s30 = 0;
  let s31 = 0;
  let s32 = 0;
  let s33 = 0;
  for (let t = 0; t < rows; t++) {
    const y0 = block[b0 + t];
    const y1 = block[b1 + t];
    const y2 = block[b2 + t];
    const y3 = block[b3 + t];
    let x = block[a0 + t];
    s00 += x * y0;
    s01 += x * y1;
    s02 += x * y2;
    s03 += x * y3;
    x = block[a1 + t];
    s10 += x * y0;
    s11 += x * y1;
    s12 += x * y2;
    s13 += x * y3;
    x = block[a2 + t];
    s20 += x * y0;
    s21 += x * y1;
    s22 += x * y2;
    s23 += x * y3;
    x = block[a3 + t];
    s30 += x * y0;
    s31 += x * y1;
    s32 += x * y2;
    s33 += x * y3;
  }
  sums[at] += s00;
  sums[at + 1] += s01;
  sums[at + 2] += s02;
  sums[at + 3] += s03;
  sums[at + 4] += s10;
  sums[at + 5] += s11;
  sums[at + 6] += s12;
  sums[at + 7] += s13;
  sums[at + 8] += s20;
  sums[at + 9] += s21;
  sums[at + 10] += s22;
  sums[at + 11] += s23;
  sums[at + 12] += s30;
  sums[at + 13] += s31;
  sums[at + 14] += s32;
  sums[at + 15] += s33;
}
