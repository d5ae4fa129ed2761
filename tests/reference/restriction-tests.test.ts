import { readFileSync } from "node:fs";
import { beforeAll, expect, it } from "vitest";
import { runSystem, runTests } from "../../server/engine/cells/index.ts";
import type { HypothesisName, MadeTest } from "../../shared/schemas/tests.ts";
import { specificationOf, tunaWeeks } from "../support/tuna.ts";

/** Iterated generalised least squares in R's matrix algebra (restriction-tests.R): ten digits of every statistic. */
const fixture = JSON.parse(readFileSync(new URL("./fixtures/restriction-tests.json", import.meta.url), "utf8")) as {
  tests: Record<HypothesisName, { wald: number; likelihoodRatio: number; score: number }>;
};
let made: MadeTest[];
beforeAll(async () => {
  const weeks = await tunaWeeks();
  const specification = specificationOf("system", "data: weeks\nform: la-aids\nindex: laspeyres");
  const source = "system: base\nof: [homogeneity, symmetry, homogeneity and symmetry]";
  const system = { specification, finding: runSystem(specification, weeks) };
  made = runTests(specificationOf("tests", source), weeks, system).tests.filter((test) => "wald" in test);
});

it.each(["homogeneity", "symmetry", "homogeneity and symmetry"] as const)(
  "Wald, likelihood ratio and score of %s",
  (hypothesis) => {
    const test = made.find((one) => one.hypothesis === hypothesis)!;
    for (const [name, expected] of Object.entries(fixture.tests[hypothesis])) {
      const statistic = test[name as "wald" | "likelihoodRatio" | "score"];
      if ("absent" in statistic) throw new Error(statistic.absent);
      expect(Math.abs(statistic.statistic / expected - 1)).toBeLessThan(1e-9);
    }
  },
);
