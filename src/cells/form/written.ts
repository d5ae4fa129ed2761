import type { CellKind } from "../../../shared/schemas/cell.ts";
import { readDocument } from "../../../shared/study/document.ts";
import { removeKey, setKey, type Value } from "../../../shared/study/edit.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import type { FormProps } from "../types.ts";

export type KeyPath = readonly (string | number)[];

/** A source as a form reads and writes it: values as written, even while something else is wrong. */
export interface Written {
  /** False while the text cannot be read as YAML: then only the text can mend it. */
  readonly readable: boolean;
  readonly value: (...path: KeyPath) => unknown;
  readonly text: (...path: KeyPath) => string;
  readonly list: (...path: KeyPath) => string[];
  readonly map: (...path: KeyPath) => Record<string, unknown>;
  /** Writes keys one after the other; undefined removes one. Comments and order are kept. */
  readonly write: (...edits: readonly (readonly [path: KeyPath, value: Value | undefined])[]) => void;
}

const isMap = (value: unknown): value is Record<string, unknown> =>
  typeof value === "object" && value !== null && !Array.isArray(value);

export function readWritten(kind: CellKind, { source, onChange }: Pick<FormProps, "source" | "onChange">): Written {
  const { written } = parseCell(kind, source);
  const value = (...path: KeyPath): unknown =>
    path.reduce<unknown>(
      (inner, step) => (isMap(inner) ? inner[step] : Array.isArray(inner) ? inner[Number(step)] : undefined),
      written,
    );
  return {
    readable: readDocument(source).problems.length === 0,
    value,
    text: (...path) => {
      const found = value(...path);
      return typeof found === "object" || found === undefined || found === null ? "" : String(found);
    },
    list: (...path) => {
      const found = value(...path);
      return Array.isArray(found) ? found.map(String) : [];
    },
    map: (...path) => {
      const found = value(...path);
      return isMap(found) ? found : {};
    },
    write: (...edits) =>
      onChange(
        edits.reduce(
          (text, [path, next]) => (next === undefined ? removeKey(text, path) : setKey(text, path, next)),
          source,
        ),
      ),
  };
}
