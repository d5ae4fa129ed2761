import { endogenousShares } from "../server/engine/estimation/first-steps/endogenous.ts";
import { coefficientIntervals, estimateOf, type Sample } from "./recovery.ts";

/** Total expenditure holds a part of the shares' errors; an instrument does not. */
export function drawEndogenous(rows: number, seed: number): Sample {
  const { data, theta } = endogenousShares({ rows, seed });
  const specification = { form: "aids", impose: ["homogeneity", "symmetry"], instruments: ["earnings"] } as const;
  return { data, theta, specification };
}

/**
 * Intervals of β, which the first stage identifies, by a bootstrap of rows that estimates the first stage anew, and
 * conventional ones, which take its residual for data; and how wide the latter are of the former, on average.
 */
export function firstStageIntervals(rows: number, seed: number) {
  const sample = drawEndogenous(rows, seed);
  const expenditureTerms = (errors: unknown) => {
    const found = estimateOf(sample, errors);
    return coefficientIntervals(sample, found).filter((_, a) => found.coefficients[a].block === "beta");
  };
  const bootstrap = expenditureTerms({ bootstrap: "rows", replicates: 39, seed });
  const conventional = expenditureTerms("conventional");
  const width = (intervals: typeof bootstrap) => intervals.reduce((sum, { low, high }) => sum + high - low, 0);
  return { intervals: { bootstrap, conventional }, width: width(conventional) / width(bootstrap) };
}
