import type { CellSpecification } from "../../schemas/cell.ts";
import type { Problem } from "../../schemas/problem.ts";
import type { KeyPath, Places } from "../cell-source.ts";
import { nearestWord } from "../nearest-word.ts";
import { listSome } from "../words.ts";
import type { UploadShape } from "./upload-shape.ts";

/** A specification among the others of its study, with where its keys stand. */
export interface Context {
  readonly specification: CellSpecification;
  readonly places: Places;
  readonly specifications: ReadonlyMap<string, CellSpecification>;
  readonly uploads: readonly UploadShape[];
}

/** With a wrong upload everything is unknown: so many are told at once, and looking for the nearest takes time. */
export const MOST_TOLD = 20;

/** Says of a key what is wrong with it, at its place. */
export function teller(places: Places) {
  return (path: KeyPath, sentence: string, nearest?: string): Problem => {
    const place = places.value(path) ?? places.key(path);
    return { sentence, key: path.map(String), ...(place && { place }), ...(nearest && { nearest }) };
  };
}

/** That a table has no such column, and the nearest that it has. */
export function noColumn(owner: string, column: string, names: readonly string[]): [string, string?] {
  const nearest = nearestWord(column, names);
  const there = nearest ? `The nearest is ${nearest}` : `Its columns are ${listSome(names)}`;
  return [`${owner} has no column ${column}. ${there}.`, nearest];
}

/** That data have no such good, and the nearest that they have. */
export function noGood(owner: string, good: string, goods: readonly string[]): [string, string?] {
  const nearest = nearestWord(good, goods);
  const there = nearest ? `The nearest is ${nearest}` : `Its goods are ${listSome(goods)}`;
  return [`${owner} has no good ${good}. ${there}.`, nearest];
}
