import { render, screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import type { Endogeneity, ZerosFinding } from "../../../shared/schemas/first-steps.ts";
import { systemFinding } from "../../../shared/schemas/system.ts";
import { systemSentence } from "../../../shared/tables/sentence.ts";
import { tableText } from "../../../shared/tables/text.ts";
import { sampleSystem } from "../../support/sample-findings.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const GOODS = ["grains", "dairy", "produce", "meat & fish", "sweet drinks", "other food"];
const RHO = [0.0074, 0.0013, 0.0081, -0.0086, -0.0001, -0.0081];

const endogeneity = (f: number, pValue: number): Endogeneity => ({
  instruments: ["head_school", "rooms"],
  firstStage: {
    coefficients: [
      { name: "constant", estimate: -1.12, standardError: 0.0192 },
      { name: "head_school", estimate: 0.0259, standardError: 0.0014 },
      { name: "rooms", estimate: 0.1521, standardError: 0.0051 },
    ],
    f: { statistic: f, numerator: 2, denominator: 889, pValue: 0.001 },
    partialRSquared: 0.219,
    rows: 900,
  },
  residual: GOODS.map((good, i) => ({ good, estimate: RHO[i], standardError: 0.0044 })),
  exogeneity: { degreesOfFreedom: 5, wald: { statistic: 14.8, pValue } },
  firstStageIgnored: true,
});

const zeros: ZerosFinding = {
  goods: GOODS.map((good, i) => ({
    good,
    boughtNone: i === 4 ? 0.032 : 0,
    rowsWithout: i === 4 ? 29 : 0,
    ...(i === 4 && {
      probit: {
        coefficients: [
          { name: "constant", estimate: 1.91, standardError: 0.12 },
          { name: "ln total expenditure", estimate: 0.4, standardError: 0.08 },
        ],
        logLikelihood: -120.3,
        iterations: 8,
      },
    }),
  })),
  corrections: [{ good: "sweet drinks", estimate: 0.0474, standardError: 0.0453 }],
  predictedSum: { lowest: 1.0001, highest: 1.0247, mean: 1.0018 },
  firstStepIgnored: true,
};

const { Open, tables } = CELL_PARTS.system;

describe("endogenous expenditure in an open system cell", () => {
  it("shows the first stage with its F, the residual by good, and what the test means", () => {
    render(<Open finding={systemFinding.parse({ ...sampleSystem(), endogeneity: endogeneity(673.6, 0.011) })} />);
    const section = screen.getByRole("region", { name: "Endogenous total expenditure" });
    expect(within(section).getByRole("group", { name: /^First stage/ })).toHaveTextContent(
      "rooms, instrument0.1521(0.0051)",
    );
    expect(within(section).getByRole("group", { name: /residual of the first stage/ })).toHaveTextContent(
      "meat & fish−0.0086",
    );
    expect(section).toHaveTextContent(
      "F of the 2 instruments in the first stage is 673.6 on 2 and 889 degrees of freedom",
    );
    expect(section).toHaveTextContent(
      "That total expenditure is exogenous is rejected at 5 per cent (Wald 14.8 on 5 degrees of freedom, p 0.011), if the instruments are valid.",
    );
    expect(section).toHaveTextContent("only those of the bootstrap estimate it again");
    expect(section).not.toHaveTextContent("weak");
  });

  it("calls a small F weak, by whose rule, and proves nothing by a test that does not reject", () => {
    const finding = systemFinding.parse({ ...sampleSystem(), endogeneity: endogeneity(4.2, 0.4) });
    render(<Open finding={finding} />);
    const section = screen.getByRole("region", { name: "Endogenous total expenditure" });
    expect(section).toHaveTextContent(
      "By the rule of thumb of Staiger and Stock (1997), an F of at least 10, the instruments are weak",
    );
    expect(section).toHaveTextContent(
      "not rejected at 5 per cent (Wald 14.8 on 5 degrees of freedom, p 0.400); that is no proof that it is.",
    );
    expect(systemSentence(finding)).toMatch(/The instruments of total expenditure are weak: F is 4\.2\.$/);
  });

  it("says a rejected exogeneity at the head, and nothing where there is nothing to say", () => {
    const rejected = systemFinding.parse({ ...sampleSystem(), endogeneity: endogeneity(673.6, 0.011) });
    expect(systemSentence(rejected)).toMatch(
      /That total expenditure is exogenous is rejected, if the instruments are valid\.$/,
    );
    const plain = systemFinding.parse({ ...sampleSystem(), endogeneity: endogeneity(673.6, 0.4) });
    expect(systemSentence(plain)).toBe(systemSentence(sampleSystem()));
  });
});

describe("zeros in an open system cell", () => {
  const finding = systemFinding.parse({ ...sampleSystem(), zeros });

  it("shows the probits, and says what becomes of adding-up with the numbers", () => {
    render(<Open finding={finding} />);
    const section = screen.getByRole("region", { name: "Goods not bought, in two steps" });
    expect(within(section).getByRole("table")).toHaveTextContent("Rows that buy none29");
    expect(within(section).getByRole("table")).toHaveTextContent("δ0.0474(0.0453)");
    expect(section).toHaveTextContent("they sum to between 1.0001 and 1.0247, on average to 1.0018");
    expect(section).toHaveTextContent(
      "Bought in every row, so without a first step: grains, dairy, produce, meat & fish, other food.",
    );
    expect(section).toHaveTextContent("are those of f, not responses of expected purchases");
  });

  it("offers both tables for copying", () => {
    const offered = tables({ ...finding, endogeneity: endogeneity(673.6, 0.011) });
    expect(offered.map(({ name }) => name)).toEqual(["coefficients", "first-stage", "probits"]);
    expect(tableText(offered[2])).toContain("ln total expenditure\testimate\t0.4000");
  });
});
