import { cellName } from "../../../shared/schemas/primitives.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { capital } from "../../../shared/study/words.ts";

/** Why a cell cannot be called so; undefined when it can. */
export function nameFault(name: string, cell: CellSource, cells: readonly CellSource[]): string | undefined {
  const read = cellName.safeParse(name);
  if (!read.success) {
    return name === ""
      ? "A cell needs a name, so that others can read it."
      : `${capital(read.error.issues[0].message)}.`;
  }
  const other = cells.find((one) => one.name === name && one.id !== cell.id);
  return other && `Another cell is called ${name} already.`;
}
