/** Typed arrays that double as they fill: the memory of a column is at most twice its numbers. */
const FIRST_CAPACITY = 256;

export class GrowingNumbers {
  private buffer = new Float64Array(FIRST_CAPACITY);
  private length = 0;

  push(value: number): void {
    if (this.length === this.buffer.length) {
      const grown = new Float64Array(2 * this.buffer.length);
      grown.set(this.buffer);
      this.buffer = grown;
    }
    this.buffer[this.length++] = value;
  }

  /** A copy of exactly the numbers pushed. */
  view(): Float64Array {
    return this.buffer.slice(0, this.length);
  }
}

export class GrowingCodes {
  private buffer = new Int32Array(FIRST_CAPACITY);
  private length = 0;

  push(value: number): void {
    if (this.length === this.buffer.length) {
      const grown = new Int32Array(2 * this.buffer.length);
      grown.set(this.buffer);
      this.buffer = grown;
    }
    this.buffer[this.length++] = value;
  }

  /** A copy of exactly the codes pushed. */
  view(): Int32Array {
    return this.buffer.slice(0, this.length);
  }
}
