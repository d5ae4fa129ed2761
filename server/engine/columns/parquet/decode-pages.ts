import type { DecodedArray, PageHeader } from "hyparquet";
import { parquetHeader } from "hyparquet/src/column.js";
import { DEFAULT_PARSERS } from "hyparquet/src/convert.js";
import { decompressPage, readDataPage, readDataPageV2 } from "hyparquet/src/datapage.js";
import { readRleBitPackedHybrid } from "hyparquet/src/encoding.js";
import { readPlain } from "hyparquet/src/plain.js";
import { compressors } from "hyparquet-compressors";
import { checkRuns } from "./check-runs.ts";
import { checkTexts } from "./check-texts.ts";
import type { ParquetColumn } from "./parquet-columns.ts";

type ColumnDecoder = Parameters<typeof readDataPageV2>[2];

/** Expanded; writers aim at one. */
const LARGEST_PAGE = 256 * 1024 ** 2;

/** Values of a page as they are stored; null for a missing one. */
export type PageValues = DecodedArray;

/**
 * The pages of one chunk of a column, one after the other. Every length a page declares is held against what there is
 * before memory is taken by it: bytes against the chunk, values against the rows still expected, runs against values.
 *
 * @throws Error where the bytes do not follow the format; the caller says where.
 */
export function* decodePages(
  bytes: Uint8Array<ArrayBuffer>,
  { element, path }: ParquetColumn,
  { rows, chunk }: ParquetColumn["chunks"][number],
): Generator<PageValues> {
  const decoder: ColumnDecoder = {
    pathInSchema: [element.name],
    type: element.type!,
    element,
    schemaPath: path,
    codec: chunk.codec,
    parsers: DEFAULT_PARSERS,
    compressors,
  };
  const reader = { view: new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength), offset: 0 };
  let dictionary: DecodedArray | undefined;
  let read = 0;
  while (read < rows) {
    const header = parquetHeader(reader);
    const size = header.compressed_page_size;
    if (!(size >= 0) || reader.offset + size > bytes.length) throw new Error("a page is longer than its column");
    if (!(header.uncompressed_page_size >= 0) || header.uncompressed_page_size > LARGEST_PAGE) {
      throw new Error(`a page would have ${header.uncompressed_page_size} bytes unpacked`);
    }
    // A copy ends where the page does, whatever lengths stand in it.
    const packed = bytes.slice(reader.offset, reader.offset + size);
    reader.offset += size;
    if (header.type === "DICTIONARY_PAGE") {
      dictionary = decodeDictionary(packed, header, decoder);
      continue;
    }
    const values = decodeDataPage(packed, header, rows - read, decoder, dictionary);
    read += values.length;
    yield values;
  }
}

function decodeDictionary(packed: Uint8Array, header: PageHeader, decoder: ColumnDecoder): DecodedArray {
  const count = header.dictionary_page_header?.num_values ?? -1;
  if (!(count >= 0) || count > header.uncompressed_page_size) throw new Error(`a dictionary declares ${count} values`);
  const page = decompressPage(packed, header.uncompressed_page_size, decoder.codec, decoder.compressors);
  const view = new DataView(page.buffer, page.byteOffset, page.byteLength);
  return readPlain({ view, offset: 0 }, decoder.type, count, decoder.element.type_length);
}

function decodeDataPage(
  packed: Uint8Array,
  header: PageHeader,
  expected: number,
  decoder: ColumnDecoder,
  dictionary: DecodedArray | undefined,
): DecodedArray {
  const optional = decoder.element.repetition_type !== "REQUIRED";
  if (header.type === "DATA_PAGE" && header.data_page_header) {
    const about = header.data_page_header;
    refuseCount(about.num_values, expected);
    const page = decompressPage(packed, header.uncompressed_page_size, decoder.codec, decoder.compressors);
    let levels = 0;
    let present = about.num_values;
    if (optional) {
      if (about.definition_level_encoding !== "RLE") throw new Error("missing values are marked in an outdated way");
      levels = 4 + lengthAt(page, 0);
      checkRuns(page.subarray(4, levels), 1, about.num_values);
      present = countPresent(page.subarray(4, levels), about.num_values);
    }
    checkValues(page.subarray(levels), about.encoding, decoder.type, present);
    const { definitionLevels, dataPage } = readDataPage(page, about, decoder);
    return inPlace(lookUp(dataPage, about.encoding, dictionary), definitionLevels, about.num_values);
  }
  const about = header.data_page_header_v2;
  if (header.type !== "DATA_PAGE_V2" || !about)
    throw new Error(`a page of the kind ${header.type} stands among the data`);
  const { num_values, num_nulls, definition_levels_byte_length, repetition_levels_byte_length } = about;
  refuseCount(num_values, expected);
  const levels = definition_levels_byte_length + repetition_levels_byte_length;
  if (
    repetition_levels_byte_length !== 0 ||
    !(levels >= 0) ||
    levels > packed.length ||
    !(num_nulls >= 0 && num_nulls <= num_values)
  ) {
    throw new Error("the head of a page contradicts itself");
  }
  if (optional) checkRuns(packed.subarray(0, levels), 1, num_values);
  const size = header.uncompressed_page_size - levels;
  const rest = packed.subarray(levels);
  const values = about.is_compressed ? decompressPage(rest, size, decoder.codec, decoder.compressors) : rest;
  checkValues(values, about.encoding, decoder.type, num_values - num_nulls);
  const page = new Uint8Array(levels + values.length);
  page.set(packed.subarray(0, levels));
  page.set(values, levels);
  const unpacked = { ...header, data_page_header_v2: { ...about, is_compressed: false } };
  const { definitionLevels, dataPage } = readDataPageV2(page, unpacked, decoder);
  return inPlace(lookUp(dataPage, about.encoding, dictionary), definitionLevels, num_values);
}

function refuseCount(count: number, expected: number): void {
  if (!(count >= 0) || count > expected) {
    throw new Error(`a page declares ${count} values where ${expected} are left`);
  }
}

/** How many of so many values are not missing, by the levels before them. */
function countPresent(levels: Uint8Array, values: number): number {
  const read = new Array<number>(values);
  const view = new DataView(levels.buffer, levels.byteOffset, levels.byteLength);
  readRleBitPackedHybrid({ view, offset: 0 }, 1, read, levels.length);
  return read.reduce((count, level) => count + (level === 1 ? 1 : 0), 0);
}

function checkValues(bytes: Uint8Array, encoding: string, type: string, count: number): void {
  if (encoding === "RLE_DICTIONARY" || encoding === "PLAIN_DICTIONARY") {
    if (bytes.length > 0) checkRuns(bytes.subarray(1), bytes[0], count);
  } else if (encoding === "RLE") {
    if (type !== "BOOLEAN") throw new Error("values are written by an encoding of truth values");
    checkRuns(bytes.subarray(4, 4 + lengthAt(bytes, 0)), 1, count);
  } else if (encoding === "DELTA_BYTE_ARRAY") {
    checkTexts(bytes, count, LARGEST_PAGE);
  }
}

function lengthAt(bytes: Uint8Array, at: number): number {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength).getUint32(at, true);
}

function lookUp(values: DecodedArray, encoding: string, dictionary: DecodedArray | undefined): DecodedArray {
  if (!encoding.endsWith("_DICTIONARY")) return values;
  if (dictionary === undefined) throw new Error("a page looks values up in a dictionary that is not there");
  const found = new Array(values.length);
  for (let place = 0; place < found.length; place++) {
    const at = Number(values[place]);
    if (!(at < dictionary.length)) {
      throw new Error(`a page looks up value ${at} of a dictionary of ${dictionary.length}`);
    }
    found[place] = dictionary[at];
  }
  return found;
}

/** Values with null where none is. */
function inPlace(values: DecodedArray, levels: readonly number[] | undefined, count: number): DecodedArray {
  if (values.length === count) return values;
  if (levels === undefined || levels.length !== count) {
    throw new Error(`a page has ${values.length} values and declares ${count}`);
  }
  let next = 0;
  return levels.map((level) => (level === 1 ? values[next++] : null));
}
