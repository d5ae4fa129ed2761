import type { ColumnChunk, FileMetaData, SchemaElement, SchemaTree } from "hyparquet";
import { parquetSchema } from "hyparquet";
import type { Problem } from "../../../../shared/schemas/problem.ts";
import { printCount } from "../../../../shared/tables/numbers.ts";
import { Refusal } from "../../refusal.ts";
import { readHeader } from "../header.ts";

/** Fifty million numbers are 400 MB of columns. */
const MOST_CELLS = 50_000_000;
/** Expanded, all pages together. */
const MOST_EXPANDED = 2 * 1024 ** 3;

/** A column of the file: where its cells are, group of rows by group of rows. */
export interface ParquetColumn {
  readonly name: string;
  readonly element: SchemaElement;
  /** From the root of the schema to the column, as the decoder asks for it. */
  readonly path: SchemaTree[];
  readonly chunks: readonly { readonly rows: number; readonly chunk: NonNullable<ColumnChunk["meta_data"]> }[];
}

/**
 * The columns a Parquet file declares, checked against what may be read before anything is set aside for them: flat,
 * of a kind that a table has, all groups of rows complete, and not more of them than fit.
 */
export function parquetColumns(metadata: FileMetaData): { readonly rows: number; readonly columns: ParquetColumn[] } {
  const { children } = parquetSchema(metadata);
  const names = readHeader(children.map(({ element }) => element.name));
  const rows = Number(metadata.num_rows);
  if (!(rows >= 0) || rows * names.length > MOST_CELLS) {
    throw new Refusal(
      `The file declares ${printCount(rows)} rows of ${names.length} columns; at most ${printCount(MOST_CELLS)} cells are read.`,
    );
  }
  const problems = children.flatMap((child, at) => unreadable(child, names[at]));
  if (problems.length > 0) throw new Refusal(problems);
  const inGroups = metadata.row_groups.reduce((sum, group) => sum + Number(group.num_rows), 0);
  if (inGroups !== rows) {
    throw new Refusal(
      `The file declares ${printCount(rows)} rows, and its ${metadata.row_groups.length} groups of rows have ${printCount(inGroups)} together.`,
    );
  }
  refuseExpansion(metadata);
  const root = parquetSchema(metadata);
  const columns = children.map((child, at) => ({
    name: names[at],
    element: child.element,
    path: [root, child],
    chunks: metadata.row_groups.map((group, number) => {
      const chunk = group.columns[at]?.meta_data;
      if (chunk?.path_in_schema.join(".") !== child.element.name) {
        throw new Refusal(`Group of rows ${number + 1} of the file lacks the column ${names[at]}.`);
      }
      return { rows: Number(group.num_rows), chunk };
    }),
  }));
  return { rows, columns };
}

function refuseExpansion({ row_groups }: FileMetaData): void {
  const expanded = row_groups.reduce(
    (sum, { columns }) =>
      columns.reduce((inner, { meta_data }) => inner + Number(meta_data?.total_uncompressed_size ?? 0), sum),
    0,
  );
  if (expanded <= MOST_EXPANDED) return;
  throw new Refusal(
    `Unpacked, the file would have ${printCount(expanded)} bytes; at most ${printCount(MOST_EXPANDED)} are read.`,
  );
}

const NOT_OF_A_TABLE: Readonly<Record<string, string>> = {
  JSON: "texts of JSON",
  BSON: "binary documents",
  INTERVAL: "intervals of time",
  VARIANT: "values of any kind",
  GEOMETRY: "geometries",
  GEOGRAPHY: "geographies",
};

function unreadable({ element, children }: SchemaTree, column: string): Problem[] {
  const { type, repetition_type, logical_type, converted_type } = element;
  const nested = children.length > 0 || repetition_type === "REPEATED" || type === undefined;
  const kind = nested
    ? "lists or records within its cells"
    : (NOT_OF_A_TABLE[logical_type?.type ?? ""] ?? NOT_OF_A_TABLE[converted_type ?? ""]);
  if (kind === undefined) return [];
  return [
    { sentence: `${column} has ${kind}; a table has numbers, texts and dates. Leave it out, or flatten it.`, column },
  ];
}
