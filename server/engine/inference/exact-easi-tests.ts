import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { MadeTest } from "../../../shared/schemas/tests.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { constrainedForm } from "../estimation/coefficient-form.ts";
import { estimateExactEasi } from "../estimation/easi/exact.ts";
import { unlessRefused } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import type { Hypothesis } from "./hypotheses.ts";
import type { Model } from "./model-fits.ts";
import { nestedForm } from "./nested-form.ts";
import { waldTest } from "./wald-test.ts";

const ABSENT =
  "Of easi with exact real expenditure hypotheses are tested by Wald, from the fit without the restriction.";

/**
 * Wald's test of a hypothesis of EASI with exact real expenditure, from its own estimator under the wide restrictions
 * with the covariance the specification names. Likelihood ratio and score stand on the approximate form's equations.
 */
export function testExactEasi(
  { hypothesis, column, given, wide, narrow }: Hypothesis,
  specification: SystemSpecification,
  data: PreparedData,
  { system, size, moments, coefficientLabels }: Model,
  control: RunControl,
): MadeTest {
  const equations = Array.from({ length: size.goods - 1 }, (_, equation) => equation);
  const form = constrainedForm(system, size, wide);
  const wald = unlessRefused(
    () => {
      const estimation = { moments, form, equations, coefficientLabels };
      const { theta, covariance } = estimateExactEasi(specification, data, size, estimation, control);
      const free = wide.places.map((place) => theta[place]);
      const ofFree = wide.places.map((a) => wide.places.map((b) => covariance[a][b]));
      return waldTest(free, ofFree, nestedForm(wide, narrow));
    },
    ({ message }) => ({ absent: `Without the restriction there is no fit: ${message}` }),
  );
  return {
    hypothesis,
    ...(column !== undefined && { column }),
    given: [...given],
    degreesOfFreedom: wide.places.length - narrow.places.length,
    wald,
    likelihoodRatio: { absent: ABSENT },
    score: { absent: ABSENT },
    corrected: { absent: ABSENT },
    ...(hypothesis === "homogeneity" && { laitinen: { absent: ABSENT } }),
  };
}
