import type { ZerosFinding } from "../../../../shared/schemas/first-steps.ts";
import { SYSTEMS } from "../../../../shared/systems/index.ts";
import { weightedMean } from "../../columns/weighted.ts";
import type { MomentSource } from "../moment-source.ts";
import { askedParticipation } from "./asked.ts";
import { type ExtendedFit, furtherCoefficients, takesFirstStepsAsData } from "./endogeneity.ts";
import { extendedSystem } from "./extended-system.ts";
import { kindsOf, withParticipation } from "./extensions.ts";
import type { Probit } from "./probit.ts";

/** The probits, what the densities do in the second step, and what becomes of adding-up; `source` are its rows. */
export function zerosOf(fit: ExtendedFit, columns: readonly string[], source: MomentSource): ZerosFinding {
  const { specification, data, size, solution, covariance, own } = fit;
  const participation = askedParticipation(data, columns, specification.demographics);
  const { regressors, goods } = participation;
  const uncentred = extendedSystem(SYSTEMS[specification.form], {
    ...withParticipation(participation),
    centred: false,
  });
  const { sometimes } = kindsOf(goods);
  return {
    goods: goods.map(({ good, boughtNone, rowsWithout, step }) => ({
      good,
      boughtNone,
      rowsWithout,
      ...(step && { probit: described(step.probit, regressors) }),
    })),
    corrections: furtherCoefficients(
      sometimes.map((good) => data.goods[good]),
      solution.theta.slice(own),
      covariance,
      own,
    ),
    predictedSum: predictedSum(source, uncentred.moments.coefficients(solution.theta, size)),
    firstStepIgnored: takesFirstStepsAsData(specification),
  };
}

function described({ coefficients, covariance, logLikelihood, iterations }: Probit, regressors: readonly string[]) {
  return {
    coefficients: regressors.map((name, a) => ({
      name,
      estimate: coefficients[a],
      standardError: Math.sqrt(covariance.values[a * covariance.rows + a]),
    })),
    logLikelihood,
    iterations,
  };
}

/** Σ_i ŵ_i by row: its range and its (weighted) mean. */
function predictedSum(
  source: MomentSource,
  coefficients: readonly (readonly number[])[],
): ZerosFinding["predictedSum"] {
  const sums = new Float64Array(source.rows);
  source.terms.forEach((term, place) => {
    const weight = coefficients.reduce((sum, row) => sum + row[place], 0);
    if (weight === 0) return;
    const columns = term.filter((factor) => factor !== 0).map((factor) => source.columns[factor - 1]);
    for (let t = 0; t < sums.length; t++) {
      let product = weight;
      for (const column of columns) product *= column[t];
      sums[t] += product;
    }
  });
  const range = sums.reduce(
    ([low, high], sum) => [Math.min(low, sum), Math.max(high, sum)],
    [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY],
  );
  return { lowest: range[0], highest: range[1], mean: weightedMean(sums, source.weights) };
}
