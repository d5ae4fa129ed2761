/** An entry of the matrix: row i, column j. */
export type Place = readonly [row: number, column: number];

const clamp = (index: number, size: number) => Math.min(size - 1, Math.max(0, index));

/** Where a key leads from an entry of an n × n matrix; undefined for keys that are not the matrix's. */
export function moveBy(key: string, [row, column]: Place, size: number, wholly: boolean): Place | undefined {
  switch (key) {
    case "ArrowUp":
      return [clamp(row - 1, size), column];
    case "ArrowDown":
      return [clamp(row + 1, size), column];
    case "ArrowLeft":
      return [row, clamp(column - 1, size)];
    case "ArrowRight":
      return [row, clamp(column + 1, size)];
    case "Home":
      return [wholly ? 0 : row, 0];
    case "End":
      return [wholly ? size - 1 : row, size - 1];
    // The mirror is one key away, since it is what one compares with.
    case "m":
      return [column, row];
    default:
      return undefined;
  }
}
