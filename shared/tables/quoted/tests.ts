import { QUOTED_STATISTICS, type QuotableWord, type QuotedStatistic } from "../../schemas/quotable.ts";
import type { MadeTest, TestsFinding } from "../../schemas/tests.ts";
import { printCount, printFixed, printProbability, printQuantity } from "../numbers.ts";
import { type Asked, NothingToQuote, plain, type QuotedAnswer } from "./answer.ts";

type Quote = (finding: TestsFinding, asked: Asked) => QuotedAnswer;

/** The hypothesis asked for, which is tested; of demographics one column alone where it is named. */
function testedOf({ tests }: TestsFinding, words: readonly string[]): MadeTest {
  const [hypothesis = "", ...rest] = words.map(plain);
  const column = rest.find((word) => !QUOTED_STATISTICS.some((one) => one === word));
  const own = tests.filter((test) => test.hypothesis === hypothesis);
  const found = own.find((test) => (test.column === undefined ? column === undefined : plain(test.column) === column));
  if (found === undefined) {
    throw new NothingToQuote(`It does not test ${hypothesis || "that"}${column ? ` of ${column}` : ""}.`);
  }
  if ("because" in found) throw new NothingToQuote(`${hypothesis} has no test: ${found.reason}`);
  return found;
}

const IN_TEST: Readonly<Record<QuotedStatistic, "wald" | "likelihoodRatio" | "score" | "corrected" | "laitinen">> = {
  wald: "wald",
  "likelihood ratio": "likelihoodRatio",
  score: "score",
  corrected: "corrected",
  laitinen: "laitinen",
};

const NAMES: Readonly<Record<QuotedStatistic, string>> = {
  wald: "Wald statistic",
  "likelihood ratio": "likelihood ratio",
  score: "score statistic",
  corrected: "likelihood ratio corrected by Italianer",
  laitinen: "Laitinen’s T²",
};

function statisticOf(test: MadeTest, words: readonly string[]) {
  const which = QUOTED_STATISTICS.find((one) => words.some((word) => plain(word) === one)) ?? "wald";
  const found = test[IN_TEST[which]];
  const of = `${test.hypothesis}${test.column === undefined ? "" : ` of ${test.column}`}`;
  if (found === undefined) throw new NothingToQuote(`${of} has no ${NAMES[which]}.`);
  if ("absent" in found) throw new NothingToQuote(`${of} has no ${NAMES[which]}: ${found.absent}`);
  const value = "tSquared" in found ? found.tSquared : found.statistic;
  return { value, pValue: found.pValue, name: NAMES[which], of };
}

function revealedOf({ revealed }: TestsFinding) {
  if (revealed === undefined) throw new NothingToQuote("It does not test revealed preference.");
  if ("absent" in revealed) throw new NothingToQuote(`It has no test of revealed preference: ${revealed.absent}`);
  return revealed;
}

/** Numbers of a tests cell. */
export const TESTS_QUOTES: { readonly [W in QuotableWord<"tests">]: Quote } = {
  p: (finding, { words }) => {
    const { pValue, name, of } = statisticOf(testedOf(finding, words), words);
    return { printed: printProbability(pValue), says: `p of ${of}, by the ${name}` };
  },
  statistic: (finding, { words }) => {
    const test = testedOf(finding, words);
    const { value, name, of } = statisticOf(test, words);
    const says = `${name} for ${of} on ${test.degreesOfFreedom} degrees of freedom`;
    return { printed: printQuantity(value, "statistic"), says };
  },
  "degrees of freedom": (finding, { words }) => {
    const test = testedOf(finding, words);
    return { printed: printCount(test.degreesOfFreedom), says: `degrees of freedom of ${test.hypothesis}` };
  },
  afriat: (finding) => ({
    printed: printFixed(revealedOf(finding).index, 4),
    says: "Afriat’s critical cost efficiency index",
  }),
  violations: (finding) => ({
    printed: printCount(revealedOf(finding).pairs),
    says: "pairs of rows that violate revealed preference",
  }),
};
