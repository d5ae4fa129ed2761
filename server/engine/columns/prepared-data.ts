import type { DataFinding } from "../../../shared/schemas/data.ts";

/** An upload, parsed: columns in file order. Numbers with NaN for an empty cell; text with "" for one. */
export interface UploadTable {
  readonly name: string;
  readonly sha256: string;
  readonly rows: number;
  readonly columns: readonly TableColumn[];
}

export type TableColumn =
  | { readonly name: string; readonly type: "number"; readonly values: Float64Array }
  | {
      readonly name: string;
      readonly type: "text";
      /** Index into `levels`, −1 for an empty cell. */
      readonly codes: Int32Array;
      readonly levels: readonly string[];
      /** The first cell that is not a number, when most are: for the refusal that names it. */
      readonly firstText?: { readonly row: number; readonly value: string };
    };

/** Rows used in which a column has no number, and the first of them by its number in the upload. */
export interface IncompleteColumn {
  readonly missing: number;
  readonly firstRow: number;
}

/** A column of text over the rows used. */
export interface LabelledColumn {
  /** Of each row used, a place in `labels`; `labels.length` for an empty cell. */
  readonly codes: Int32Array | Uint16Array;
  /** Those that occur, in ascending order. */
  readonly labels: readonly string[];
  readonly missing?: IncompleteColumn;
}

/**
 * A data cell's rows used, ready for estimation: T rows, n goods, everything column-wise in Float64.
 * Prices and total are in units of estimation (divided by `priceScale` and `totalScale`).
 */
export interface PreparedData {
  readonly fingerprint: string;
  readonly goods: readonly string[];
  readonly rows: number;
  /** Row of the upload for each row used, the first after the header being 1. */
  readonly rowNumbers: Int32Array;
  readonly shares: readonly Float64Array[];
  readonly logPrices: readonly Float64Array[];
  readonly logTotal: Float64Array;
  /** Scaled to sum to T; absent when the data name no weight. */
  readonly weights?: Float64Array;
  readonly clusters?: { readonly column: string; readonly codes: Int32Array; readonly labels: readonly string[] };
  readonly time?: Float64Array;
  /** Numeric columns a system may use as demographics, derived ones included, rows used only. */
  readonly numeric: ReadonlyMap<string, Float64Array>;
  /** Columns of numbers that lack a value in some row used, and so are no demographics: for the refusal that says so. */
  readonly incomplete?: ReadonlyMap<string, IncompleteColumn>;
  /** Columns of text that rows can be grouped by (`groupsOf`). */
  readonly labelled?: ReadonlyMap<string, LabelledColumn>;
  /** Columns of text not kept, as more than half the rows differ in them, with the number of labels. */
  readonly nearlyUnique?: ReadonlyMap<string, number>;
  readonly priceScale: readonly number[];
  readonly totalScale: number;
  readonly finding: DataFinding;
}
