import type { QuotableWord } from "../../schemas/quotable.ts";
import type { RestrictionTest, SystemFinding } from "../../schemas/system.ts";
import { conditionally } from "../conditional.ts";
import { printCount, printProbability, printQuantity } from "../numbers.ts";
import { withArticle } from "../slutsky-matrix.ts";
import { testOf } from "../verdicts.ts";
import { type Asked, estimateInWords, NothingToQuote, placeAmong, plain, type QuotedAnswer } from "./answer.ts";
import { largestEigenvalue, rowsThatBreak, rowsThatHold } from "./checks.ts";

type Quote = (finding: SystemFinding, asked: Asked) => QuotedAnswer;

/** A coefficient of a block: of a good, and of a price or demographic where the block has columns. */
function coefficient(block: string, sign: string): Quote {
  return ({ coefficients, fitted }, { words, part }) => {
    const own = coefficients.filter((one) => one.block === block);
    if (own.length === 0) throw new NothingToQuote(`The form ${fitted.form} has no ${sign}.`);
    const good = fitted.goods[placeAmong(words[0], fitted.goods, "good")];
    const isByPrice = own.some(({ column }) => column !== undefined);
    const column = isByPrice ? fitted.goods[placeAmong(words[1], fitted.goods, "good")] : undefined;
    const found = own.find((one) => one.good === good && one.column === column);
    if (found === undefined) throw new NothingToQuote(`It has no ${sign} of ${good}.`);
    const of = column === undefined ? good : `${good} and the price of ${column}`;
    return { printed: estimated(found, part), says: `${sign} of ${of}` };
  };
}

function estimated({ estimate, standardError }: SystemFinding["coefficients"][number], part: Asked["part"]): string {
  return estimateInWords({ estimate, error: standardError }, "coefficient", part);
}

/** Of a demographic: its column, then the good. */
const demographic: Quote = ({ coefficients, fitted }, { words, part }) => {
  const name = fitted.demographics[placeAmong(words[0], fitted.demographics, "demographic")];
  const good = fitted.goods[placeAmong(words[1], fitted.goods, "good")];
  const found = coefficients.find((one) => one.block === "demographic" && one.column === name && one.good === good);
  if (found === undefined) throw new NothingToQuote(`It has no coefficient of ${name} for ${good}.`);
  return { printed: estimated(found, part), says: `coefficient of ${name} in the equation of ${good}` };
};

function ofEquation(
  values: readonly number[] | undefined,
  { fitted }: SystemFinding,
  { words }: Asked,
  none: string,
): { readonly good: string; readonly value: number } {
  if (values === undefined) throw new NothingToQuote(none);
  const place = placeAmong(words[0], fitted.goods, "good");
  return { good: fitted.goods[place], value: values[place] };
}

const TESTED: Readonly<Record<string, readonly [RestrictionTest["restriction"], string]>> = {
  homogeneity: ["homogeneity", "homogeneity"],
  symmetry: ["symmetry given homogeneity", "symmetry given homogeneity"],
  quadratic: ["quadratic terms zero", "no quadratic terms"],
};

function ratio(which: keyof typeof TESTED, give: "p" | "statistic"): Quote {
  const [restriction, words] = TESTED[which];
  return ({ tests, untested }) => {
    const test = testOf(restriction, tests);
    const reason = untested?.find((one) => one.restriction === restriction)?.reason;
    if (test === undefined) throw new NothingToQuote(`It has no test of ${words}${reason ? `: ${reason}` : ""}.`);
    const assumes = test.assumes ? ", assuming conventional errors" : "";
    if (give === "p") {
      return { printed: printProbability(test.pValue), says: `p of the likelihood ratio for ${words}${assumes}` };
    }
    const says = `likelihood ratio for ${words} on ${test.degreesOfFreedom} degrees of freedom${assumes}`;
    return { printed: printQuantity(test.statistic, "statistic"), says };
  };
}

/** Wald's, which has the standard errors asked for; the likelihood ratio where there is none. */
function exogeneity({ endogeneity }: SystemFinding) {
  if (endogeneity === undefined) throw new NothingToQuote("Total expenditure has no instruments.");
  const { wald, likelihoodRatio, degreesOfFreedom } = endogeneity.exogeneity;
  const test = wald ?? likelihoodRatio;
  if (test === undefined) throw new NothingToQuote("Exogeneity could not be tested.");
  return { ...test, name: wald ? "Wald's statistic" : "likelihood ratio", degreesOfFreedom };
}

function criterion(name: "aic" | "bic", says: string): Quote {
  return ({ [name]: value }) => {
    if (value === undefined) throw new NothingToQuote("Its likelihood is not at the maximum, so it has no criterion.");
    return { printed: printQuantity(value, "statistic"), says };
  };
}

/** Numbers of a system cell. */
export const SYSTEM_QUOTES: { readonly [W in QuotableWord<"system">]: Quote } = {
  eta: ({ expenditureElasticities, checks, conditionalOn }, { words, part }) => {
    const goods = expenditureElasticities.map(({ good }) => good);
    const { good, estimate, standardError } = expenditureElasticities[placeAmong(words[0], goods, "good")];
    return {
      printed: estimateInWords({ estimate, error: standardError }, "elasticity", part),
      says: `expenditure elasticity of ${good} at ${withArticle(checks.pointName)}${conditionally({ conditionalOn })}`,
    };
  },
  alpha: coefficient("alpha", "α"),
  beta: coefficient("beta", "β"),
  gamma: coefficient("gamma", "γ"),
  lambda: coefficient("lambda", "λ"),
  committed: coefficient("committed", "committed quantity c"),
  marginal: coefficient("marginal", "marginal budget share"),
  pi: coefficient("slutsky", "π"),
  constant: coefficient("constant", "b₀"),
  price: coefficient("price", "a"),
  demographic,
  "log likelihood": ({ logLikelihood }) => ({
    printed: printQuantity(logLikelihood, "statistic"),
    says: "log-likelihood",
  }),
  aic: criterion("aic", "Akaike’s criterion"),
  bic: criterion("bic", "Bayesian criterion"),
  r2: (finding, asked) => {
    const { good, value } = ofEquation(finding.rSquared, finding, asked, "");
    return { printed: printQuantity(value, "fit"), says: `R² of ${good}` };
  },
  "system r2": ({ systemRSquared }) => ({ printed: printQuantity(systemRSquared, "fit"), says: "R² of the system" }),
  "durbin-watson": (finding, asked) => {
    const { good, value } = ofEquation(finding.durbinWatson, finding, asked, "Its data name no time column.");
    return { printed: printQuantity(value, "fit"), says: `Durbin–Watson statistic of ${good}` };
  },
  rows: ({ rows }) => ({ printed: printCount(rows), says: "rows of the equations" }),
  parameters: ({ freeCoefficients }) => ({ printed: printCount(freeCoefficients), says: "free coefficients" }),
  clusters: ({ clusters }) => {
    if (clusters === undefined) throw new NothingToQuote("Its standard errors have no clusters.");
    return { printed: printCount(clusters.count), says: `clusters by ${clusters.column}` };
  },
  "homogeneity p": ratio("homogeneity", "p"),
  "homogeneity statistic": ratio("homogeneity", "statistic"),
  "symmetry p": ratio("symmetry", "p"),
  "symmetry statistic": ratio("symmetry", "statistic"),
  "quadratic p": ratio("quadratic", "p"),
  "quadratic statistic": ratio("quadratic", "statistic"),
  "exogeneity p": (finding) => {
    const { pValue, name } = exogeneity(finding);
    return {
      printed: printProbability(pValue),
      says: `p of ${plain(name) === "likelihood ratio" ? "the " : ""}${name} for exogeneity`,
    };
  },
  "exogeneity statistic": (finding) => {
    const { statistic, name, degreesOfFreedom } = exogeneity(finding);
    const says = `${name} for exogeneity on ${degreesOfFreedom} degrees of freedom`;
    return { printed: printQuantity(statistic, "statistic"), says };
  },
  "first stage f": ({ endogeneity }) => {
    if (endogeneity === undefined) throw new NothingToQuote("Total expenditure has no instruments.");
    const { statistic, numerator, denominator } = endogeneity.firstStage.f;
    const says = `F of the instruments on ${printCount(numerator)} and ${printCount(denominator)} degrees of freedom`;
    return { printed: printQuantity(statistic, "statistic"), says };
  },
  "largest eigenvalue": ({ checks }, asked) => largestEigenvalue(checks, asked),
  "rows that hold": ({ checks }) => rowsThatHold(checks),
  "rows that break": ({ checks }) => rowsThatBreak(checks),
};
