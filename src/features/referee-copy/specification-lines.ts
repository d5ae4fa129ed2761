import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital, listWords } from "../../../shared/study/words.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { equationsNotes } from "../../../shared/tables/equations-sentence.ts";
import { DECIMALS, printCount, printFixed } from "../../../shared/tables/numbers.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";

type Line = readonly [question: string, answer: string | undefined];

/** The specification in words, one line a question. */
export function specificationLines({
  system,
  slutsky,
  program,
  data,
}: SealedContent): [question: string, answer: string][] {
  const { fitted, convergence } = system;
  const form = `${capital(SYSTEMS[fitted.form].longName)}, ${printCount(fitted.goods.length)} goods`;
  const iterations = convergence.iterations === 1 ? "1 iteration" : `${convergence.iterations} iterations`;
  const total = printFixed(slutsky.point.total * slutsky.totalScale, DECIMALS.money);
  const lines: Line[] = [
    ["Form", form],
    ["Price index", fitted.index],
    ...ofForm(system),
    ["Intercepts shift with", listWords(fitted.demographics) || "nothing"],
    ["Imposed", listWords(fitted.imposed) || "nothing"],
    ["Negativity", negativity(system)],
    ["Estimator", `${system.implicit?.method ?? system.estimator}, converged in ${iterations}`],
    ["Standard errors", capital(standardErrorsPhrase(system))],
    ["Evaluated at", `${withArticle(slutsky.pointName)}, expenditure ${total} in the units uploaded`],
    ["Expenditure", expenditure(system)],
    ["Goods not bought", notBought(system)],
    ["Rows", `${printCount(system.rows)}${data.weighted ? ", weighted" : ""}`],
    ["Equations", equationsNotes(system).join(" ") || undefined],
    ["Program", program],
  ];
  return lines.filter((line): line is [string, string] => line[1] !== undefined);
}

/** What only some forms fix beforehand. */
function ofForm({ fitted, implicit }: SystemFinding): Line[] {
  const { form, alpha0, easi } = fitted;
  if (form === "aids" || form === "quaids") return [["α₀", `held at ${String(alpha0).replace("-", "−")}`]];
  if (easi === undefined) return [];
  const real = implicit?.realExpenditure === "approximate" ? "approximate, by mean shares" : "the implicit utility";
  return [
    ["Engel curves", `of degree ${easi.degree} in real expenditure, ${real}`],
    ["Interactions", listWords(easi.interactions) || "none"],
  ];
}

function negativity({ curvature }: SystemFinding): string | undefined {
  if (curvature === undefined) return undefined;
  const at = withArticle(curvature.pointName);
  return curvature.binds
    ? `imposed at ${at}, with rank ${curvature.rank}`
    : `asked for at ${at}, where the estimates have it without being made to`;
}

function expenditure({ endogeneity }: SystemFinding): string {
  if (endogeneity === undefined) return "taken as exogenous";
  const errors = endogeneity.firstStageIgnored ? "; standard errors take the first stage as known" : "";
  return `taken as endogenous, by a control function with ${listWords(endogeneity.instruments)}${errors}`;
}

function notBought({ zeros }: SystemFinding): string | undefined {
  if (zeros === undefined) return undefined;
  const goods = zeros.goods.filter(({ probit }) => probit !== undefined).map(({ good }) => good);
  const errors = zeros.firstStepIgnored ? "; standard errors take the first step as known" : "";
  return `by two steps, a probit first, for ${listWords(goods) || "none of the goods"}${errors}`;
}
