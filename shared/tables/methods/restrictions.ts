import type { RestrictionTest, SystemFinding } from "../../schemas/system.ts";
import { citedInText } from "../cite.ts";
import { printCount, printProbability, printQuantity } from "../numbers.ts";
import { capital, listed } from "../phrases.ts";
import type { ReferenceKey } from "../references.ts";
import { withArticle } from "../slutsky-matrix.ts";
import { deciding } from "../verdicts.ts";
import { citing, inWords, type MethodsParts, type Said, said } from "./parts.ts";

/** What theory is imposed, and what the data say of it where the finding holds a test. */
export function restrictionSentences({ specification, finding }: MethodsParts): Said[] {
  const { impose, form } = specification;
  return [
    said(form === "les" ? BY_FORM : imposedSentence(impose)),
    ...(finding ? testSentences(finding) : []),
    ...curvatureSentence(specification.curvature, finding?.curvature),
  ];
}

const BY_FORM = "Adding-up, homogeneity and symmetry hold by the form.";

function imposedSentence(impose: readonly string[]): string {
  const open = ["homogeneity", "symmetry"].filter((law) => !impose.includes(law));
  if (open.length === 0) return "Homogeneity and symmetry are imposed.";
  if (open.length === 2) return "Neither homogeneity nor symmetry is imposed.";
  return "Homogeneity is imposed, symmetry is not.";
}

const HYPOTHESES: Readonly<Record<RestrictionTest["restriction"], string>> = {
  homogeneity: "homogeneity",
  "symmetry given homogeneity": "symmetry given homogeneity",
  "quadratic terms zero": "the absence of quadratic terms",
};

function testSentences({ tests }: SystemFinding): Said[] {
  if (tests.length === 0) return [];
  const told = tests.map(testWords);
  const assumed = tests.some(({ assumes }) => assumes !== undefined)
    ? "; these ratios assume independent errors of equal spread"
    : "";
  const sentence = `${capital(listed(told.map((one) => one.sentence)))}${assumed}.`;
  return [
    said(
      sentence,
      told.flatMap(({ cites }) => cites),
    ),
  ];
}

/** "homogeneity has a likelihood ratio of 6.2 on 5 degrees of freedom (p 0.286)". */
function testWords(test: RestrictionTest): Said {
  const { restriction, degreesOfFreedom, statistic, pValue, corrected, exact } = test;
  const name = HYPOTHESES[restriction];
  if (exact) {
    const near = exact.approximate ? "approximate " : "";
    const on = `${printCount(exact.numerator)} and ${printCount(exact.denominator)} degrees of freedom`;
    const f = `${printQuantity(exact.f, "statistic")} on ${on} (p ${printProbability(exact.pValue)})`;
    return said(`${name} has by the ${near}test of ${citedInText("laitinen1978")} an F of ${f}`, ["laitinen1978"]);
  }
  const isCorrected = deciding(test).kind === "corrected";
  const shown = isCorrected ? corrected : { statistic, pValue };
  const cites: ReferenceKey[] = isCorrected ? ["italianer1985"] : [];
  const by = isCorrected ? `, corrected by ${citedInText("italianer1985")},` : "";
  const ratio = `${printQuantity(shown.statistic, "statistic")} on ${printCount(degreesOfFreedom)} degrees of freedom`;
  return said(`${name} has a likelihood ratio${by} of ${ratio} (p ${printProbability(shown.pValue)})`, cites);
}

const CURVATURE: readonly ReferenceKey[] = ["diewertWales1987", "moschini1998", "ryanWales1998"];

function curvatureSentence(
  asked: MethodsParts["specification"]["curvature"],
  found: SystemFinding["curvature"],
): Said[] {
  if (asked === undefined) return [];
  const at = typeof asked.at === "string" ? withArticle(asked.at) : `row ${printCount(asked.at.row)}`;
  const rank = asked.rank === undefined ? "" : `, with a Slutsky matrix of rank at most ${inWords(asked.rank)}`;
  const imposed = said(`Negativity is imposed at ${at}${rank} ${citing(...CURVATURE)}.`, CURVATURE);
  if (found === undefined) return [imposed];
  const became = found.binds
    ? `It binds there: the rank of the estimate is ${inWords(found.rank)}`
    : "The estimates satisfy it there without being made to";
  const loss =
    found.binds && found.loss > 0 ? `, and the log-likelihood is lower by ${printQuantity(found.loss, "fit")}` : "";
  return [imposed, said(`${capital(became)}${loss}.`)];
}
