/** Nodes and weights of Dormand and Prince's pair of orders 5 and 4; the last stage is the first of the next step. */
const NODES = [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1];
const STAGES: readonly (readonly number[])[] = [
  [],
  [1 / 5],
  [3 / 40, 9 / 40],
  [44 / 45, -56 / 15, 32 / 9],
  [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
  [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
  [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
];
/** Fifth order less fourth: what a step is wrong by. */
const ERRORS = [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40];

const MOST_STEPS = 100_000;

/**
 * y(1) of dy/ds = slope(s, y), y(0) = `start`, by Runge and Kutta's method with steps as long as an error of `tolerance`,
 * relative to |y|, allows. Dormand & Prince (1980, Journal of Computational and Applied Mathematics 6, 19–26).
 * Errors: `RangeError` where the slope is no number, or steps become too many.
 */
export function integrateSlope(slope: (s: number, y: number) => number, start: number, tolerance = 1e-12): number {
  let s = 0;
  let y = start;
  let step = 0.1;
  for (let count = 0; count < MOST_STEPS && s < 1; count++) {
    const size = Math.min(step, 1 - s);
    const { next, error } = stepped(slope, s, y, size);
    const allowed = tolerance * Math.max(Math.abs(y), Math.abs(next), Number.MIN_VALUE);
    if (!Number.isFinite(next)) throw new RangeError(`the slope is not a number at ${s} of the way`);
    if (error <= allowed) {
      s = size === 1 - s ? 1 : s + size;
      y = next;
    }
    step = size * Math.min(4, Math.max(0.2, 0.9 * (allowed / Math.max(error, Number.MIN_VALUE)) ** 0.2));
  }
  if (s < 1) throw new RangeError(`after ${MOST_STEPS} steps the integration has come ${s} of the way`);
  return y;
}

function stepped(slope: (s: number, y: number) => number, s: number, y: number, size: number) {
  const slopes: number[] = [];
  let next = y;
  for (let stage = 0; stage < NODES.length; stage++) {
    next = y + size * STAGES[stage].reduce((sum, weight, at) => sum + weight * slopes[at], 0);
    slopes.push(slope(s + NODES[stage] * size, next));
  }
  const error = Math.abs(size * ERRORS.reduce((sum, weight, at) => sum + weight * slopes[at], 0));
  // The last stage stands at the fifth-order solution.
  return { next, error };
}
