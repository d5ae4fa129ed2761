import type { Columns } from "./expressions.ts";
import type { LabelledColumn, TableColumn } from "./prepared-data.ts";

/** Most labels that codes of two bytes can tell apart beside an empty cell. */
const TWO_BYTES = 65_535;

/**
 * The columns of text of the rows used, as codes and labels: what rows can be grouped by. A text that is nearly
 * the row's own (more different labels than half the rows) groups nothing and is not kept, only counted, unless
 * it is the cluster.
 */
export function labelledColumns(
  columns: Columns,
  cluster: string | undefined,
  rowIndices: Int32Array,
): { labelled: Map<string, LabelledColumn>; nearlyUnique: Map<string, number> } {
  const labelled = new Map<string, LabelledColumn>();
  const nearlyUnique = new Map<string, number>();
  for (const [name, column] of columns) {
    if (column.type !== "text") continue;
    const kept = labelsUsed(column, rowIndices);
    if (name !== cluster && kept.labels.length > rowIndices.length / 2) nearlyUnique.set(name, kept.labels.length);
    else labelled.set(name, kept);
  }
  return { labelled, nearlyUnique };
}

/** Labels that occur in the rows used, in the order of their code units, so that no order of rows changes a code. */
function labelsUsed({ codes, levels }: TableColumn & { type: "text" }, rowIndices: Int32Array): LabelledColumn {
  const occurs = new Uint8Array(levels.length);
  let missing = 0;
  let firstRow = 0;
  for (const row of rowIndices) {
    if (codes[row] >= 0) occurs[codes[row]] = 1;
    else if (missing++ === 0) firstRow = row + 1;
  }
  const used = Array.from(levels.keys()).filter((level) => occurs[level] === 1);
  used.sort((one, two) => (levels[one] < levels[two] ? -1 : 1));
  const codeOf = new Int32Array(levels.length);
  used.forEach((level, code) => {
    codeOf[level] = code;
  });
  const empty = used.length;
  const recoded = used.length < TWO_BYTES ? new Uint16Array(rowIndices.length) : new Int32Array(rowIndices.length);
  for (let at = 0; at < rowIndices.length; at++) {
    const level = codes[rowIndices[at]];
    recoded[at] = level < 0 ? empty : codeOf[level];
  }
  return {
    codes: recoded,
    labels: used.map((level) => levels[level]),
    ...(missing > 0 && { missing: { missing, firstRow } }),
  };
}
