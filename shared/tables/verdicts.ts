import type { TheoryChecks } from "../schemas/checks.ts";
import type { SlutskyFinding } from "../schemas/slutsky.ts";
import type { RestrictionTest, SystemFinding } from "../schemas/system.ts";
import { DECIMALS, printCount, printPercent, printProbability, printQuantity, printSize } from "./numbers.ts";
import { countedRows, everyRow, intervalInWords } from "./phrases.ts";

export const VERDICT_FIGURES = ["holds", "imposed", "holds here", "breaks", "not stated"] as const;

/** What theory says of a finding in one law: a figure, a word beside it, a number or the reason below. */
export interface Verdict {
  readonly law: "Adding-up" | "Homogeneity" | "Symmetry" | "Negativity" | "Monotonicity";
  readonly figure: (typeof VERDICT_FIGURES)[number];
  readonly word: string;
  readonly note: string;
}

export interface VerdictOptions {
  /** Statistics and sizes in full, as an opened cell and a referee copy have them. */
  readonly detail?: boolean;
}

/** A test rejects below this probability. */
export const REJECTED_BELOW = 0.05;

/** The five verdicts, always all and always in this order. A law that is imposed is never said to hold. */
export function verdictsOf(
  checks: TheoryChecks,
  tests: readonly RestrictionTest[],
  { detail = false }: VerdictOptions = {},
): Verdict[] {
  return [
    addingUp(checks, detail),
    restricted("Homogeneity", checks.homogeneity, testOf("homogeneity", tests), detail),
    restricted("Symmetry", checks.symmetry, testOf("symmetry given homogeneity", tests), detail),
    negativity(checks, detail),
    monotonicity(checks, detail),
  ];
}

/** Of a system, briefly. */
export function systemVerdicts({ checks, tests }: Pick<SystemFinding, "checks" | "tests">): Verdict[] {
  return verdictsOf(checks, tests);
}

/** Of a matrix at its point, with statistics and sizes. */
export function slutskyVerdicts({ at, tests }: Pick<SlutskyFinding, "at" | "tests">): Verdict[] {
  return verdictsOf(at.checks, tests, { detail: true });
}

export function testOf(restriction: RestrictionTest["restriction"], tests: readonly RestrictionTest[]) {
  return tests.find((test) => test.restriction === restriction);
}

/** The probability a verdict goes by: Laitinen's where there is one, Italianer's where it changes the answer. */
export function deciding(test: RestrictionTest): {
  readonly kind: "exact" | "plain" | "corrected";
  readonly p: number;
} {
  if (test.exact) return { kind: "exact", p: test.exact.pValue };
  const isSame = test.pValue < REJECTED_BELOW === test.corrected.pValue < REJECTED_BELOW;
  return isSame ? { kind: "plain", p: test.pValue } : { kind: "corrected", p: test.corrected.pValue };
}

export function isRejected(test: RestrictionTest | undefined): boolean {
  return test !== undefined && decides(test) && deciding(test).p < REJECTED_BELOW;
}

/** A ratio that assumes other errors than the cell asks for decides nothing; Wald's of a tests cell does. */
export function decides(test: RestrictionTest): boolean {
  return test.assumes === undefined;
}

function addingUp({ addingUp: { size, holds } }: TheoryChecks, detail: boolean): Verdict {
  const note = detail || !holds ? `largest column sum ${printSize(size)}` : "by construction";
  return { law: "Adding-up", figure: holds ? "holds" : "breaks", word: holds ? "holds" : "breaks", note };
}

function restricted(
  law: "Homogeneity" | "Symmetry",
  { size, holds, status }: TheoryChecks["homogeneity"],
  test: RestrictionTest | undefined,
  detail: boolean,
): Verdict {
  if (status !== "free") {
    if (!holds) return { law, figure: "breaks", word: "breaks", note: `imposed, yet off by ${printSize(size)}` };
    const untested = status === "by form" ? "by the form itself" : "not tested";
    return { law, figure: "imposed", word: "imposed", note: test ? testNote(test, detail, "test") : untested };
  }
  if (!test) return { law, figure: "not stated", word: "not tested", note: `off by ${printSize(size)}` };
  if (!decides(test)) return { law, figure: "not stated", word: "not tested", note: testNote(test, detail, "test") };
  const rejected = isRejected(test);
  return {
    law,
    figure: rejected ? "breaks" : "holds here",
    word: rejected ? "rejected" : "not rejected",
    note: testNote(test, detail || rejected, "test"),
  };
}

/** "test p 0.286", "LR 6.2 on 5, p 0.286", "Laitinen p 0.072". */
function testNote(test: RestrictionTest, detail: boolean, short: string): string {
  if (!decides(test)) return "Wald by a tests cell";
  const { kind, p } = deciding(test);
  const probability = `p ${printProbability(p)}`;
  if (kind === "exact") return `Laitinen ${probability}`;
  const statistic = kind === "corrected" ? test.corrected.statistic : test.statistic;
  const ratio = `LR ${printQuantity(statistic, "statistic")} on ${test.degreesOfFreedom}`;
  const corrected = kind === "corrected" ? "corrected " : "";
  return detail ? `${corrected}${ratio}, ${probability}` : `${corrected || `${short} `}${probability}`;
}

function negativity({ negativity: law, sample, pointName }: TheoryChecks, detail: boolean): Verdict {
  const named = { law: "Negativity" } as const;
  if (!law.stated || law.largest === undefined) {
    return { ...named, figure: "not stated", word: "not stated", note: "needs homogeneity" };
  }
  const error = law.standardError === undefined ? "" : ` (${printQuantity(law.standardError, "entry")})`;
  const interval = law.interval ? `, ${intervalInWords(law.interval, DECIMALS.entry)}` : "";
  const largest = `largest ${printQuantity(law.largest, "entry")}${error}${interval}`;
  if (!law.holds) return { ...named, figure: "breaks", word: "breaks", note: largest };
  return { ...named, ...overSample(pointName, sample?.negativity, sample, largest, detail) };
}

function monotonicity({ monotonicity: law, sample, pointName }: TheoryChecks, detail: boolean): Verdict {
  const named = { law: "Monotonicity" } as const;
  const range = `shares ${printQuantity(law.lowest, "deviation")} to ${printQuantity(law.highest, "deviation")}`;
  if (!law.holds) return { ...named, figure: "breaks", word: "breaks", note: range };
  return { ...named, ...overSample(pointName, sample?.monotonicity, sample, range, detail) };
}

/** A law that holds at the point: everywhere, or not. */
function overSample(
  pointName: string,
  counts: { readonly breaks: number; readonly weightedShareThatHolds: number } | undefined,
  sample: TheoryChecks["sample"],
  otherwise: string,
  detail: boolean,
): Pick<Verdict, "figure" | "word" | "note"> {
  if (!counts || sample === undefined) return { figure: "holds here", word: atPoint(pointName), note: otherwise };
  const { rows, undefined: without, equations } = sample;
  const nowhere = without && `not defined in ${printCount(without.rows)}`;
  if (counts.breaks === 0) {
    if (nowhere) return { figure: "holds here", word: atPoint(pointName), note: `${nowhere} of ${countedRows(rows)}` };
    return { figure: "holds", word: "holds", note: `in ${everyRow(rows)}${beside(equations)}` };
  }
  const broken = 1 - counts.weightedShareThatHolds - (without?.weightedShare ?? 0);
  const isWeighted = Math.abs(broken - counts.breaks / rows) > 1e-9;
  const share = detail ? `, ${printPercent(broken)}${isWeighted ? " by weight" : ""}` : "";
  const breaks = `breaks in ${countedRows(counts.breaks)}${share}`;
  return { figure: "holds here", word: atPoint(pointName), note: [breaks, ...(nowhere ? [nowhere] : [])].join("; ") };
}

/** Laws stand at levels: rows that no equation explains, having none before them, are counted among them. */
function beside(equations: number | undefined): string {
  return equations === undefined ? "" : ` used, where T is ${printCount(equations)}`;
}

/** Short enough to stand beside its figure: "at base point", "at the mean", "at this point". */
function atPoint(pointName: string): string {
  if (pointName === "mean") return "at the mean";
  if (pointName === "a point of one's own") return "at this point";
  return `at ${pointName.replace(" of expenditure", "")}`;
}
