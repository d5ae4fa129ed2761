import type { z } from "zod";
import { CELL_KINDS, type CellKind, type CellSpecification, SPECIFICATIONS } from "../schemas/cell.ts";
import type { Problem } from "../schemas/problem.ts";
import type { CellSource, Places } from "./cell-source.ts";
import { NOWHERE } from "./cell-source.ts";
import { readDocument } from "./document.ts";
import { issueProblems } from "./issues.ts";
import { nearestWord } from "./nearest-word.ts";
import { normaliseSpecification } from "./normalise.ts";
import { type PlaceInText, parseText } from "./parse-text.ts";
import { LIKE } from "./vocabulary.ts";
import { aKind, capital } from "./words.ts";

/** A cell's source read on its own, before it is set beside the study's other cells. */
export interface ParsedCell {
  readonly kind?: CellKind;
  /** Present when nothing is wrong and no other cell is needed to complete it. */
  readonly specification?: CellSpecification;
  readonly problems: Problem[];
  readonly places: Places;
  /** The keys as written, for `like` and references; empty when the text cannot be read. */
  readonly written: Readonly<Record<string, unknown>>;
  /** Of a text cell: where a stretch of its text stands. */
  readonly placeInText?: PlaceInText;
}

/** A cell of a study, read: a source of the workspace, or a part of a study file. */
export interface StudyCell extends CellSource {
  readonly parsed: ParsedCell;
}

/** A cell's source as text: its specification, or everything wrong with it, each at its place. */
export function parseCell(kind: string, source: string): ParsedCell {
  if (kind === "text") return parseText(source);
  const { value, problems, places } = readDocument(source);
  if (problems.length > 0) {
    return { ...(isKind(kind) && { kind }), problems: [...problems], places, written: {} };
  }
  return parseValue(kind, value, places);
}

/** The same, from a value already read: cells of a study file. */
export function parseValue(kind: string, value: unknown, places: Places): ParsedCell {
  const none = { places, written: {} };
  if (!isKind(kind)) {
    const nearest = nearestWord(kind, CELL_KINDS);
    const sentence = `${kind || "Nothing"} is not a kind of cell (${CELL_KINDS.join(", ")})${nearest ? `: the nearest is ${nearest}` : ""}.`;
    return { ...none, problems: [{ sentence, key: ["kind"], ...(nearest && { nearest }) }] };
  }
  const keys = value ?? {};
  if (typeof keys !== "object" || Array.isArray(keys)) {
    const sentence = `${capital(aKind(kind))} is written as keys, each with a colon, a space and its value.`;
    const place = places.value([]);
    return { ...none, kind, problems: [{ sentence, ...(place && { place }) }] };
  }
  const written = keys as Record<string, unknown>;
  const checked = checkKeys(kind, written, places);
  return { kind, places, written, ...checked };
}

/**
 * Holds keys against the kind's schema. With `like` the specification cannot be complete yet: what is
 * written is checked, what is not written is taken over later (`resolveCells`).
 */
export function checkKeys(
  kind: CellKind,
  written: Readonly<Record<string, unknown>>,
  places: Places = NOWHERE,
): { specification?: CellSpecification; problems: Problem[] } {
  const { [LIKE]: like, ...own } = written;
  const borrows = kind === "system" && like !== undefined;
  const value = { ...(borrows ? own : written), kind: written.kind ?? kind };
  const parsed = SPECIFICATIONS[kind].safeParse(value);
  if (parsed.success && !borrows) {
    const specification = normaliseSpecification(parsed.data);
    const problems = repeated(specification, places);
    return problems.length > 0 ? { problems } : { specification, problems };
  }
  const issues = parsed.success ? [] : parsed.error.issues.filter((issue) => !(borrows && isMissing(issue, own)));
  const problems = issueProblems(issues, { kind, value, places });
  if (borrows && typeof like !== "string") {
    const place = places.value([LIKE]) ?? places.key([LIKE]);
    problems.push({ sentence: "like needs the name of a system cell.", key: [LIKE], ...(place && { place }) });
  }
  return { problems };
}

function isMissing(issue: z.core.$ZodIssue, own: Readonly<Record<string, unknown>>): boolean {
  return issue.path.length === 1 && own[String(issue.path[0])] === undefined;
}

/** Lists that name the same thing twice, and a data cell with too few goods to share a budget. */
function repeated(specification: CellSpecification, places: Places): Problem[] {
  if (specification.kind === "data") {
    const goods = Object.keys(specification.goods).length;
    if (goods > 1) return [];
    const place = places.key(["goods"]);
    const sentence = `goods has ${goods === 1 ? "1 good" : "no good"}; shares need at least 2.`;
    return [{ sentence, key: ["goods"], ...(place && { place }) }];
  }
  if (specification.kind !== "system") return [];
  const names = specification.demographics;
  return names.flatMap((name, i) => {
    if (names.indexOf(name) === i) return [];
    const place = places.value(["demographics", i]);
    return [{ sentence: `demographics has ${name} twice.`, key: ["demographics", String(i)], ...(place && { place }) }];
  });
}

export function isKind(kind: string): kind is CellKind {
  return (CELL_KINDS as readonly string[]).includes(kind);
}
