import type { Problem } from "../schemas/problem.ts";

/** A cell as people edit it: its name, kind and YAML text, and where it stands in the study. */
export interface CellSource {
  readonly id: string;
  readonly name: string;
  /** A word of `CELL_KINDS`, or whatever a newer or mistaken hand wrote. */
  readonly kind: string;
  /** Fractional order key: cells stand in the order of (order, id). */
  readonly order: string;
  readonly source: string;
}

/** A place in a source text: 1-based line and column, character offsets from its start. */
export type Place = NonNullable<Problem["place"]>;

/** A key's path in a source, e.g. ["goods", "brand1", "price"]; members of lists by their position. */
export type KeyPath = readonly (string | number)[];

/** Where the keys and values of a source stand in its text. */
export interface Places {
  key(path: KeyPath): Place | undefined;
  value(path: KeyPath): Place | undefined;
}

export const NOWHERE: Places = { key: () => undefined, value: () => undefined };
