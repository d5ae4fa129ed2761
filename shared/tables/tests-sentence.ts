import type { MadeTest, TestsFinding } from "../schemas/tests.ts";
import { listed } from "./phrases.ts";
import { revealedOf, revealedSentence } from "./revealed-preference.ts";
import { isMade, levelText, rejects } from "./tests.ts";

/** What is rejected, what is not, and what revealed preference says: the head of a tests cell. */
export function testsSentence(finding: TestsFinding): string {
  const rejected = told(finding, true);
  const kept = told(finding, false);
  const at = `at ${levelText(finding.level)}`;
  const subject = rejected.length > 0 ? "They do not reject" : "The data do not reject";
  const proof = `that is no proof of ${kept.length === 1 ? "it" : "them"}`;
  const revealed = revealedOf(finding);
  const sentences = [
    ...(rejected.length > 0 ? [`The data reject ${listed(rejected)} ${at}.`] : []),
    ...(kept.length > 0 ? [`${subject} ${either(kept)}${rejected.length > 0 ? "" : ` ${at}`}; ${proof}.`] : []),
    ...(revealed ? [revealedSentence(revealed)] : []),
  ];
  return sentences.join(" ") || "None of the hypotheses could be tested.";
}

const either = (names: readonly string[]): string =>
  names.length < 2 ? names.join("") : `${names.slice(0, -1).join(", ")} or ${names.at(-1)}`;

/**
 * Hypotheses with one outcome. Demographics tested each alone give way to all of them, and both laws together to
 * the law that has the same outcome already.
 */
function told(finding: TestsFinding, rejected: boolean): string[] {
  const made = finding.tests.filter(isMade);
  const same = made.filter((test) => rejects(test, finding) === rejected);
  const all = made.some(({ hypothesis, column }) => hypothesis === "demographics" && column === undefined);
  const law = same.some(({ hypothesis }) => hypothesis === "homogeneity" || hypothesis === "symmetry");
  return same
    .filter(({ hypothesis, column }) => !(all && hypothesis === "demographics" && column !== undefined))
    .filter(({ hypothesis }) => !(law && hypothesis === "homogeneity and symmetry"))
    .map(nameOf);
}

function nameOf({ hypothesis, column }: MadeTest): string {
  switch (hypothesis) {
    case "symmetry":
      return "symmetry given homogeneity";
    case "homogeneity and symmetry":
      return "homogeneity and symmetry together";
    case "demographics":
      return column === undefined ? "that demographics have no effect" : `that ${column} has no effect`;
    case "quadratic terms":
      return "that there are no quadratic terms";
    case "exogeneity":
      return "that expenditure is exogenous";
    default:
      return hypothesis;
  }
}
