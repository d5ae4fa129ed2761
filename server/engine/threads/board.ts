/** Where the next item, the wish to stop and the count of finished items stand; then a state for every item. */
const NEXT = 0;
const STOPPED = 1;
const FINISHED = 2;
const STATES = 3;

/**
 * What the threads of one run share: which item comes next, which are finished, and whether to stop. Items are
 * claimed in their order, so that all before a claimed one are claimed too.
 */
export class Board {
  readonly buffer: SharedArrayBuffer;
  readonly #cells: Int32Array;
  readonly #items: number;

  constructor(from: number | SharedArrayBuffer) {
    this.buffer =
      typeof from === "number" ? new SharedArrayBuffer((STATES + from) * Int32Array.BYTES_PER_ELEMENT) : from;
    this.#cells = new Int32Array(this.buffer);
    this.#items = this.#cells.length - STATES;
  }

  /** The next item that nobody has; undefined when there is none, or nothing more is wanted. */
  claim(): number | undefined {
    if (this.stopped() || Atomics.load(this.#cells, NEXT) >= this.#items) return undefined;
    const item = Atomics.add(this.#cells, NEXT, 1);
    return item < this.#items ? item : undefined;
  }

  /** Lets nothing more be claimed; what is claimed goes on. */
  close(): void {
    Atomics.store(this.#cells, NEXT, this.#items);
  }

  /** Asks whoever still works for this run to leave off. */
  stop(): void {
    Atomics.store(this.#cells, STOPPED, 1);
  }

  stopped(): boolean {
    return Atomics.load(this.#cells, STOPPED) !== 0;
  }

  finish(item: number): void {
    if (Atomics.compareExchange(this.#cells, STATES + item, 0, 1) !== 0) return;
    Atomics.add(this.#cells, FINISHED, 1);
    Atomics.notify(this.#cells, FINISHED);
  }

  finished(): number {
    return Atomics.load(this.#cells, FINISHED);
  }

  /** The first item before `end` that is not finished. */
  firstUnfinished(end: number): number | undefined {
    for (let item = 0; item < end; item++) if (Atomics.load(this.#cells, STATES + item) === 0) return item;
    return undefined;
  }

  /** Waits until the count of finished items is no longer `seen`, or so many milliseconds are over. */
  waitBeyond(seen: number, milliseconds: number): void {
    Atomics.wait(this.#cells, FINISHED, seen, milliseconds);
  }
}
