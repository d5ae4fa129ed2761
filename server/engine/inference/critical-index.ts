import { Cancelled, type RunControl } from "../run.ts";
import type { PreferenceClasses } from "./preference-graph.ts";

/**
 * Afriat's critical cost efficiency index: the supremum of e such that no violation remains when i R j means
 * e·C_ii ≥ C_ij. A cycle of rows is broken by every e below the largest ratio C_ij/C_ii along it, so the index is
 * the smallest, over cycles, of that largest ratio: found exactly, by bisection over the finitely many ratios.
 */
export function criticalIndex(
  ratios: Float64Array,
  rows: number,
  classes: PreferenceClasses,
  control: RunControl,
): number {
  const candidates = ratiosWithin(ratios, rows, classes);
  let [low, high] = [0, candidates.length - 1];
  while (low < high) {
    if (control.cancelled()) throw new Cancelled("cancelled while looking for the efficiency index");
    control.progress({ step: "looking for the efficiency index" });
    const middle = (low + high) >>> 1;
    if (hasCycle(ratios, rows, classes, candidates[middle])) high = middle;
    else low = middle + 1;
  }
  return Math.min(1, candidates[low]);
}

/** Ratios that can be the largest of a cycle: between different rows of one class; ascending. */
function ratiosWithin(ratios: Float64Array, rows: number, { classOf, sizes }: PreferenceClasses): Float64Array {
  const found = new Float64Array(sizes.reduce((sum, size) => sum + size * (size - 1), 0));
  let count = 0;
  for (let i = 0; i < rows; i++) {
    if (sizes[classOf[i]] === 1) continue;
    for (let j = 0; j < rows; j++) {
      if (i !== j && classOf[i] === classOf[j]) found[count++] = ratios[i * rows + j];
    }
  }
  return found.sort();
}

/** Whether some cycle of rows has no ratio above `most`: a walk that meets a row it is still under way from. */
function hasCycle(ratios: Float64Array, rows: number, { classOf, sizes }: PreferenceClasses, most: number): boolean {
  const UNDER_WAY = 1;
  const DONE = 2;
  const state = new Uint8Array(rows);
  const next = new Int32Array(rows);
  for (let root = 0; root < rows; root++) {
    if (state[root] !== 0 || sizes[classOf[root]] === 1) continue;
    const path = [root];
    state[root] = UNDER_WAY;
    while (path.length > 0) {
      const row = path[path.length - 1];
      const to = next[row]++;
      if (to >= rows) {
        state[row] = DONE;
        path.pop();
      } else if (to !== row && classOf[to] === classOf[row] && ratios[row * rows + to] <= most) {
        if (state[to] === UNDER_WAY) return true;
        if (state[to] === DONE) continue;
        state[to] = UNDER_WAY;
        path.push(to);
      }
    }
  }
  return false;
}
