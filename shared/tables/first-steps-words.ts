import type { Endogeneity, ZerosFinding } from "../schemas/first-steps.ts";
import type { SystemFinding } from "../schemas/system.ts";
import { DECIMALS, printCount, printFixed, printProbability } from "./numbers.ts";

/** Below this F instruments are called weak: a rule of thumb (Staiger & Stock 1997, Econometrica 65, 557–586). */
const WEAK_BELOW = 10;
const REJECTED_BELOW = 0.05;

const statistic = (value: number) => printFixed(value, DECIMALS.statistic);

function isWeak({ firstStage }: Endogeneity): boolean {
  return firstStage.f.statistic < WEAK_BELOW;
}

/** The test that decides: Wald's, which has the standard errors asked for; the likelihood ratio where there is none. */
function decidingTest({ exogeneity: { wald, likelihoodRatio } }: Endogeneity) {
  if (wald !== undefined) return { name: "Wald", ...wald };
  return likelihoodRatio && { name: "LR", ...likelihoodRatio };
}

function isExogeneityRejected(endogeneity: Endogeneity): boolean {
  const test = decidingTest(endogeneity);
  return test !== undefined && test.pValue < REJECTED_BELOW;
}

/** For the sentence at the head: weak instruments, and exogeneity where it is rejected; nothing else. */
export function endogeneityHeadline({ endogeneity }: Pick<SystemFinding, "endogeneity">): string[] {
  if (endogeneity === undefined) return [];
  return [
    ...(isWeak(endogeneity)
      ? [`The instruments of total expenditure are weak: F is ${statistic(endogeneity.firstStage.f.statistic)}.`]
      : []),
    ...(isExogeneityRejected(endogeneity)
      ? ["That total expenditure is exogenous is rejected, if the instruments are valid."]
      : []),
  ];
}

/** What the first stage and the test of exogeneity say, and what they cannot. */
export function endogeneitySentences(endogeneity: Endogeneity): string[] {
  const { instruments, firstStage, firstStageIgnored } = endogeneity;
  const { statistic: f, numerator, denominator, pValue } = firstStage.f;
  const many = instruments.length > 1;
  return [
    `F of the ${many ? `${printCount(instruments.length)} instruments` : "instrument"} in the first stage is ${statistic(f)} on ${printCount(numerator)} and ${printCount(denominator)} degrees of freedom, p ${printProbability(pValue)}; partial R² ${printFixed(firstStage.partialRSquared, DECIMALS.fit)}.`,
    ...(isWeak(endogeneity)
      ? [
          `By the rule of thumb of Staiger and Stock (1997), an F of at least ${WEAK_BELOW}, the ${many ? "instruments are" : "instrument is"} weak: the estimates may lean towards those without, and their standard errors say too little.`,
        ]
      : []),
    exogeneitySentence(endogeneity),
    `Nothing here tests whether the ${many ? "instruments are" : "instrument is"} valid.`,
    firstStageIgnored
      ? "The standard errors take the residual of the first stage as data; only those of the bootstrap estimate it again in every replicate."
      : "The bootstrap estimates the first stage again in every replicate.",
  ];
}

function exogeneitySentence(endogeneity: Endogeneity): string {
  const test = decidingTest(endogeneity);
  if (test === undefined) return "Exogeneity of total expenditure could not be tested.";
  const { degreesOfFreedom } = endogeneity.exogeneity;
  const at = `at 5 per cent (${test.name} ${statistic(test.statistic)} on ${degreesOfFreedom} degrees of freedom, p ${printProbability(test.pValue)})`;
  return isExogeneityRejected(endogeneity)
    ? `That total expenditure is exogenous is rejected ${at}, if the instruments are valid.`
    : `That total expenditure is exogenous is not rejected ${at}; that is no proof that it is.`;
}

/** What the two steps impose and on what, and what no table of this system claims. */
export function zerosSentences({ predictedSum, firstStepIgnored }: ZerosFinding): string[] {
  const sum = (value: number) => printFixed(value, DECIMALS.share);
  return [
    "Adding-up and the restrictions imposed hold for the latent shares f, those before some goods are not bought.",
    `Expected shares Φf + δφ need not add to one: over the rows they sum to between ${sum(predictedSum.lowest)} and ${sum(predictedSum.highest)}, on average to ${sum(predictedSum.mean)}. Observed shares do add to one, so the equations of all goods are weighed by their differences from the mean over goods.`,
    "Elasticities, the Slutsky matrix and the checks are those of f, not responses of expected purchases.",
    firstStepIgnored
      ? "The standard errors take the probits as data; only those of the bootstrap estimate them again in every replicate."
      : "The bootstrap estimates the probits again in every replicate.",
  ];
}
