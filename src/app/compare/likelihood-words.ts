import { likelihoodRatio } from "../../../shared/economics/likelihood-ratio.ts";
import { type EstimatedSystem, nestingOf } from "../../../shared/study/nesting.ts";
import { capital, listWords } from "../../../shared/study/words.ts";
import { printProbability, printQuantity } from "../../../shared/tables/numbers.ts";

/** The likelihood ratio of two systems in a sentence or two, or why there is none. */
export function likelihoodWords(left: EstimatedSystem, right: EstimatedSystem): string {
  const nesting = nestingOf(left, right);
  if (!nesting.isNested) return `No likelihood ratio is formed: ${nesting.reason}.`;
  const [smaller, larger] = nesting.smaller === "left" ? [left, right] : [right, left];
  try {
    const { statistic, degreesOfFreedom, pValue } = likelihoodRatio(smaller.finding, larger.finding);
    const ratio = `LR ${printQuantity(statistic, "statistic")} on ${degreesOfFreedom} degrees of freedom, p ${printProbability(pValue)}`;
    return `${capital(smaller.name)} is a special case of ${larger.name}: it ${listWords(nesting.tests)}. ${ratio}.`;
  } catch (error) {
    const why = error instanceof RangeError ? error.message : "the ratio cannot be computed";
    return `No likelihood ratio is formed: ${why}.`;
  }
}
