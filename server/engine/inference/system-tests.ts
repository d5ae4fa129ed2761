import type { FittedSystem, SystemSpecification } from "../../../shared/schemas/system.ts";
import { HYPOTHESIS_NAMES, type HypothesisName, type TestsFinding } from "../../../shared/schemas/tests.ts";
import { systemOf } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { coefficientNames, labelOfCoefficient } from "../estimation/coefficient-labels.ts";
import { conventionalCovariance } from "../estimation/covariance.ts";
import { accumulateMoments, momentsRequest } from "../estimation/index.ts";
import type { RunControl } from "../run.ts";
import { hypothesesOf } from "./hypotheses.ts";
import { linearityOf } from "./linearity.ts";
import { type Model, ModelFits } from "./model-fits.ts";
import { type Testing, testHypothesis } from "./test-hypothesis.ts";

/**
 * The hypotheses named, tested in a system: every fit by maximum likelihood from the same moments, whatever the
 * system's own estimator and restrictions.
 * Errors: `Cancelled`. What cannot be tested is told in the finding.
 */
export function systemTests(
  names: readonly HypothesisName[],
  specification: SystemSpecification,
  fitted: FittedSystem,
  data: PreparedData,
  control: RunControl,
): Pick<TestsFinding, "tests" | "covariance"> {
  const { system, size } = systemOf(fitted);
  const moments = accumulateMoments(data, momentsRequest(specification, data), control);
  const labels = coefficientNames(system, size, data.goods, fitted.demographics).map(labelOfCoefficient);
  const model: Model = { system, size, moments, coefficientLabels: labels, theta: fitted.theta };
  const testing: Testing = {
    model,
    goods: data.goods,
    fits: new ModelFits(model, control),
    covarianceOf: conventionalCovariance,
    conventional: true,
    linearity: linearityOf(specification, moments.weighted),
  };
  const ordered = HYPOTHESIS_NAMES.filter((name) => names.includes(name));
  const asked = hypothesesOf(ordered, { system, size, specification, demographics: fitted.demographics });
  const tests = asked.map((hypothesis, place) => {
    control.progress({ step: `testing ${hypothesis.hypothesis}`, fraction: place / asked.length });
    return "because" in hypothesis ? hypothesis : testHypothesis(hypothesis, testing);
  });
  return { tests, covariance: "conventional" };
}
