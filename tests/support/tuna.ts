import { createReadStream } from "node:fs";
import { runData } from "../../server/engine/cells/index.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../server/engine/columns/read-csv.ts";
import type { CellKind, SpecificationOf } from "../../shared/schemas/cell.ts";
import { parseCell } from "../../shared/study/parse-cell.ts";

/** A source that must be sound, as its specification. */
export function specificationOf<K extends CellKind>(kind: K, source: string): SpecificationOf<K> {
  const { specification, problems } = parseCell(kind, source);
  if (specification?.kind !== kind) throw new Error(problems.map(({ sentence }) => sentence).join(" "));
  return specification as SpecificationOf<K>;
}

const GOODS = [1, 2, 3, 4, 5, 6, 7].map((i) => `  brand${i}: {price: p${i}, quantity: q${i}}`).join("\n");

/** The weekly tuna purchases as a data cell prepares them, with further keys of its source. */
export async function tunaWeeks(keys = "time: week"): Promise<PreparedData> {
  const file = new URL("../reference/fixtures/tuna-weekly.csv", import.meta.url);
  const { table } = await readCsv(createReadStream(file), "tuna-weekly.csv");
  return runData(specificationOf("data", `upload: tuna-weekly.csv\ngoods:\n${GOODS}\n${keys}\n`), table);
}
