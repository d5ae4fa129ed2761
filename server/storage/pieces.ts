/** The bytes of a stream in pieces of `size`, the last one shorter; holds one piece at a time. */
export async function* inPieces(source: AsyncIterable<Uint8Array>, size: number): AsyncGenerator<Buffer> {
  let piece = Buffer.allocUnsafe(size);
  let filled = 0;
  for await (const bytes of source) {
    let taken = 0;
    while (taken < bytes.length) {
      const part = bytes.subarray(taken, taken + size - filled);
      piece.set(part, filled);
      filled += part.length;
      taken += part.length;
      if (filled < size) continue;
      yield piece;
      piece = Buffer.allocUnsafe(size);
      filled = 0;
    }
  }
  if (filled > 0) yield piece.subarray(0, filled);
}
