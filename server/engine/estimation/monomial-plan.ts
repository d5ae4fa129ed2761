import type { Poll } from "../run.ts";
import { ordered, type TermPair, termOf } from "./moment-source.ts";
import { fours, layTiles, TILE, type Tile, type TilePlan } from "./tile-plan.ts";

/**
 * The moment of two terms is a monomial in the base columns, and many pairs of terms share one:
 * (ln p₁ ln p₂)(ln p₃ ln p₄) is also (ln p₁ ln p₃)(ln p₂ ln p₄). Each monomial is accumulated once,
 * which for the products of the exact AIDS is a bit more than half of the pairs.
 *
 * Responses are base columns of their own, multiplied with everything: give them as terms [0, place].
 */
export function planTiles(terms: readonly TermPair[], poll: Poll = () => {}): TilePlan {
  const key = terms.join(" ");
  const plan = plans.get(key) ?? newPlan(terms, poll);
  // The oldest goes: a study has few sets of terms, and an iteration asks for the same again and again.
  if (!plans.has(key) && plans.size >= MOST_PLANS) plans.delete(plans.keys().next().value!);
  plans.set(key, plan);
  return plan;
}

const plans = new Map<string, TilePlan>();
const MOST_PLANS = 12;

function newPlan(terms: readonly TermPair[], poll: Poll): TilePlan {
  const columns = terms.length;
  const place = new Map(terms.map((term, at) => [term.join(), at]));
  const chosen = new Map<string, readonly [row: number, column: number]>();
  const wanted = new Map<number, Set<number>>();
  for (let i = 0; i < columns; i++) {
    poll();
    for (let j = i; j < columns; j++) {
      const monomial = monomialOf(terms[i], terms[j]);
      const key = monomial.join();
      if (chosen.has(key)) continue;
      const [row, column] = splitOf(monomial, place) ?? [i, j];
      chosen.set(key, [row, column]);
      if (!wanted.has(row)) wanted.set(row, new Set());
      wanted.get(row)!.add(column);
    }
  }
  const laid = layTiles(columns, tilesOf(mergeGroups(groupRows(terms, wanted), poll)));
  const placeOf = new Int32Array(columns * columns);
  for (let i = 0; i < columns; i++) {
    poll();
    for (let j = i; j < columns; j++) {
      const [row, column] = chosen.get(monomialOf(terms[i], terms[j]).join())!;
      placeOf[i * columns + j] = laid.placeOf[row * columns + column];
    }
  }
  return { ...laid, placeOf };
}

function tilesOf(groups: readonly Group[]): Tile[] {
  return groups.flatMap(({ rows, columns }) =>
    fours(rows).flatMap((left) => fours(columns).map((right): Tile => [left, right])),
  );
}

interface Group {
  readonly rows: number[];
  readonly columns: number[];
}

function monomialOf(left: TermPair, right: TermPair): number[] {
  const factors = [...left, ...right].filter((place) => place !== 0).sort((a, b) => a - b);
  while (factors.length < 4) factors.unshift(0);
  return factors;
}

/** The first split of a monomial into two terms: neighbours first, so that equal rows want equal columns. */
function splitOf(monomial: number[], place: ReadonlyMap<string, number>): [number, number] | undefined {
  if (monomial.length > 4) return splitOfMore(monomial, place);
  const [a, b, c, d] = monomial;
  for (const [one, two] of [
    [ordered(a, b), ordered(c, d)],
    [ordered(a, c), ordered(b, d)],
    [ordered(a, d), ordered(b, c)],
  ]) {
    const first = place.get(one.join());
    const second = place.get(two.join());
    if (first === undefined || second === undefined) continue;
    return one[1] <= two[1] ? [first, second] : [second, first];
  }
  return undefined;
}

/**
 * The same where there are more than four factors: the first two with none, the last, or any of the others
 * first, so that (ln p₁ ln p₂)(ln p₃ ln p₄ r) stands in the row of ln p₁ ln p₂.
 */
function splitOfMore(monomial: number[], place: ReadonlyMap<string, number>): [number, number] | undefined {
  const last = 1 << (monomial.length - 1);
  const liked = [3, 3 | last, 3 | (last >> 1)];
  const all = Array.from({ length: 2 * last }, (_, subset) => subset);
  for (const subset of [...liked, ...all]) {
    const parts: [number[], number[]] = [[], []];
    monomial.forEach((factor, at) => {
      parts[(subset >> at) & 1].push(factor);
    });
    const row = place.get(termOf(parts[1]).join());
    const column = place.get(termOf(parts[0]).join());
    if (row !== undefined && column !== undefined) return [row, column];
  }
  return undefined;
}

/** Plain columns, in no product, that are grouped from the start where there are very many (zeros in two steps). */
const MANY_PLAIN = 48;
const PLAIN_TOGETHER = 4 * TILE;

/**
 * Rows with the same second base column want (nearly) the same columns: one rectangle each. A plain column wants all
 * those after it.
 */
function groupRows(terms: readonly TermPair[], wanted: ReadonlyMap<number, ReadonlySet<number>>): Group[] {
  const inProducts = new Set(terms.flatMap((term) => (term[0] === 0 ? [] : [...term])));
  const plain = terms.flatMap(([left, right], row) => (left === 0 && !inProducts.has(right) ? [row] : []));
  const bundle = new Map(
    plain.length < MANY_PLAIN ? [] : plain.map((row, at) => [row, Math.floor(at / PLAIN_TOGETHER)]),
  );
  const groups = new Map<string, { rows: number[]; columns: Set<number> }>();
  for (const [row, columns] of wanted) {
    const alike = bundle.has(row) ? `plain ${bundle.get(row)}` : terms[row].slice(1).join();
    if (!groups.has(alike)) groups.set(alike, { rows: [], columns: new Set() });
    const group = groups.get(alike)!;
    group.rows.push(row);
    for (const column of columns) group.columns.add(column);
  }
  return [...groups.values()].map((group) => ({ rows: group.rows, columns: [...group.columns].sort((a, b) => a - b) }));
}

/** Merges rectangles while that saves whole tiles. */
function mergeGroups(groups: Group[], poll: Poll): Group[] {
  const cost = (group: Group) => Math.ceil(group.rows.length / TILE) * Math.ceil(group.columns.length / TILE);
  let list = groups;
  for (;;) {
    let best: { saving: number; i: number; j: number; merged: Group } | undefined;
    for (let i = 0; i < list.length; i++) {
      poll();
      for (let j = i + 1; j < list.length; j++) {
        const merged: Group = {
          rows: [...list[i].rows, ...list[j].rows],
          columns: [...new Set([...list[i].columns, ...list[j].columns])].sort((a, b) => a - b),
        };
        const saving = cost(list[i]) + cost(list[j]) - cost(merged);
        if (saving > (best?.saving ?? 0)) best = { saving, i, j, merged };
      }
    }
    if (best === undefined) return list;
    const { i, j, merged } = best;
    list = [...list.filter((_, at) => at !== i && at !== j), merged];
  }
}
