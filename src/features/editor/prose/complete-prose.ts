import {
  type Completion,
  type CompletionContext,
  type CompletionResult,
  startCompletion,
} from "@codemirror/autocomplete";
import { isQuotable, QUOTED_PARTS, QUOTED_STATISTICS } from "../../../../shared/schemas/quotable.ts";
import { HYPOTHESIS_NAMES } from "../../../../shared/schemas/tests.ts";
import { parseCell } from "../../../../shared/study/parse-cell.ts";
import { proseSpans } from "../../../../shared/study/prose-spans.ts";
import { goodsNeeded, QUOTABLE, type Quotable, quotable } from "../../../../shared/study/quotable.ts";
import { goodsOf, type QuotedStudy } from "../../../../shared/study/quotation-problems.ts";
import { quotedWord } from "../../../../shared/study/quotations.ts";
import { resolveCells } from "../../../../shared/study/resolve.ts";
import { type EditorSubject, editorSubject } from "../editor-subject.ts";

/** Within braces that are still open: the cells that have numbers, then the numbers of the cell, then its goods. */
export function completeProse(context: CompletionContext): CompletionResult | null {
  const { state, pos } = context;
  const before = state.sliceDoc(Math.max(0, pos - LONGEST), pos);
  const open = /(?<!\\)\{([^{}]*)$/.exec(before);
  if (!open || /\n\s*\n/.test(open[1]) || isVerbatim(state.doc.toString(), pos - open[1].length - 1)) return null;
  const subject = state.facet(editorSubject);
  const colon = open[1].indexOf(":");
  const written = colon < 0 ? open[1] : (/[^,:]*$/.exec(open[1])?.[0] ?? "");
  const from = pos - written.trimStart().length;
  const options = colon < 0 ? cells(subject) : words(open[1].slice(0, colon).trim(), open[1].slice(colon + 1), subject);
  return options.length === 0 ? null : { from, options, validFor: /^[^{},:\n]*$/ };
}

/** As far back as an open brace is looked for. */
const LONGEST = 400;

function isVerbatim(text: string, at: number): boolean {
  const { code, mathematics } = proseSpans(text);
  return [...code, ...mathematics].some(({ from, to }) => from <= at && at < to);
}

function cells({ cellsNow }: EditorSubject): Completion[] {
  return cellsNow()
    .filter(({ kind }) => isQuotable(kind))
    .map(({ name, kind }) => ({ label: name, detail: `${kind} cell`, type: "cell", apply: goingOn(": ") }));
}

/** What may stand at the caret: the words of the cell's kind, or what the word before needs. */
function words(name: string, asked: string, subject: EditorSubject): Completion[] {
  const all = subject.cellsNow();
  const kind = all.find((cell) => cell.name === name)?.kind ?? "";
  if (!isQuotable(kind)) return [];
  const [first = "", ...rest] = asked.split(",").map((word) => word.trim());
  if (rest.length === 0) {
    const { form } = parseCell(kind, all.find((cell) => cell.name === name)?.source ?? "").written;
    const own = QUOTABLE[kind].filter(({ word }) => kind !== "system" || (FORMS[word]?.includes(String(form)) ?? true));
    return own.map(({ word, says, needs }, place) => ({
      label: word,
      // In the order of the vocabulary, what is quoted most first.
      boost: -place,
      detail: says,
      type: "word",
      apply: needs === "nothing" ? word : goingOn(", "),
    }));
  }
  const entry = quotable(kind, first);
  return entry ? after(entry, rest.length, { name, first: rest[0] }, studyOf(subject)) : [];
}

const ALMOST_IDEAL = ["la-aids", "aids", "quaids"];
/** Coefficients that only some systems have. */
const FORMS: Readonly<Record<string, readonly string[]>> = {
  alpha: ALMOST_IDEAL,
  beta: ALMOST_IDEAL,
  gamma: ALMOST_IDEAL,
  lambda: ["quaids"],
  committed: ["les"],
  marginal: ["les", "rotterdam"],
  pi: ["rotterdam"],
  constant: ["easi"],
  price: ["easi"],
};

function studyOf({ cellsNow, uploads }: EditorSubject): QuotedStudy {
  const resolved = resolveCells(cellsNow(), uploads);
  return {
    kinds: new Map(resolved.map(({ name, kind }) => [name, kind ?? ""])),
    specifications: new Map(
      resolved.flatMap(({ name, specification }) => (specification ? [[name, specification] as const] : [])),
    ),
  };
}

const plainOptions = (names: readonly string[], type: string, detail?: string): Completion[] =>
  names.map((name) => ({ label: name, apply: quotedWord(name), type, ...(detail !== undefined && { detail }) }));

/** The `place`-th word after the first, counted from 1. */
function after(
  { needs, parts }: Quotable,
  place: number,
  { name, first }: { readonly name: string; readonly first: string },
  study: QuotedStudy,
): Completion[] {
  if (needs === "hypothesis") {
    if (place === 1) return plainOptions(HYPOTHESIS_NAMES, "word");
    const specification = study.specifications.get(name);
    const system = specification?.kind === "tests" ? study.specifications.get(specification.system ?? "") : undefined;
    const columns = first === "demographics" && system?.kind === "system" ? system.demographics : [];
    return [...plainOptions(QUOTED_STATISTICS, "word"), ...plainOptions(columns, "word", "alone")];
  }
  const own = study.specifications.get(name);
  const isDemographic = needs === "demographic and good";
  if (isDemographic && place === 1) return plainOptions(own?.kind === "system" ? own.demographics : [], "word");
  const goods = place - (isDemographic ? 1 : 0);
  if (goods <= goodsNeeded(needs)) {
    const detail = goods === 2 ? "its price" : "good";
    return plainOptions(goodsOf(name, study) ?? [], "word", detail);
  }
  return parts ? QUOTED_PARTS.map((part) => ({ label: part, detail: PARTS[part], type: "word" })) : [];
}

const PARTS: Readonly<Record<(typeof QUOTED_PARTS)[number], string>> = {
  alone: "without its standard error",
  error: "its standard error alone",
};

/** Writes the word and what comes after it, and offers what may follow. */
function goingOn(next: string): NonNullable<Completion["apply"]> {
  return (view, completion, from, to) => {
    const follows = view.state.sliceDoc(to, to + next.length);
    const insert = completion.label + (follows === next ? "" : next);
    const anchor = from + completion.label.length + next.length;
    view.dispatch({ changes: { from, to, insert }, selection: { anchor }, userEvent: "input.complete" });
    startCompletion(view);
  };
}
