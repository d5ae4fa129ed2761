import { moveKey, renameKey } from "../../../shared/study/edit-keys.ts";

/** A good under another name; a refusal in words when that name will not do. */
export function renameGood(
  source: string,
  goods: readonly string[],
  good: string,
  name: string,
): string | { no: string } {
  if (name === "" || name === good) return source;
  if (goods.includes(name)) return { no: `There is a good called ${name} already.` };
  if (name.length > 80) return { no: `A good's name has at most 80 characters; this one has ${name.length}.` };
  return renameKey(source, ["goods", good], name);
}

/** A good moved by some places, as far as there are any. */
export function moveGood(source: string, goods: readonly string[], good: string, by: number): string {
  return moveKey(source, ["goods", good], Math.min(goods.length - 1, Math.max(0, goods.indexOf(good) + by)));
}

/** A good moved to where another stands. */
export function moveGoodTo(source: string, goods: readonly string[], good: string, target: string): string {
  return moveKey(source, ["goods", good], goods.indexOf(target));
}
