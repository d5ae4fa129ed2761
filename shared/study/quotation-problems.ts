import type { CellSpecification } from "../schemas/cell.ts";
import type { Problem } from "../schemas/problem.ts";
import { isQuotable, QUOTABLE_WORDS, QUOTED_PARTS, QUOTED_STATISTICS, type QuotableKind } from "../schemas/quotable.ts";
import { HYPOTHESIS_NAMES } from "../schemas/tests.ts";
import { nearestWord } from "./nearest-word.ts";
import { goodsNeeded, plainWord, type Quotable, quotable } from "./quotable.ts";
import { type PlacedWord, type Quotation, quotationsOf, quotedWord } from "./quotations.ts";
import { aKind, listSome } from "./words.ts";

/** What a quotation is held against: the cells of the study as far as they are sound. */
export interface QuotedStudy {
  /** The kind of every cell, by name. */
  readonly kinds: ReadonlyMap<string, string>;
  readonly specifications: ReadonlyMap<string, CellSpecification>;
}

/** Where a character of the text stands in the source that holds it. */
export type PlaceInText = (from: number, to: number) => Problem["place"];

/** With a renamed cell everything is unknown: so many are told at once. */
const MOST_TOLD = 50;

/** What is wrong with a text's quotations, each at its place with the nearest word that would do. */
export function quotationProblems(text: string, study: QuotedStudy, placeOf: PlaceInText): Problem[] {
  const { quotations, inMathematics } = quotationsOf(text);
  const outside = inMathematics.flatMap((quotation): Told[] => {
    if (!study.kinds.has(quotation.cell.word)) return [];
    const sentence = `{${quotation.cell.word}: …} stands between dollar signs, where a number cannot be marked when it is out of date. Quote it outside them.`;
    return [{ sentence, at: quotation }];
  });
  const told = [...quotations.flatMap((quotation) => problemOf(quotation, study) ?? []), ...outside];
  return told.slice(0, MOST_TOLD).map(({ sentence, at, nearest }) => {
    const place = placeOf(at.from, at.to);
    return { sentence, key: ["text"], ...(place && { place }), ...(nearest !== undefined && { nearest }) };
  });
}

interface Told {
  readonly sentence: string;
  readonly at: { readonly from: number; readonly to: number };
  readonly nearest?: string;
}

function problemOf(quotation: Quotation, study: QuotedStudy): Told | undefined {
  const { cell, words } = quotation;
  const kind = study.kinds.get(cell.word);
  if (kind === undefined) return unknownCell(cell, study);
  if (!isQuotable(kind)) return { sentence: `${cell.word} is ${aKind(kind)}, which has no number to quote.`, at: cell };
  const [asked, ...rest] = words;
  if (asked === undefined) {
    const sentence = `{${cell.word}: } asks for nothing. Of ${aKind(kind)} one may quote ${listSome(QUOTABLE_WORDS[kind])}.`;
    return { sentence, at: quotation };
  }
  const entry = quotable(kind, asked.word);
  return entry ? argumentsOf(quotation, entry, rest, study) : unknownWord(cell, asked, kind);
}

function unknownCell(cell: PlacedWord, { kinds }: QuotedStudy): Told {
  const names = [...kinds].flatMap(([name, kind]) => (isQuotable(kind) ? [name] : []));
  const nearest = nearestWord(cell.word, names);
  const there = names.length === 0 ? "There is none to quote yet" : `There are ${listSome(names)}`;
  const sentence = `No cell is called ${cell.word}. ${nearest ? `The nearest is ${nearest}` : there}. Braces that quote nothing are written \\{.`;
  return { sentence, at: cell, ...(nearest !== undefined && { nearest }) };
}

function unknownWord(cell: PlacedWord, asked: PlacedWord, kind: QuotableKind): Told {
  const nearest = nearestWord(asked.word, QUOTABLE_WORDS[kind]);
  const offered = nearest ? `The nearest is ${nearest}` : `There are ${listSome(QUOTABLE_WORDS[kind], 40)}`;
  const sentence = `${cell.word} has no ${asked.word} to quote. ${offered}.`;
  return { sentence, at: asked, ...(nearest !== undefined && { nearest }) };
}

function argumentsOf(
  { cell, from, to }: Quotation,
  entry: Quotable,
  given: readonly PlacedWord[],
  study: QuotedStudy,
): Told | undefined {
  const rest = [...given];
  if (entry.parts && QUOTED_PARTS.some((part) => part === plainWord(rest.at(-1)?.word ?? ""))) rest.pop();
  if (entry.needs === "hypothesis") return hypothesisProblem(cell, entry, rest, { from, to });
  if (entry.needs === "rank") return rankProblem(cell, entry, rest, { from, to });
  if (entry.needs === "demographic and good") {
    const wrong = unknownAmong("demographic", cell.word, rest.shift(), demographicsOf(cell.word, study));
    if (wrong) return wrong;
  }
  const goods = goodsOf(cell.word, study);
  const needed = goodsNeeded(entry.needs);
  const found = rest.splice(0, needed);
  if (found.length < needed) {
    const missing = needed === 2 ? "two goods, parted by a comma" : "a good";
    const which = goods ? `: ${listSome(goods)}` : "";
    return { sentence: `${entry.word} of ${cell.word} needs ${missing}${which}.`, at: { from, to } };
  }
  for (const good of found) {
    const wrong = unknownAmong("good", cell.word, good, goods);
    if (wrong) return wrong;
  }
  const mayHaveGroup = entry.needs.endsWith("group") && isGrouped(cell.word, study);
  const [surplus] = mayHaveGroup ? rest.slice(1) : rest;
  if (surplus === undefined) return undefined;
  const parts = entry.parts ? `, and may end with ${QUOTED_PARTS.join(" or ")}` : "";
  const takes = needed === 0 ? "takes nothing after it" : `takes ${needed === 1 ? "one good" : "two goods"}${parts}`;
  return { sentence: `${entry.word} of ${cell.word} ${takes}; ${surplus.word} is too much.`, at: surplus };
}

function unknownAmong(
  what: "good" | "demographic",
  cell: string,
  written: PlacedWord | undefined,
  known: readonly string[] | undefined,
): Told | undefined {
  if (written === undefined || known === undefined) return undefined;
  if (known.some((one) => plainWord(one) === plainWord(written.word))) return undefined;
  const nearest = nearestWord(written.word, known);
  const there = known.length === 0 ? "It has none" : `Its ${what}s are ${listSome(known)}`;
  return {
    sentence: `${cell} has no ${what} ${written.word}. ${nearest ? `The nearest is ${nearest}` : there}.`,
    at: written,
    ...(nearest !== undefined && { nearest: quotedWord(nearest) }),
  };
}

function hypothesisProblem(cell: PlacedWord, entry: Quotable, rest: readonly PlacedWord[], whole: Told["at"]) {
  const [hypothesis, ...more] = rest;
  if (hypothesis === undefined) {
    return { sentence: `${entry.word} of ${cell.word} needs a hypothesis: ${listSome(HYPOTHESIS_NAMES)}.`, at: whole };
  }
  const wrong = unlisted(hypothesis, HYPOTHESIS_NAMES, "a hypothesis");
  if (wrong) return wrong;
  // Of demographics one column may be named before the statistic.
  const statistic = more.find(({ word }) => QUOTED_STATISTICS.some((one) => one === plainWord(word)));
  const others = more.filter((one) => one !== statistic);
  const [surplus] = plainWord(hypothesis.word) === "demographics" ? others.slice(1) : others;
  return surplus && unlisted(surplus, QUOTED_STATISTICS, "a statistic");
}

function rankProblem(cell: PlacedWord, entry: Quotable, rest: readonly PlacedWord[], whole: Told["at"]) {
  const [rank] = rest;
  if (rank !== undefined && /^[1-9]\d{0,3}$/.test(rank.word)) return undefined;
  return { sentence: `${entry.word} of ${cell.word} needs its rank, 1 being the largest.`, at: rank ?? whole };
}

function unlisted(written: PlacedWord, known: readonly string[], what: string): Told | undefined {
  if (known.some((one) => one === plainWord(written.word))) return undefined;
  const nearest = nearestWord(written.word, known);
  return {
    sentence: `${written.word} is not ${what}. ${nearest ? `The nearest is ${nearest}` : `There are ${listSome(known)}`}.`,
    at: written,
    ...(nearest !== undefined && { nearest }),
  };
}

/** The goods of the data a cell rests on; none known while a cell below it has problems. */
export function goodsOf(name: string, study: QuotedStudy): readonly string[] | undefined {
  const seen = new Set<string>();
  for (let at: string | undefined = name; at !== undefined && !seen.has(at); ) {
    seen.add(at);
    const specification: CellSpecification | undefined = study.specifications.get(at);
    if (specification === undefined || specification.kind === "text") return undefined;
    if (specification.kind === "data") return Object.keys(specification.goods);
    at = "system" in specification && specification.system !== undefined ? specification.system : dataOf(specification);
  }
  return undefined;
}

const dataOf = (specification: CellSpecification): string | undefined =>
  "data" in specification ? specification.data : undefined;

function demographicsOf(name: string, { specifications }: QuotedStudy): readonly string[] | undefined {
  const specification = specifications.get(name);
  // Seasons and a trend add columns under names of their own.
  if (specification?.kind !== "system" || specification.season || specification.trend) return undefined;
  return specification.demographics;
}

function isGrouped(name: string, { specifications }: QuotedStudy): boolean {
  const specification = specifications.get(name);
  return specification?.kind !== "elasticities" || specification.groups !== undefined;
}
