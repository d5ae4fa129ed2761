import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { runSystem } from "../../server/engine/cells/index.ts";
import { largestDifference, systemOver } from "../support/estimating.ts";
import { tunaWeeks } from "../support/tuna.ts";

interface Reference {
  readonly rank: number;
  readonly without: number;
  readonly logLik: number;
  readonly alpha: number[];
  readonly beta: number[];
  readonly gamma: number[];
}

/** Computed by `fixtures/curvature.R` with the tools it names. */
const reference: Record<"aids" | "aids3" | "la", Reference> = JSON.parse(
  readFileSync(new URL("fixtures/curvature.json", import.meta.url), "utf8"),
);

describe("curvature at the base point of the tuna weeks against optim and numDeriv", () => {
  const cases = [
    ["aids", "aids", 6, false],
    ["aids", "aids3", 3, true],
    ["la-aids", "la", 6, false],
  ] as const;
  test.each(cases)("%s, %s, of rank %i", async (form, key, rank, binds) => {
    const data = await tunaWeeks();
    const impose = ["homogeneity", "symmetry"];
    const curvature = { at: "base point", rank };
    const found = runSystem(systemOver(data, { form, demographics: [], impose, curvature }), data);
    const wanted = reference[key];
    expect(Math.abs(found.logLikelihood - wanted.logLik)).toBeLessThan(1e-8);
    expect(found.curvature).toMatchObject({ rank: wanted.rank, binds });
    expect(Math.abs(found.curvature!.logLikelihoodWithout - wanted.without)).toBeLessThan(1e-8);
    // The reference stops at a gradient of some 1e-8.
    const theta = [...wanted.alpha, ...wanted.gamma, ...wanted.beta];
    expect(largestDifference(found.fitted.theta, theta)).toBeLessThan(1e-8);
  });
});
