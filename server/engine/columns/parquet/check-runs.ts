/**
 * Walks the runs of the run-length and bit-packed encoding without writing a value: a run of four bytes may declare a
 * thousand million, and the decoder would believe it. At most seven values over are filled up in a packed run.
 *
 * @throws Error where the runs have more values than `most`, or end within one.
 */
export function checkRuns(bytes: Uint8Array, width: number, most: number): void {
  if (width > 32) throw new Error(`values are ${width} bits wide`);
  let at = 0;
  let seen = 0;
  while (seen < most && at < bytes.length) {
    let header = 0;
    for (let shift = 0; ; shift += 7) {
      if (at >= bytes.length || shift > 28) throw new Error("a run has no end");
      const byte = bytes[at++];
      header += (byte & 0x7f) * 2 ** shift;
      if (byte < 0x80) break;
    }
    const packed = header % 2 === 1;
    const count = Math.floor(header / 2) * (packed ? 8 : 1);
    at += packed ? Math.floor(header / 2) * width : Math.ceil(width / 8);
    seen += count;
    if (seen > most + (packed ? 7 : 0)) throw new Error(`runs of ${seen} values stand where ${most} are left`);
  }
}
