import { createInflateRaw } from "node:zlib";
import { printCount } from "../../../../shared/tables/numbers.ts";
import { Refusal } from "../../refusal.ts";
import type { FileBytes } from "../file-bytes.ts";

/** A workbook has some dozens of parts. */
const MOST_ENTRIES = 10_000;
const LARGEST_DIRECTORY = 4 * 1024 ** 2;
/** Unpacked, the parts that are read together. */
const MOST_EXPANDED = 1024 ** 3;
/** The cells of a sheet repeat the same few signs; even so they pack to no less than a hundredth. */
const DENSEST = 200;
/** A part smaller than this may be packed as densely as it likes. */
const LITTLE = 16 * 1024 ** 2;

const END_OF_DIRECTORY = 0x06054b50;
const ENTRY = 0x02014b50;
const LOCAL = 0x04034b50;
const END_SIZE = 22;
const LONGEST_COMMENT = 0xffff;
const PIECE = 256 * 1024;
const STORED = 0;
const DEFLATED = 8;

interface ZipEntry {
  readonly method: number;
  readonly packed: number;
  readonly unpacked: number;
  readonly at: number;
}

/**
 * The parts of a zip archive by their names. Sizes are checked where they are declared and again while a part is
 * unpacked, as what is declared need not be true; no part is ever held whole.
 */
export class ZipEntries {
  private readonly file: FileBytes;
  private readonly entries: ReadonlyMap<string, ZipEntry>;
  /** What the archive is, as its refusals say it. */
  private readonly what: string;
  private expanded = 0;

  constructor(file: FileBytes, what = "workbook") {
    this.file = file;
    this.what = what;
    this.entries = readDirectory(file, what);
  }

  has(name: string): boolean {
    return this.entries.has(name);
  }

  names(): string[] {
    return [...this.entries.keys()];
  }

  /** The bytes of a part, unpacked, as they come. */
  async *read(name: string): AsyncGenerator<Uint8Array> {
    const entry = this.entries.get(name);
    if (entry === undefined) throw new Refusal(`The ${this.what} lacks its part ${name}.`);
    if (entry.unpacked > MOST_EXPANDED) throw tooLarge(this.what, name, entry.unpacked);
    refuseDensity(this.what, name, entry.packed, entry.unpacked);
    const from = this.startOf(name, entry);
    let unpacked = 0;
    for await (const piece of entry.method === STORED
      ? this.pieces(from, entry.packed)
      : this.inflated(from, entry, name)) {
      unpacked += piece.length;
      this.expanded += piece.length;
      if (this.expanded > MOST_EXPANDED) throw tooLarge(this.what, name, this.expanded);
      refuseDensity(this.what, name, entry.packed, unpacked);
      yield piece;
    }
  }

  private startOf(name: string, { at, packed }: ZipEntry): number {
    const head = at + 30 <= this.file.size ? viewOf(this.file.slice(at, at + 30)) : undefined;
    if (head?.getUint32(0, true) !== LOCAL)
      throw new Refusal(`The part ${name} is not where the ${this.what} says it is.`);
    const from = at + 30 + head.getUint16(26, true) + head.getUint16(28, true);
    if (from + packed > this.file.size) {
      throw new Refusal(
        `The part ${name} would end at byte ${printCount(from + packed)} of a file of ${printCount(this.file.size)}.`,
      );
    }
    return from;
  }

  private *pieces(from: number, length: number): Generator<Uint8Array> {
    for (let at = 0; at < length; at += PIECE) yield this.file.slice(from + at, from + Math.min(length, at + PIECE));
  }

  private async *inflated(from: number, { packed }: ZipEntry, name: string): AsyncGenerator<Uint8Array> {
    const inflate = createInflateRaw();
    const pieces = this.pieces(from, packed);
    const feed = () => {
      for (let next = pieces.next(); ; next = pieces.next()) {
        if (next.done) return void inflate.end();
        if (!inflate.write(next.value)) return void inflate.once("drain", feed);
      }
    };
    feed();
    try {
      for await (const piece of inflate) yield piece as Uint8Array;
    } catch (error) {
      if (error instanceof Refusal) throw error;
      throw new Refusal(`The part ${name} of the ${this.what} cannot be unpacked: ${(error as Error).message}.`);
    } finally {
      inflate.destroy();
    }
  }
}

function tooLarge(what: string, name: string, bytes: number): Refusal {
  return new Refusal(
    `Unpacked, the ${what}'s part ${name} would go to ${printCount(bytes)} bytes; at most ${printCount(MOST_EXPANDED)} are read.`,
  );
}

function refuseDensity(what: string, name: string, packed: number, unpacked: number): void {
  if (unpacked <= LITTLE || unpacked <= DENSEST * packed) return;
  throw new Refusal(
    `The ${what}'s part ${name} unpacks from ${printCount(packed)} bytes to more than ${DENSEST} times as many; no ${what} does. It is not read.`,
  );
}

const viewOf = (bytes: Uint8Array) => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);

function readDirectory(file: FileBytes, what: string): Map<string, ZipEntry> {
  const tailFrom = Math.max(0, file.size - END_SIZE - LONGEST_COMMENT);
  const tail = viewOf(file.slice(tailFrom, file.size));
  let end = tail.byteLength - END_SIZE;
  while (end >= 0 && tail.getUint32(end, true) !== END_OF_DIRECTORY) end--;
  if (end < 0)
    throw new Refusal(`The ${what} is cut short: the list of its parts, at the end of the file, is not there.`);
  const count = tail.getUint16(end + 10, true);
  const size = tail.getUint32(end + 12, true);
  const at = tail.getUint32(end + 16, true);
  if (count > MOST_ENTRIES || size > LARGEST_DIRECTORY || at + size > file.size) {
    throw new Refusal(
      `The ${what} would have ${printCount(count)} parts listed in ${printCount(size)} bytes; at most ${printCount(MOST_ENTRIES)} parts are read.`,
    );
  }
  return entriesOf(file.slice(at, at + size), count, what);
}

function entriesOf(bytes: Uint8Array, count: number, what: string): Map<string, ZipEntry> {
  const view = viewOf(bytes);
  const entries = new Map<string, ZipEntry>();
  let at = 0;
  for (let number = 0; number < count; number++) {
    if (at + 46 > bytes.length || view.getUint32(at, true) !== ENTRY) {
      throw new Refusal(`The ${what} lists ${count} parts, and part ${number + 1} of its list cannot be read.`);
    }
    const [nameLength, extraLength, commentLength] = [28, 30, 32].map((place) => view.getUint16(at + place, true));
    const name = new TextDecoder().decode(bytes.subarray(at + 46, at + 46 + nameLength));
    const method = view.getUint16(at + 10, true);
    if ((view.getUint16(at + 8, true) & 1) !== 0) throw new Refusal(`The part ${name} of the ${what} is encrypted.`);
    if (method !== STORED && method !== DEFLATED) {
      throw new Refusal(`The part ${name} of the ${what} is packed by a method, ${method}, that no ${what} uses.`);
    }
    const extra = at + 46 + nameLength;
    entries.set(name, {
      method,
      ...sizesOf(view, at, extra, Math.min(extra + extraLength, bytes.length)),
    });
    at = extra + extraLength + commentLength;
  }
  return entries;
}

/** Sizes and place of an entry: where four bytes are all ones, the eight of the extra field 1 hold them, in this order. */
function sizesOf(view: DataView, entry: number, from: number, to: number): Omit<ZipEntry, "method"> {
  const short = {
    unpacked: view.getUint32(entry + 24, true),
    packed: view.getUint32(entry + 20, true),
    at: view.getUint32(entry + 42, true),
  };
  let field = from;
  while (field + 4 <= to && view.getUint16(field, true) !== 1) field += 4 + view.getUint16(field + 2, true);
  let place = field + 4;
  const long = (value: number) => {
    if (value !== 0xffff_ffff || place + 8 > to) return value;
    place += 8;
    return Number(view.getBigUint64(place - 8, true));
  };
  return { unpacked: long(short.unpacked), packed: long(short.packed), at: long(short.at) };
}
