import type { KeyCommand } from "../../lib/keys.ts";

/** An entry of the matrix: row i, column j. */
export type Place = readonly [row: number, column: number];

const clamp = (index: number, size: number) => Math.min(size - 1, Math.max(0, index));

const MOVES: Readonly<Record<KeyCommand<"matrix">, (place: Place, size: number) => Place>> = {
  up: ([row, column], size) => [clamp(row - 1, size), column],
  down: ([row, column], size) => [clamp(row + 1, size), column],
  left: ([row, column], size) => [row, clamp(column - 1, size)],
  right: ([row, column], size) => [row, clamp(column + 1, size)],
  first: ([row]) => [row, 0],
  last: ([row], size) => [row, size - 1],
  corner: () => [0, 0],
  opposite: (_, size) => [size - 1, size - 1],
  // The mirror is one key away, since it is what one compares with.
  mirror: ([row, column]) => [column, row],
};

/** Where a command leads from an entry of an n × n matrix. */
export const moveBy = (command: KeyCommand<"matrix">, place: Place, size: number): Place => MOVES[command](place, size);
