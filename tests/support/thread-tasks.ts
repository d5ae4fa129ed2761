import { Refusal } from "../../server/engine/refusal.ts";
import { Cancelled } from "../../server/engine/run.ts";
import { task } from "../../server/engine/threads/map-in-order.ts";

/** Tasks for the tests of the threads; which thread runs them is not theirs to know. */

/** A sum whose last digits depend on the order of its terms. */
export const harmonic = task(import.meta.url, "harmonic", (scale: number, terms: number) => {
  let sum = 0;
  for (let k = 1; k <= terms; k++) sum += scale / k;
  return sum;
});

/** Marks its place in shared memory and returns nothing. */
export const mark = task(import.meta.url, "mark", (marks: Int32Array, place: number): void => {
  Atomics.add(marks, place, 1);
  let until = 0;
  for (let k = 0; k < 3e6; k++) until += k;
  if (until < 0) throw new Error("unreachable");
});

/** Counts the threads it was run on: each has a module of its own. */
let known = 0;
export const whoIsThere = task(import.meta.url, "whoIsThere", (tickets: Int32Array, _: number) => {
  known ||= Atomics.add(tickets, 0, 1) + 1;
  const until = performance.now() + 5;
  while (performance.now() < until);
  return known;
});

export const refuseFrom = task(import.meta.url, "refuseFrom", (from: number, item: number) => {
  if (item >= from) throw new Refusal([{ sentence: `Item ${item} is refused.`, key: ["items"] }]);
  return item;
});

export const fail = task(import.meta.url, "fail", (_: null, item: number) => {
  if (item === 3) throw new TypeError("three");
  return item;
});

/** Goes on until it is told to stop, and then says so where the test can see it. */
export const endless = task(import.meta.url, "endless", (flags: Int32Array, item: number, control) => {
  Atomics.add(flags, 0, 1);
  while (!control.cancelled()) if (performance.now() < 0) return item;
  Atomics.add(flags, 1, 1);
  throw new Cancelled("stopped");
});
