import type { TableColumn } from "./prepared-data.ts";

export interface Clusters {
  readonly codes: Int32Array;
  readonly labels: readonly string[];
}

/** Clusters of the rows used, numbered in the order in which they first occur. */
export function clustersOf(column: TableColumn, rowIndices: Int32Array): Clusters {
  const codeOf = new Map<number, number>();
  const labels: string[] = [];
  const labelOf = (id: number) => (column.type === "number" ? String(id) : column.levels[id]);
  const ids = column.type === "number" ? column.values : column.codes;
  const codes = new Int32Array(rowIndices.length);
  for (let at = 0; at < rowIndices.length; at++) {
    const id = ids[rowIndices[at]];
    let code = codeOf.get(id);
    if (code === undefined) {
      code = labels.length;
      codeOf.set(id, code);
      labels.push(labelOf(id));
    }
    codes[at] = code;
  }
  return { codes, labels };
}

/** Rows sorted by cluster: those of cluster c stand from `starts[c]` to before `starts[c + 1]`. */
export interface ClusterGroups {
  readonly order: Int32Array;
  readonly starts: Int32Array;
}

export function groupByCluster({ codes, labels }: Clusters): ClusterGroups {
  const starts = new Int32Array(labels.length + 1);
  for (const code of codes) starts[code + 1]++;
  for (let cluster = 0; cluster < labels.length; cluster++) starts[cluster + 1] += starts[cluster];
  const next = starts.slice();
  const order = new Int32Array(codes.length);
  for (let row = 0; row < codes.length; row++) order[next[codes[row]]++] = row;
  return { order, starts };
}
