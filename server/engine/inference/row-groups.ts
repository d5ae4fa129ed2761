import type { ClustersFinding } from "../../../shared/schemas/standard-errors.ts";
import { type Groups, groupsOf } from "../columns/groups.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { MomentSource } from "../estimation/moment-source.ts";
import { Refusal } from "../refusal.ts";
import type { ClusterCodes } from "./clustered-rows.ts";

export interface RowClusters {
  readonly codes: ClusterCodes;
  readonly finding: ClustersFinding;
}

/**
 * The rows of a source by cluster, numbered in ascending order of the column's values.
 *
 * @throws Refusal as `groupsOf` does, and where all rows are of one cluster
 */
export function clustersOfRows(data: PreparedData, source: MomentSource, column: string, key: string[]): RowClusters {
  const codes = codesOf(groupsOf(data, column, key), source);
  if (codes.count > 1) return { codes, finding: { column, count: codes.count } };
  const sentence = `${column} has one value in all ${source.rows} rows: 1 cluster, where errors that differ between clusters need at least 2.`;
  throw new Refusal([{ sentence, key, column }]);
}

/** The column of a bootstrap of clusters: its own, or that of the data. */
export function clusterColumn(data: PreparedData, named: string | undefined): string {
  const column = named ?? data.clusters?.column;
  if (column !== undefined) return column;
  const sentence =
    "A bootstrap of clusters needs to know which rows belong together: name the column under cluster, here or in the data cell.";
  throw new Refusal([{ sentence, key: ["standard errors", "bootstrap"] }]);
}

/** Only groups that occur in the source, where it has fewer rows than the data. */
function codesOf({ codes, labels }: Groups, { rows, dataRows }: MomentSource): ClusterCodes {
  if (dataRows === undefined) return { codes, count: labels.length };
  const own = Int32Array.from({ length: rows }, (_, t) => codes[dataRows[t]]);
  const used = [...new Set(own)].sort((one, two) => one - two);
  const codeOf = new Map(used.map((label, code) => [label, code]));
  return { codes: own.map((label) => codeOf.get(label)!), count: used.length };
}
