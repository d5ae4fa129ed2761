import { describe, expect, it } from "vitest";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { specificationLines } from "../../../src/features/referee-copy/specification-lines.ts";
import { sampleContent } from "../../support/sample-findings.ts";

const content = sampleContent();
const linesWith = (more: Partial<SystemFinding>) =>
  Object.fromEntries(specificationLines({ ...content, system: { ...content.system, ...more } }));

const named = { name: "head_school", estimate: 0.1, standardError: 0.01 };
const byGood = { good: "grains", estimate: 0.02, standardError: 0.01 };

describe("the specification a referee reads", () => {
  it("says that expenditure is exogenous only where it was taken so", () => {
    expect(linesWith({}).Expenditure).toBe("taken as exogenous");
    const endogeneity: SystemFinding["endogeneity"] = {
      instruments: ["head_school", "rooms"],
      firstStage: {
        coefficients: [named],
        f: { statistic: 40, numerator: 2, denominator: 900, pValue: 0 },
        partialRSquared: 0.2,
        rows: 947,
      },
      residual: [byGood],
      exogeneity: { degreesOfFreedom: 5 },
      firstStageIgnored: true,
    };
    expect(linesWith({ endogeneity }).Expenditure).toBe(
      "taken as endogenous, by a control function with head_school and rooms; standard errors take the first stage as known",
    );
  });

  it("names what only some forms fix, and periods that are not among the rows", () => {
    const easi = { degree: 2, interactions: ["prices with expenditure" as const] };
    const lines = linesWith({
      fitted: { ...content.system.fitted, form: "easi", easi },
      implicit: { realExpenditure: "approximate", method: "maximum likelihood" },
      equations: { explains: "shares", leftOut: 1, because: ["lagged shares"], gaps: 0 },
    });
    expect(lines["Engel curves"]).toBe("of degree 2 in real expenditure, approximate, by mean shares");
    expect(lines.Interactions).toBe("prices with expenditure");
    expect(lines.Equations).toMatch(/^T is .* of .* rows used: the first period has no shares before it\.$/);
    expect(lines["α₀"]).toBeUndefined();
  });

  it("tells negativity that was imposed from negativity that was found", () => {
    const curvature = { pointName: "base point", asked: 5, rank: 3, binds: true, logLikelihoodWithout: 2, loss: 1 };
    expect(linesWith({}).Negativity).toBeUndefined();
    expect(linesWith({ curvature }).Negativity).toBe("imposed at the base point, with rank 3");
    expect(linesWith({ curvature: { ...curvature, binds: false } }).Negativity).toBe(
      "asked for at the base point, where the estimates have it without being made to",
    );
  });

  it("says for which goods a first step asks whether they are bought", () => {
    const probit = { coefficients: [named], logLikelihood: -10, iterations: 5 };
    const zeros: SystemFinding["zeros"] = {
      goods: [
        { good: "grains", boughtNone: 0, rowsWithout: 0 },
        { good: "drinks", boughtNone: 0.03, rowsWithout: 30, probit },
      ],
      corrections: [byGood],
      predictedSum: { lowest: 0.99, highest: 1.01, mean: 1 },
      firstStepIgnored: false,
    };
    expect(linesWith({ zeros })["Goods not bought"]).toBe("by two steps, a probit first, for drinks");
  });
});
