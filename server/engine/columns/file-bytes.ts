/** A file as an upload keeps it: any part of it at once, or from beginning to end in pieces. */
export interface FileBytes {
  readonly size: number;
  /** The bytes from `from` to before `to`, in memory of their own. */
  slice(from: number, to: number): Uint8Array<ArrayBuffer>;
  pieces(): AsyncIterable<Uint8Array>;
}

/** A file that is held whole. */
export function bytesInMemory(bytes: Uint8Array): FileBytes {
  return {
    size: bytes.length,
    slice: (from, to) => new Uint8Array(bytes.subarray(from, to)),
    async *pieces() {
      yield bytes;
    },
  };
}
