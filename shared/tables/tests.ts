import type { ChiSquareStatistic, MadeTest, TestsFinding, UnmadeTest } from "../schemas/tests.ts";
import { EMPTY, numberCell, textCell } from "./cells.ts";
import { printCount, printProbability, printQuantity } from "./numbers.ts";
import { capital, countedRows } from "./phrases.ts";
import type { LabelledTable, TableCell, TableRow } from "./table.ts";
import type { Verdict } from "./verdicts.ts";

export type AnyTest = TestsFinding["tests"][number];
type Context = Pick<TestsFinding, "level" | "covariance">;

export function isMade(test: AnyTest): test is MadeTest {
  return "wald" in test;
}

/** The hypothesis as it is tested: "no effect of urban". */
export function hypothesisText({ hypothesis, column }: AnyTest): string {
  switch (hypothesis) {
    case "symmetry":
      return "symmetry given homogeneity";
    case "demographics":
      return column === undefined ? "no effect of any demographic" : `no effect of ${column}`;
    case "quadratic terms":
      return "no quadratic terms";
    case "exogeneity":
      return "expenditure is exogenous";
    default:
      return hypothesis;
  }
}

/** "5 per cent". */
export function levelText(level: number): string {
  return `${Number((level * 100).toPrecision(3))} per cent`;
}

/** The test a verdict goes by. */
export interface Deciding {
  /** "Laitinen’s F", "corrected LR", "LR", "Wald", "LM". */
  readonly by: string;
  readonly p: number;
}

const pOf = (statistic: ChiSquareStatistic): number | undefined =>
  "absent" in statistic ? undefined : statistic.pValue;

/** Whether the Wald tests use errors that the likelihood does not know: then they alone are valid. */
export function isRobust({ covariance }: Context): boolean {
  return covariance !== undefined && covariance !== "conventional";
}

/**
 * Wald's where the covariance is robust, and none where there is no Wald test: the others trust equal spread. Otherwise
 * Laitinen's F where there is one; the likelihood ratio, corrected where that changes the answer; failing that
 * whichever there is.
 */
export function decidingTest(test: MadeTest, context: Context): Deciding | undefined {
  const { laitinen } = test;
  const [wald, ratio, corrected, score] = [test.wald, test.likelihoodRatio, test.corrected, test.score].map(pOf);
  if (isRobust(context)) return wald === undefined ? undefined : { by: "Wald", p: wald };
  if (laitinen && !("absent" in laitinen)) return { by: "Laitinen’s F", p: laitinen.pValue };
  if (ratio !== undefined) {
    const differs = corrected !== undefined && corrected < context.level !== ratio < context.level;
    return differs ? { by: "corrected LR", p: corrected } : { by: "LR", p: ratio };
  }
  if (wald !== undefined) return { by: "Wald", p: wald };
  return score === undefined ? undefined : { by: "LM", p: score };
}

export function rejects(test: MadeTest, context: Context): boolean | undefined {
  const deciding = decidingTest(test, context);
  return deciding && deciding.p < context.level;
}

const UNMADE: Readonly<Record<UnmadeTest["because"], Pick<Verdict, "figure" | "word">>> = {
  "by form": { figure: "imposed", word: "by form" },
  "nothing to test": { figure: "not stated", word: "nothing to test" },
  "could not be made": { figure: "not stated", word: "not tested" },
};

/** Figure and word of one hypothesis. */
export function testVerdict(test: AnyTest, context: Context): Pick<Verdict, "figure" | "word"> {
  if (!isMade(test)) return UNMADE[test.because];
  const rejected = rejects(test, context);
  if (rejected === undefined) return UNMADE["could not be made"];
  return rejected ? { figure: "breaks", word: "rejected" } : { figure: "holds here", word: "not rejected" };
}

/** What the tests of one hypothesis mean, in one sentence or two, and no more than they can. */
export function testMeaning(test: AnyTest, context: Context): string {
  if (!isMade(test)) return test.reason;
  const deciding = decidingTest(test, context);
  if (!deciding) return reasonsOf(test)[0] ?? "";
  const at = `at ${levelText(context.level)}`;
  const rejected = deciding.p < context.level;
  return [outcome(test, rejected, at), ...disagreement(test, deciding, context)].join(" ");
}

function outcome({ hypothesis, column }: MadeTest, rejected: boolean, at: string): string {
  const shifting = column ?? "any demographic";
  switch (hypothesis) {
    case "demographics":
      return rejected
        ? `That ${column ?? "demographics"} ${column ? "shifts" : "shift"} no share is rejected ${at}.`
        : `That ${shifting} shifts a share is not shown ${at}; nor is it that none is shifted.`;
    case "quadratic terms":
      return rejected
        ? `Without quadratic terms the system is rejected ${at}.`
        : `The quadratic terms are not told from nought ${at}; that is no proof that they are.`;
    case "exogeneity":
      return rejected
        ? `That total expenditure is exogenous is rejected ${at}, if the instruments are valid.`
        : `That total expenditure is exogenous is not rejected ${at}; that is no proof that it is, nor that the instruments are valid.`;
    default: {
      const name = hypothesis === "symmetry" ? "symmetry given homogeneity" : hypothesis;
      const both = hypothesis === "homogeneity and symmetry";
      return rejected
        ? `The data reject ${name} ${at}.`
        : `The data do not reject ${name} ${at}; that is no proof that ${both ? "they hold" : "it holds"}.`;
    }
  }
}

/** Where small samples or robust errors change the answer of the plain likelihood ratio. */
function disagreement({ likelihoodRatio }: MadeTest, { by, p }: Deciding, { level }: Context): string[] {
  const plain = pOf(likelihoodRatio);
  if (plain === undefined || by === "LR" || plain < level === p < level) return [];
  const verb = plain < level ? "rejects" : "does not reject";
  const why = by === "Wald" ? "it trusts errors of equal spread" : "asymptotic tests reject too often in small samples";
  return [`The plain likelihood ratio ${verb}: ${why}.`];
}

const STATISTICS = [
  ["Wald", "wald"],
  ["LR", "likelihoodRatio"],
  ["LM", "score"],
  ["Corrected LR", "corrected"],
] as const;

/** Why a statistic of a test that was made is missing; each reason once. */
export function reasonsOf(test: MadeTest): string[] {
  const missing = STATISTICS.flatMap(([name, key]) => {
    const statistic = test[key];
    return "absent" in statistic ? [[name as string, statistic.absent] as const] : [];
  });
  const { laitinen } = test;
  if (laitinen && "absent" in laitinen) missing.push(["exact test", laitinen.absent]);
  const reasons = new Map<string, string[]>();
  for (const [name, reason] of missing) reasons.set(reason, [...(reasons.get(reason) ?? []), name]);
  return [...reasons].map(([reason, names]) => `No ${names.join(", ")}: ${reason}`);
}

/** "F(3, 18) 3.09, p 0.053". */
export function laitinenText(test: MadeTest): string | undefined {
  const { laitinen } = test;
  if (!laitinen || "absent" in laitinen) return undefined;
  const degrees = `F(${printCount(laitinen.numerator)}, ${printCount(laitinen.denominator)})`;
  return `${degrees} ${printQuantity(laitinen.f, "fit")}, p ${printProbability(laitinen.pValue)}`;
}

function statisticCells(statistic: ChiSquareStatistic): TableCell[] {
  if ("absent" in statistic) return [EMPTY, EMPTY];
  return [numberCell(statistic.statistic, "fit"), probabilityCell(statistic.pValue)];
}

const probabilityCell = (value: number): TableCell => ({ kind: "number", value, printed: printProbability(value) });

function rowOf(test: AnyTest, context: Context): TableRow {
  const label = capital(hypothesisText(test));
  const { word } = testVerdict(test, context);
  if (!isMade(test)) return { label, cells: [...Array<TableCell>(11).fill(EMPTY), textCell(word)] };
  const { laitinen } = test;
  const f = laitinen && !("absent" in laitinen) ? laitinen : undefined;
  return {
    label,
    cells: [
      numberCell(test.degreesOfFreedom, "fit"),
      ...STATISTICS.flatMap(([, key]) => statisticCells(test[key])),
      ...(f ? [numberCell(f.f, "fit"), probabilityCell(f.pValue)] : [EMPTY, EMPTY]),
      textCell(word),
    ].map((cell, place) => (place === 0 ? { ...cell, printed: printCount(test.degreesOfFreedom) } : cell)),
  };
}

/** Every hypothesis with every statistic, as a paper prints them. */
export function testsTable(finding: TestsFinding): LabelledTable {
  const p = { label: "p" };
  const made = finding.tests.filter(isMade);
  const exact = made.flatMap(({ laitinen }) => (laitinen && !("absent" in laitinen) ? [laitinen] : []));
  return {
    name: "tests",
    title: "Tests of the system’s restrictions",
    corner: "Hypothesis",
    columns: [
      { label: "d.f." },
      ...STATISTICS.flatMap(([label]) => [{ label }, p]),
      { label: "Laitinen F" },
      p,
      { label: `At ${levelText(finding.level)}` },
    ],
    rows: finding.tests.map((test) => rowOf(test, finding)),
    notes: [
      `Wald, likelihood ratio (LR) and score (LM) against χ²; the corrected LR is Italianer’s (1985). ${countedRows(finding.rows)}; all fits by maximum likelihood.`,
      ...exact.map(({ numerator, denominator, approximate, because }) => {
        const kind = approximate ? "approximate" : "exact";
        return `Laitinen’s (1978) F on (${numerator}, ${denominator}) is ${kind}: ${because}.`;
      }),
      ...finding.tests.flatMap((test) => {
        const reasons = isMade(test) ? reasonsOf(test) : [test.reason];
        return reasons.map((reason) => `${capital(hypothesisText(test))}: ${reason}`);
      }),
    ],
  };
}
