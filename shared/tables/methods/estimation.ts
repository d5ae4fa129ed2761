import type { SystemFinding, SystemSpecification } from "../../schemas/system.ts";
import { printCount, printProbability, printQuantity } from "../numbers.ts";
import { listed } from "../phrases.ts";
import type { ReferenceKey } from "../references.ts";
import { citing, type MethodsParts, type Said, said } from "./parts.ts";

const ESTIMATORS: Readonly<Record<SystemSpecification["estimator"], readonly [string, ...ReferenceKey[]]>> = {
  "least squares": ["least squares, equation by equation"],
  "seemingly unrelated": ["seemingly unrelated regressions", "zellner1962"],
  "iterated seemingly unrelated": ["iterated seemingly unrelated regressions", "zellner1962"],
  "maximum likelihood": ["maximum likelihood, assuming normal errors"],
};

/** How it is estimated and on what, with what is done about zeros and an endogenous total. */
export function estimationSentences(parts: MethodsParts): Said[] {
  const { specification, finding } = parts;
  return [...zeros(specification, finding), ...endogeneity(specification, finding), estimator(parts), ...sample(parts)];
}

function estimator({ specification, finding }: MethodsParts): Said {
  const method = finding?.implicit?.method;
  const isExactEasi = specification.form === "easi" && (specification["real expenditure"] ?? "exact") === "exact";
  // With the implicit utility an estimator's name means something of its own, which the finding says.
  if (isExactEasi && method === undefined) return said(`Estimation is by ${specification.estimator}.`);
  if (method !== undefined && method !== specification.estimator) {
    const cites: ReferenceKey[] = method.includes("three-stage") ? ["zellnerTheil1962"] : [];
    return said(`Estimation is by ${method}${cites.length > 0 ? ` ${citing(...cites)}` : ""}.`, cites);
  }
  const [words, ...cites] = ESTIMATORS[specification.estimator];
  return said(`Estimation is by ${words}${cites.length > 0 ? ` ${citing(...cites)}` : ""}.`, cites);
}

const OBSERVED: Readonly<Record<NonNullable<SystemFinding["equations"]>["explains"], string>> = {
  shares: "",
  expenditures: "",
  "changes of shares": " of changes from one period to the next",
  "contributions to volume": " of changes from one period to the next",
};

function sample({ data, finding }: MethodsParts): Said[] {
  const weight = data?.weight === undefined ? "" : `weighted by ${data.weight}`;
  const normalised =
    data?.normalise === "mean"
      ? [said("Prices and total expenditure are divided by their sample means beforehand.")]
      : [];
  if (finding === undefined) {
    return [...(weight ? [said(`Observations are ${weight}.`)] : []), ...normalised];
  }
  const of = finding.equations ? OBSERVED[finding.equations.explains] : "";
  const rows = `The sample has ${printCount(finding.rows)} observations${of}${weight ? `, ${weight}` : ""}.`;
  return [said(rows), ...normalised];
}

function zeros({ zeros: asked }: SystemSpecification, finding: SystemFinding | undefined): Said[] {
  if (asked === undefined) return [];
  const by =
    asked === "two-step" || asked["two-step"].length === 0
      ? ""
      : `, explained by ${listed(asked["two-step"])} beside prices, expenditure and demographics,`;
  const first = `Goods that are not bought are taken into account by two steps ${citing("shonkwilerYen1999")}: a probit of whether a good is bought at all${by} and then share equations of all goods.`;
  const found = finding?.zeros;
  if (found === undefined) return [said(first, ["shonkwilerYen1999"])];
  const with0 = found.goods.filter(({ probit }) => probit !== undefined).length;
  const second = `There is a probit for ${printCount(with0)} of the ${printCount(found.goods.length)} goods; theory is imposed on the shares of the latent system.`;
  const given = found.firstStepIgnored ? [said("Standard errors take the probits as given.")] : [];
  return [said(first, ["shonkwilerYen1999"]), said(second), ...given];
}

function endogeneity({ instruments }: SystemSpecification, finding: SystemFinding | undefined): Said[] {
  if (instruments === undefined) return [];
  const first = `Total expenditure is taken to be endogenous: the residual of its regression on ${listed(instruments)}, log prices and demographics enters every share equation ${citing("blundellRobin1999")}.`;
  const found = finding?.endogeneity;
  if (found === undefined) return [said(first, ["blundellRobin1999"])];
  const { f } = found.firstStage;
  const strength = `The F of the instruments is ${printQuantity(f.statistic, "statistic")} on ${printCount(f.numerator)} and ${printCount(f.denominator)} degrees of freedom`;
  const { wald, likelihoodRatio, degreesOfFreedom } = found.exogeneity;
  const test = wald ?? likelihoodRatio;
  const name = wald ? "Wald’s statistic" : "the likelihood ratio";
  const exogenous = test
    ? `, and ${name} for exogeneity is ${printQuantity(test.statistic, "statistic")} on ${printCount(degreesOfFreedom)} (p ${printProbability(test.pValue)})`
    : "";
  const given = found.firstStageIgnored ? [said("Standard errors take the first stage as given.")] : [];
  return [said(first, ["blundellRobin1999"]), said(`${strength}${exogenous}.`), ...given];
}
