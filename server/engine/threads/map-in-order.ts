import { Cancelled, type RunControl, type Task } from "../run.ts";

/**
 * A function that other threads may run too. It stands at the top of its module, exported under `name`, and
 * depends on nothing but its arguments: what it returns is the same on whichever thread, and when done twice.
 *
 *     export const double = task(import.meta.url, "double", (factor: number, item: number) => factor * item);
 */
export function task<Shared, Item, Result>(
  module: string,
  name: string,
  run: (shared: Shared, item: Item, control: RunControl) => Result,
): Task<Shared, Item, Result> {
  return { module, name, run };
}

/**
 * The results of a task for every item, in the order of the items whatever the number of threads: the same to
 * the last bit, because each item is computed by itself and whoever asked puts the results together.
 *
 * `shared`, items and results are copied between threads as structured clones (typed arrays on shared memory
 * are not copied). `onDone` hears how many items are finished. Inside, `control` knows when to stop and has no
 * threads of its own.
 *
 * Errors: that of the first item, in their order, that failed; `Cancelled`.
 */
export function mapInOrder<Shared, Item, Result>(
  control: RunControl,
  work: Task<Shared, Item, Result>,
  shared: Shared,
  items: readonly Item[],
  onDone: (done: number) => void = () => {},
): Result[] {
  if (control.threads !== undefined && control.threads.count > 1 && items.length > 1) {
    return control.threads.map(work, shared, items, control, onDone);
  }
  const inside: RunControl = { progress() {}, cancelled: control.cancelled };
  return items.map((item, at) => {
    if (control.cancelled()) throw new Cancelled("cancelled");
    const result = work.run(shared, item, inside);
    onDone(at + 1);
    return result;
  });
}
