import { describe, expect, it } from "vitest";
import { dataSpecification } from "../../../../shared/schemas/data.ts";
import { type SystemFinding, systemSpecification } from "../../../../shared/schemas/system.ts";
import {
  methodsParagraph,
  paragraphBibtex,
  paragraphWithReferences,
} from "../../../../shared/tables/methods/paragraph.ts";
import { exampleFindings } from "../../../support/findings.ts";

const GOODS = Object.fromEntries(["a", "b", "c", "d", "e", "f"].map((good) => [good, { price: "p", quantity: "q" }]));
const data = dataSpecification.parse({ kind: "data", upload: "u.csv", goods: GOODS, cluster: "village" });
const { system } = exampleFindings();

const IMPOSED = { impose: ["homogeneity", "symmetry"] };
function said(asked: Record<string, unknown>, finding?: Partial<SystemFinding>, on: typeof data | undefined = data) {
  const specification = systemSpecification.parse({ kind: "system", data: "survey", form: "aids", ...asked });
  return methodsParagraph({
    specification,
    ...(on && { data: on }),
    ...(finding && { finding: { ...system, ...finding } }),
  });
}

const test = {
  restriction: "homogeneity",
  statistic: 7.4,
  degreesOfFreedom: 5,
  pValue: 0.192,
  corrected: { statistic: 7.1, pValue: 0.21 },
} as const;

describe("a methods paragraph", () => {
  it("says in full what a plain specification asks", () => {
    expect(said({ ...IMPOSED, demographics: ["log_size", "urban"] }).text).toBe(
      "We estimate an almost ideal demand system (Deaton and Muellbauer 1980) for six goods, with log_size and urban shifting the intercepts. The constant α₀ of the price index is fixed at 0. Homogeneity and symmetry are imposed. Estimation is by maximum likelihood, assuming normal errors. Prices and total expenditure are divided by their sample means beforehand. Standard errors are conventional.",
    );
  });

  it.each([
    [
      { form: "la-aids" },
      "linear approximate almost ideal demand system (Deaton and Muellbauer 1980) with the log-linear Törnqvist price index (Moschini 1995)",
    ],
    [{ form: "la-aids", index: "stone" }, "with Stone’s price index (Stone 1954)"],
    [{ form: "la-aids", index: "lagged stone" }, "(Eales and Unnevehr 1988)"],
    [
      { form: "la-aids", index: "paasche", differences: true },
      "in first differences with the log-linear Paasche price index",
    ],
    [
      { form: "quaids", alpha0: -1 },
      "a quadratic almost ideal demand system (Banks, Blundell and Lewbel 1997) for six goods. The constant α₀ of the price index is fixed at −1.",
    ],
    [
      { form: "les" },
      "a linear expenditure system (Stone 1954) in budget shares for six goods. Adding-up, homogeneity and symmetry hold by the form.",
    ],
    [
      { form: "les", errors: "expenditures", demographics: ["n"] },
      "in expenditures for six goods, with n shifting the committed quantities (Pollak and Wales 1981)",
    ],
    [
      { form: "easi" },
      "an EASI demand system (Lewbel and Pendakur 2009) with Engel curves of degree three for six goods. Real expenditure is the implicit utility of the system itself; no products",
    ],
    [
      { form: "easi", degree: 5, "real expenditure": "approximate", interactions: ["prices with expenditure"] },
      "Real expenditure is approximated with mean budget shares; products of prices with expenditure enter.",
    ],
    [
      { form: "rotterdam", demographics: ["n"] },
      "a Rotterdam system (Theil 1965; Barten 1966) for six goods, with n entering every equation",
    ],
    [{ impose: ["homogeneity"] }, "Homogeneity is imposed, symmetry is not."],
    [{}, "Neither homogeneity nor symmetry is imposed."],
    [{ estimator: "least squares" }, "Estimation is by least squares, equation by equation."],
    [{ estimator: "seemingly unrelated" }, "by seemingly unrelated regressions (Zellner 1962)."],
    [{ estimator: "iterated seemingly unrelated" }, "by iterated seemingly unrelated regressions (Zellner 1962)."],
    [
      { season: { period: 12 }, trend: true },
      "Besides, dummies for a season of twelve periods and a linear trend enter every equation.",
    ],
    [
      { season: { period: 52, harmonics: 2 } },
      "Besides, two harmonics of a season of 52 periods enter every equation.",
    ],
    [{ trend: true }, "Besides, a linear trend enters every equation."],
    [{ "standard errors": "heteroskedastic" }, "robust to heteroskedasticity (White 1980)."],
    [
      { "standard errors": { cluster: "village" } },
      "allow for correlation within clusters of village (Liang and Zeger 1986).",
    ],
    [{ "standard errors": { bootstrap: "rows" } }, "a bootstrap of rows (Efron 1979) with 500 replicates (seed 1)."],
    [{ "standard errors": { bootstrap: "clusters" } }, "a bootstrap of clusters of village (Efron 1979)"],
    [
      { "standard errors": { bootstrap: "blocks", block: 4 } },
      "a bootstrap of moving blocks of 4 periods (Künsch 1989)",
    ],
    [
      { instruments: ["income"] },
      "Total expenditure is taken to be endogenous: the residual of its regression on income, log prices and demographics enters every share equation (Blundell and Robin 1999).",
    ],
    [
      { zeros: { "two-step": ["urban"] } },
      "two steps (Shonkwiler and Yen 1999): a probit of whether a good is bought at all, explained by urban beside",
    ],
    [
      { ...IMPOSED, curvature: { at: "base point", rank: 3 } },
      "Negativity is imposed at the base point, with a Slutsky matrix of rank at most three (Diewert and Wales 1987; Moschini 1998; Ryan and Wales 1998).",
    ],
    [{ ...IMPOSED, curvature: { at: { row: 76 } } }, "Negativity is imposed at row 76 (Diewert"],
  ])("of %j says so", (asked, words) => expect(said(asked).text).toContain(words));

  it("lists every work it names, once, by author and year, and no other", () => {
    const { text, references } = said({
      ...IMPOSED,
      curvature: { at: "mean" },
      "standard errors": { cluster: "village" },
    });
    const whole = paragraphWithReferences({ text, references });
    expect(references).toEqual([
      "deatonMuellbauer1980",
      "diewertWales1987",
      "liangZeger1986",
      "moschini1998",
      "ryanWales1998",
    ]);
    for (const [, family, year] of text.matchAll(/([A-Z][a-zü]+)(?: and [A-Z][a-z]+)? (\d{4})/g)) {
      expect(whole.split("References")[1]).toMatch(new RegExp(`${family}.*\\(${year}\\)`));
    }
    expect(whole).toContain(
      "Deaton, A. and Muellbauer, J. (1980). An almost ideal demand system. American Economic Review 70(3), 312–326.",
    );
    expect(paragraphBibtex({ text, references })).toContain("@article{ryanWales1998,");
  });

  it("has numbers only where a finding has them", () => {
    expect(said({ ...IMPOSED, curvature: { at: "base point" } }).text).not.toMatch(
      /observations|degrees of freedom|binds/,
    );
    const { text, references } = said(
      { ...IMPOSED, "standard errors": { cluster: "village" } },
      { rows: 4812, tests: [test], clusters: { column: "village", count: 212 } },
    );
    expect(text).toContain("Homogeneity has a likelihood ratio of 7.4 on 5 degrees of freedom (p 0.192).");
    expect(text).toContain("The sample has 4,812 observations.");
    expect(text).toContain("within the 212 clusters of village (Liang and Zeger 1986).");
    expect(references).toEqual(["deatonMuellbauer1980", "liangZeger1986"]);
    expect(said({}, { tests: [] }).text).not.toContain("likelihood ratio");
  });

  it("goes by the corrected ratio, or by Laitinen's, where the verdicts do", () => {
    const corrected = said(IMPOSED, { tests: [{ ...test, pValue: 0.04, corrected: { statistic: 10, pValue: 0.07 } }] });
    expect(corrected.text).toContain(
      "a likelihood ratio, corrected by Italianer (1985), of 10.0 on 5 degrees of freedom (p 0.070)",
    );
    expect(corrected.references).toContain("italianer1985");
    const f = { tSquared: 10.3, f: 3.1, numerator: 3, denominator: 18, pValue: 0.053, approximate: true };
    const exact = said({}, { tests: [{ ...test, exact: f }] });
    expect(exact.text).toContain(
      "Homogeneity has by the approximate test of Laitinen (1978) an F of 3.1 on 3 and 18 degrees of freedom (p 0.053).",
    );
    const assuming = said(IMPOSED, { tests: [{ ...test, assumes: "conventional errors" }] });
    expect(assuming.text).toContain("; these ratios assume independent errors of equal spread.");
  });

  it("tells what became of curvature, instruments, zeros, replicates and implicit utility", () => {
    const curvature = { pointName: "base point", asked: 5, rank: 4, binds: true, logLikelihoodWithout: 14, loss: 2 };
    const bent = { ...IMPOSED, curvature: { at: "base point" } };
    expect(said(bent, { curvature }).text).toContain(
      "It binds there: the rank of the estimate is four, and the log-likelihood is lower by 2.00.",
    );
    expect(said(bent, { curvature: { ...curvature, binds: false } }).text).toContain(
      "The estimates satisfy it there without being made to.",
    );
    const endogeneity = {
      instruments: ["income"],
      firstStage: {
        coefficients: [],
        f: { statistic: 30.2, numerator: 1, denominator: 800, pValue: 0 },
        partialRSquared: 0.1,
        rows: 5,
      },
      residual: [],
      exogeneity: { degreesOfFreedom: 5, wald: { statistic: 12.2, pValue: 0.032 } },
      firstStageIgnored: true,
    };
    expect(said({ instruments: ["income"] }, { endogeneity }).text).toContain(
      "The F of the instruments is 30.2 on 1 and 800 degrees of freedom, and Wald’s statistic for exogeneity is 12.2 on 5 (p 0.032). Standard errors take the first stage as given.",
    );
    const probit = { coefficients: [], logLikelihood: 1, iterations: 2 };
    const zeros = {
      goods: [
        { good: "a", boughtNone: 0.1, rowsWithout: 1, probit },
        { good: "b", boughtNone: 0, rowsWithout: 0 },
      ],
      corrections: [],
      predictedSum: { lowest: 1, highest: 1, mean: 1 },
      firstStepIgnored: false,
    };
    const stepped = said({ zeros: "two-step" }, { zeros }).text;
    expect(stepped).toContain("There is a probit for 1 of the 2 goods");
    expect(stepped).not.toContain("as given");
    const bootstrap = {
      of: "rows",
      replicates: 500,
      failed: 3,
      seed: 1,
      intervals: [],
    } satisfies SystemFinding["bootstrap"];
    expect(said({ "standard errors": { bootstrap: "rows" } }, { bootstrap }).text).toContain(
      "3 replicates have no estimate.",
    );
    const implicit = {
      realExpenditure: "exact",
      method: "three-stage least squares, iterated on implicit utility",
    } as const;
    const easi = said({ form: "easi", estimator: "seemingly unrelated" }, { implicit });
    expect(easi.text).toContain(
      "Estimation is by three-stage least squares, iterated on implicit utility (Zellner and Theil 1962).",
    );
    expect(easi.references).not.toContain("zellner1962");
  });

  it("says of weights and differences what the sample is, and nothing of goods while the data cell has problems", () => {
    const weighted = { ...data, weight: "w", normalise: "none" } as const;
    expect(said({}, undefined, weighted).text).toContain("Observations are weighted by w. Standard errors");
    const equations = { explains: "changes of shares", leftOut: 1, because: ["differences"], gaps: 0 } as const;
    const changes = said(
      { form: "la-aids", differences: true },
      { rows: 337, equations: { ...equations, because: ["differences"] } },
      weighted,
    );
    expect(changes.text).toContain(
      "The sample has 337 observations of changes from one period to the next, weighted by w.",
    );
    expect(
      methodsParagraph({ specification: systemSpecification.parse({ kind: "system", data: "x", form: "aids" }) }).text,
    ).toMatch(/^We estimate an almost ideal demand system \(Deaton and Muellbauer 1980\)\. /);
  });
});
