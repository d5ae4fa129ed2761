import { printCount } from "../../../shared/tables/numbers.ts";
import { Refusal } from "../refusal.ts";
import { HeaderScan } from "./separator.ts";

/** Bytes within which the header must end. */
const LONGEST_HEADER = 1024 * 1024;

const BYTE_ORDER_MARK = [0xef, 0xbb, 0xbf];

/** How files that are often taken for a CSV begin. */
const OTHER_FORMATS: readonly { readonly bytes: readonly number[]; readonly advice: string }[] = [
  { bytes: [0xff, 0xfe], advice: "it is text in UTF-16; save it in UTF-8" },
  { bytes: [0xfe, 0xff], advice: "it is text in UTF-16; save it in UTF-8" },
  {
    bytes: [0x50, 0x4b, 0x03, 0x04],
    advice: "it is a workbook or another zip archive; save the sheet as CSV in UTF-8",
  },
  { bytes: [0x1f, 0x8b], advice: "it is compressed with gzip; unpack it first" },
  { bytes: [0x50, 0x41, 0x52, 0x31], advice: "it is a Parquet file; write it out as CSV" },
  { bytes: [0x25, 0x50, 0x44, 0x46], advice: "it is a PDF; a table is needed" },
];

const beginsWith = (bytes: Uint8Array, start: readonly number[]) => start.every((byte, at) => bytes[at] === byte);

function refuseOtherFormats(bytes: Uint8Array, headerEnd: number): void {
  if (bytes.length === 0) throw new Refusal("The file is empty: it has 0 bytes.");
  const other = OTHER_FORMATS.find((format) => beginsWith(bytes, format.bytes));
  if (other) throw new Refusal(`The file is not a CSV: ${other.advice}.`);
  const nul = bytes.indexOf(0);
  if (nul >= 0 && nul < headerEnd) {
    throw new Refusal(`The file is not a CSV: byte ${nul + 1} of it is NUL, which no text has.`);
  }
}

/**
 * The pieces of a file on their way to the parser: counted against the limit, told to a hash, looked through for
 * bytes that are no UTF-8. The head is read ahead, without the byte order mark, and handed on with the rest.
 */
export class FilePieces implements AsyncIterable<Uint8Array> {
  /** Bytes that have arrived, the byte order mark included. */
  received = 0;
  /** Bytes that are no UTF-8 text, or a NUL, have arrived: the cell that holds them is to be found. */
  suspect = false;
  private readonly rest: AsyncIterator<Uint8Array>;
  private readonly limit: number;
  private readonly tell: (bytes: Uint8Array) => void;
  private readonly decoder = new TextDecoder("utf-8", { fatal: true });
  private ahead: Uint8Array = new Uint8Array();

  constructor(source: AsyncIterable<Uint8Array>, limit: number, tell: (bytes: Uint8Array) => void) {
    this.rest = source[Symbol.asyncIterator]();
    this.limit = limit;
    this.tell = tell;
  }

  /** Read ahead to the end of the header, without byte order mark and line end. */
  async header(): Promise<Uint8Array> {
    const scan = new HeaderScan();
    const pieces: Uint8Array[] = [];
    while (scan.end < 0 && this.received < LONGEST_HEADER) {
      const piece = await this.next();
      if (piece === null) break;
      pieces.push(piece);
      scan.feed(piece);
    }
    const bytes = Buffer.concat(pieces);
    refuseOtherFormats(bytes, scan.end < 0 ? bytes.length : scan.end);
    if (scan.end < 0 && bytes.length >= LONGEST_HEADER) {
      throw new Refusal(
        `The file is not a CSV: its header has not ended after ${printCount(bytes.length)} bytes; the limit is ${printCount(LONGEST_HEADER)}.`,
      );
    }
    const from = beginsWith(bytes, BYTE_ORDER_MARK) ? BYTE_ORDER_MARK.length : 0;
    this.ahead = bytes.subarray(from);
    return bytes.subarray(from, scan.end < 0 ? bytes.length : scan.end);
  }

  async *[Symbol.asyncIterator](): AsyncGenerator<Uint8Array> {
    yield this.ahead;
    for (let piece = await this.next(); piece !== null; piece = await this.next()) yield piece;
  }

  /** Let the source go, read to its end or not. */
  async close(): Promise<void> {
    await this.rest.return?.();
  }

  private async next(): Promise<Uint8Array | null> {
    const { done, value } = await this.rest.next();
    if (done) {
      // A character cut off by the end of the file shows only now.
      this.look(new Uint8Array(), false);
      return null;
    }
    this.received += value.length;
    if (this.received > this.limit) {
      throw new Refusal(
        `The file is larger than the limit of ${printCount(this.limit)} bytes: ${printCount(this.received)} had arrived when reading stopped.`,
      );
    }
    this.tell(value);
    this.look(value, true);
    return value;
  }

  private look(bytes: Uint8Array, more: boolean): void {
    if (this.suspect) return;
    try {
      this.decoder.decode(bytes, { stream: more });
    } catch {
      this.suspect = true;
    }
    if (bytes.includes(0)) this.suspect = true;
  }
}
