import { deltaBinaryUnpack } from "hyparquet/src/delta.js";

/**
 * Holds the lengths of texts that take up a part of the one before (DELTA_BYTE_ARRAY) against what is there, before a
 * text is put together: a few bytes may stand for any number of them.
 *
 * @param bytes The values of a page: how much of the text before each takes up, how long its own part is, those parts.
 * @param count How many texts the page has, missing ones left out.
 * @param most Bytes that all of them may have when put together.
 * @throws Error where a text takes up more than the one before has, a part ends after the page, or all are too long.
 */
export function checkTexts(bytes: Uint8Array, count: number, most: number): void {
  const reader = { view: new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength), offset: 0 };
  const taken = new Int32Array(count);
  const own = new Int32Array(count);
  deltaBinaryUnpack(reader, count, taken);
  deltaBinaryUnpack(reader, count, own);
  let left = bytes.length - reader.offset;
  let before = 0;
  let together = 0;
  for (let place = 0; place < count; place++) {
    if (taken[place] < 0 || taken[place] > before) {
      throw new Error(`a text takes up ${taken[place]} bytes of one that has ${before}`);
    }
    if (own[place] < 0 || own[place] > left)
      throw new Error(`a text of ${own[place]} bytes stands where ${left} are left`);
    left -= own[place];
    before = taken[place] + own[place];
    together += before;
    if (together > most) throw new Error(`the texts of a page would have more than ${most} bytes`);
  }
}
