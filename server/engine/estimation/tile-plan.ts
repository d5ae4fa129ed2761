/** Tiles are squares of this many block columns. */
export const TILE = 4;

/**
 * Which products of block columns are accumulated. Block column t holds term t (or a response);
 * tile k multiplies the four columns `left[4k…]` by the four `right[4k…]` into the sixteen sums at 16k.
 */
export interface TilePlan {
  readonly columns: number;
  readonly tiles: number;
  readonly left: Int32Array;
  readonly right: Int32Array;
  /** Where the sum of column i times column j (j ≥ i, at i·columns + j) is found among the sums. */
  readonly placeOf: Int32Array;
}

/** Each column on the left times each on the right: four against four. */
export type Tile = readonly [left: readonly number[], right: readonly number[]];

/** One tile after the other; of a pair of columns that stands in several the last counts. */
export function layTiles(columns: number, tiles: readonly Tile[]): TilePlan {
  const placeOf = new Int32Array(columns * columns);
  tiles.forEach(([left, right], tile) => {
    left.forEach((row, r) => {
      right.forEach((column, c) => {
        placeOf[row * columns + column] = (tile * TILE + r) * TILE + c;
      });
    });
  });
  return {
    columns,
    tiles: tiles.length,
    left: Int32Array.from(tiles.flatMap(([left]) => left)),
    right: Int32Array.from(tiles.flatMap(([, right]) => right)),
    placeOf,
  };
}

/** In fours, the last filled up by repeating its last entry. */
export function fours(list: readonly number[]): number[][] {
  const groups: number[][] = [];
  for (let at = 0; at < list.length; at += TILE) {
    const group = list.slice(at, at + TILE);
    while (group.length < TILE) group.push(group[group.length - 1]);
    groups.push(group);
  }
  return groups;
}

/** The plan of all products of `columns` unrelated columns, each pair once. */
export function densePlan(columns: number): TilePlan {
  const groups = fours(Array.from({ length: columns }, (_, column) => column));
  return layTiles(
    columns,
    groups.flatMap((left, at) => groups.slice(at).map((right): Tile => [left, right])),
  );
}

/** The plan of products with the columns from `first` on only, with all columns before them and each other. */
export function responsePlan(first: number, columns: number): TilePlan {
  const all = Array.from({ length: columns }, (_, column) => column);
  const tiles = fours(all.slice(first)).flatMap((right) => fours(all).map((left): Tile => [left, right]));
  return layTiles(columns, tiles);
}
