import { createHash } from "node:crypto";
import { endianness } from "node:os";
import type { PreparedData } from "./prepared-data.ts";

type Fingerprinted = Omit<
  PreparedData,
  "fingerprint" | "finding" | "rowNumbers" | "incomplete" | "nearlyUnique" | "priceScale" | "totalScale"
>;

/**
 * SHA-256 of the columns an estimation may use, in the order: goods with their shares and log prices, log total,
 * weights, cluster of each row, time, numeric columns by name, columns of text by name with their labels. Rows as used;
 * Float64 and Int32 little-endian, each column after its name and length. The file's name, the rows left out, and columns
 * that lack a value in some row used do not enter.
 */
export function dataFingerprint(data: Fingerprinted): string {
  const hash = createHash("sha256");
  const add = (name: string, column: Float64Array | Int32Array) => {
    hash.update(`${JSON.stringify(name)} ${column.length}\n`);
    hash.update(littleEndian(column));
  };
  data.goods.forEach((good, at) => {
    add(`share of ${good}`, data.shares[at]);
    add(`log price of ${good}`, data.logPrices[at]);
  });
  add("log total", data.logTotal);
  if (data.weights) add("weight", data.weights);
  if (data.clusters) {
    hash.update(JSON.stringify(data.clusters.labels));
    add("cluster", data.clusters.codes);
  }
  if (data.time) add("time", data.time);
  for (const name of [...data.numeric.keys()].sort()) add(`column ${name}`, data.numeric.get(name)!);
  for (const [name, column] of [...(data.labelled ?? [])].sort(([one], [two]) => (one < two ? -1 : 1))) {
    if (column.missing !== undefined) continue;
    hash.update(JSON.stringify(column.labels));
    add(`text ${name}`, Int32Array.from(column.codes));
  }
  return hash.digest("hex");
}

function littleEndian(column: Float64Array | Int32Array): Buffer {
  const bytes = Buffer.from(column.buffer, column.byteOffset, column.byteLength);
  if (endianness() === "LE") return bytes;
  const copy = Buffer.from(bytes);
  return column.BYTES_PER_ELEMENT === 8 ? copy.swap64() : copy.swap32();
}
