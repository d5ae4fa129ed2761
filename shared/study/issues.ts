import type { z } from "zod";
import type { CellKind } from "../schemas/cell.ts";
import type { Problem } from "../schemas/problem.ts";
import type { KeyPath, Place, Places } from "./cell-source.ts";
import { nearestWord } from "./nearest-word.ts";
import { keyWord, VOCABULARY } from "./vocabulary.ts";
import { aKind, capital, listSome } from "./words.ts";

type Issue = z.core.$ZodIssue;

/** What was checked, for the sentences: the kind, the value as written, where things stand. */
interface Checked {
  readonly kind: CellKind;
  readonly value: unknown;
  readonly places: Places;
}

/**
 * Every issue of a schema as sentences at their places. What a map lacks as a whole is not told while
 * one of its keys is mistyped: mending the key usually mends both.
 */
export function issueProblems(issues: readonly Issue[], checked: Checked): Problem[] {
  const mistyped = new Set(issues.flatMap(({ code, path }) => (code === "unrecognized_keys" ? [path.join("\n")] : [])));
  return issues
    .filter(({ code, path }) => !(code === "custom" && mistyped.has(path.join("\n"))))
    .flatMap((issue) => problemsOf(issue, checked))
    .toSorted((a, b) => (a.place?.from ?? 0) - (b.place?.from ?? 0));
}

function problemsOf(issue: Issue, checked: Checked): Problem[] {
  const path = issue.path.map((step) => (typeof step === "symbol" ? String(step) : step));
  if (issue.code === "unrecognized_keys") return issue.keys.map((key) => unknownKey([...path, key], checked));
  if (issue.code === "invalid_union") return unionProblems(issue, path, checked);
  const written = valueAt(checked.value, path);
  if (written === undefined) return [missing(path, checked)];
  const name = nameOf(path);
  const told = (sentence: string, nearest?: string): Problem[] => [
    located(sentence, path, checked.places.value(path) ?? checked.places.key(path), nearest),
  ];
  if (written === null) return told(`${name} is empty${expectation(path, checked.kind)}.`);
  switch (issue.code) {
    case "invalid_value":
      return wrongWord(issue.values.map(String), written, path, checked);
    case "invalid_type":
      return told(...wrongType(issue.expected, written, name));
    case "invalid_key":
      return [located(`${name || "A name"} cannot be empty or so long.`, path, checked.places.key(path))];
    case "invalid_format":
      return told(`${name} is ${show(written)}: ${issue.message}.`);
    case "too_small":
      return told(
        `${name} is ${show(written)}: it must be ${issue.inclusive ? "at least" : "more than"} ${issue.minimum}${lettersOf(issue.origin)}.`,
      );
    case "too_big":
      return told(`${name} is too long or too large: at most ${issue.maximum}${lettersOf(issue.origin)}.`);
    case "custom":
      return told(issue.message.startsWith(name) ? `${issue.message}.` : `${name}: ${issue.message}.`);
    default:
      return told(`${name} is not valid: ${issue.message}.`);
  }
}

const lettersOf = (origin: string): string => (origin === "string" ? " characters" : "");

function located(sentence: string, path: KeyPath, place?: Place, nearest?: string): Problem {
  return {
    sentence,
    ...(path.length > 0 && { key: path.map(String) }),
    ...(place && { place }),
    ...(nearest !== undefined && { nearest }),
  };
}

function unknownKey(path: KeyPath, { kind, value, places }: Checked): Problem {
  const key = String(path.at(-1));
  const parent = path.slice(0, -1);
  const known = parent.length === 0 ? VOCABULARY[kind] : innerKeys(kind, parent);
  const given = new Set(Object.keys((valueAt(value, parent) ?? {}) as object));
  const free = known.map((word) => word.key).filter((word) => !given.has(word));
  const nearest = nearestWord(key, free);
  const owner = parent.length === 0 ? aKind(kind) : nameOf(parent);
  const rest = nearest ? `: the nearest is ${nearest}.` : `, which takes ${listSome(known.map((word) => word.key))}.`;
  return located(`${key} is not a key of ${owner}${rest}`, path, places.key(path), nearest);
}

function innerKeys(kind: CellKind, path: KeyPath) {
  const word = keyWord(kind, String(path[0]));
  return word?.keys ?? [];
}

function missing(path: KeyPath, { kind, places }: Checked): Problem {
  const key = String(path.at(-1));
  const parent = path.slice(0, -1);
  const owner = parent.length === 0 ? aKind(kind) : nameOf(parent);
  const place = parent.length === 0 ? { line: 1, column: 1, from: 0, to: 0 } : places.key(parent);
  return located(
    `${parent.length === 0 ? capital(owner) : owner} needs ${key}${expectation(path, kind)}.`,
    path,
    place,
  );
}

/** ": one of la-aids, aids, les", or what the key is for. */
function expectation(path: KeyPath, kind: CellKind): string {
  const outer = keyWord(kind, String(path[0]));
  const word = path.length === 1 ? outer : outer?.keys.find((inner) => inner.key === String(path.at(-1)));
  if (!word) return "";
  const choice = word.values.length > 1 && word.keys.length === 0;
  return choice ? `: one of ${word.values.join(", ")}` : `: ${word.says}`;
}

function wrongWord(valid: string[], written: unknown, path: KeyPath, { kind, places }: Checked): Problem[] {
  const member = typeof path.at(-1) === "number";
  const name = nameOf(path);
  const list = valid.join(", ");
  const nearest = typeof written === "string" ? nearestWord(written, valid) : undefined;
  const shown = show(written);
  const refusal =
    valid.length === 1
      ? `${name} has ${shown}; only ${list} is offered`
      : member
        ? `${name} has ${shown}, which is not one of ${list}`
        : `${name} is not one of ${list}`;
  // A word where keys could stand as well: the line of the key says what all can.
  if (!nearest && keyWord(kind, String(path[0]))?.keys.length) {
    return [located(`${name} cannot be ${shown}${expectation(path, kind)}.`, path, places.value(path))];
  }
  const end = nearest && valid.length > 1 ? `: the nearest to ${shown} is ${nearest}.` : ".";
  return [located(refusal + end, path, places.value(path), nearest)];
}

const TYPES: Readonly<Record<string, string>> = {
  string: "a text",
  number: "a number",
  int: "a whole number",
  boolean: "true or false",
  array: "a list in brackets, such as [a, b]",
  object: "keys of its own, each with a value",
  record: "names of its own, each with a value",
};

function wrongType(expected: string, written: unknown, name: string): [string, string?] {
  if (expected === "string" && (typeof written === "number" || typeof written === "boolean")) {
    // x of at alone is a quantile; an amount needs prices beside it.
    if (name === "x of at") return [`x of at is ${written}: write quantile 0.9, or give prices beside it.`];
    const quoted = `"${written}"`;
    return [`${name} needs a text and has ${written}: write it in quotes, ${quoted}.`, quoted];
  }
  if (expected === "array" && typeof written === "string") {
    return [`${name} needs a list: write ${name}: [${written}].`, `[${written}]`];
  }
  return [`${name} needs ${TYPES[expected] ?? expected} and has ${show(written)}.`];
}

/** Of a union the option a person meant is the one whose shape fits; its issues are told. */
function unionProblems(issue: Extract<Issue, { code: "invalid_union" }>, path: KeyPath, checked: Checked): Problem[] {
  const written = valueAt(checked.value, path);
  if (written === undefined) return [missing(path, checked)];
  const fitting = issue.errors
    .map((errors) => ({ errors, cost: errors.reduce((sum, error) => sum + costOf(error), 0) }))
    .filter(({ errors }) => !errors.some((error) => error.path.length === 0 && isOtherShape(error, written)))
    .sort((a, b) => a.cost - b.cost);
  const said = expectation(path, checked.kind);
  if (written === null || fitting.length === 0) {
    return [
      located(
        `${nameOf(path)} ${written === null ? "is empty" : `cannot be ${show(written)}`}${said}.`,
        path,
        checked.places.value(path) ?? checked.places.key(path),
      ),
    ];
  }
  return fitting[0].errors.flatMap((error) => {
    const whole = { ...error, path: [...path, ...error.path] } as Issue;
    return problemsOf(whole, checked);
  });
}

/** An option that takes another type, or a word where keys are written. */
function isOtherShape(issue: Issue, written: unknown): boolean {
  return issue.code === "invalid_type" || (issue.code === "invalid_value" && typeof written === "object");
}

/** A key that does not belong weighs more than one that is missing: what is written says what was meant. */
function costOf(issue: Issue): number {
  if (issue.code === "unrecognized_keys") return 3 * issue.keys.length;
  return 1;
}

export function valueAt(value: unknown, path: KeyPath): unknown {
  let inner = value;
  for (const step of path) {
    if (inner === null || typeof inner !== "object" || !Object.hasOwn(inner, step)) return undefined;
    inner = (inner as Record<string | number, unknown>)[step];
  }
  return inner;
}

/** "form", "price of brand1", "goods": how a sentence calls the key; a list's member goes by the list. */
export function nameOf(path: KeyPath): string {
  const steps = path.filter((step) => typeof step === "string");
  const last = steps.at(-1) ?? "";
  return steps.length > 2 || (steps.length === 2 && steps[0] === "at") ? `${last} of ${steps.at(-2)}` : last;
}

function show(written: unknown): string {
  if (Array.isArray(written)) return "a list";
  if (written !== null && typeof written === "object") return "a map";
  const text = String(written);
  return text.length > 60 ? `${text.slice(0, 57)}…` : text;
}
