import { type FittedSystem, type SystemSpecification, systemSpecification } from "../../../shared/schemas/system.ts";
import { HYPOTHESIS_NAMES, type HypothesisName, type TestsFinding } from "../../../shared/schemas/tests.ts";
import type { FreeForm } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { coefficientNames, labelOfCoefficient } from "../estimation/coefficient-labels.ts";
import { isExactEasi } from "../estimation/easi/specification.ts";
import { momentsRequest } from "../estimation/index.ts";
import { locatable, sourceAt } from "../estimation/local-moments.ts";
import type { Moments } from "../estimation/moments.ts";
import { sizeOf } from "../estimation/request.ts";
import { specifiedSystem } from "../estimation/specified-system.ts";
import { unlessRefused } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { covarianceOfEstimates } from "./covariance-of-estimates.ts";
import { testExactEasi } from "./exact-easi-tests.ts";
import { hypothesesOf } from "./hypotheses.ts";
import { linearityOf } from "./linearity.ts";
import { type Model, type ModelFit, ModelFits } from "./model-fits.ts";
import type { RefusedFit } from "./restriction-tests.ts";
import { type Testing, testHypothesis } from "./test-hypothesis.ts";

/**
 * The hypotheses named, tested in a system: every fit by maximum likelihood from the same moments, whatever the
 * system's own estimator and restrictions; curvature is left aside. `specification` has its terms of time among the
 * demographics, `given` are its moments.
 * Errors: `Refusal` for a specification that cannot be estimated at all; `Cancelled`. What cannot be tested is told
 * in the finding.
 */
export function systemTests(
  names: readonly HypothesisName[],
  specification: SystemSpecification,
  fitted: FittedSystem,
  data: PreparedData,
  given: Moments,
  control: RunControl,
): Pick<TestsFinding, "tests" | "covariance" | "rows"> {
  const system = specifiedSystem(specification, data);
  const size = sizeOf(specification, data);
  const request = momentsRequest(specification, data);
  const moments = locatable(given, data, request, system.moments, size);
  const labels = coefficientNames(system, size, data.goods, specification.demographics).map(labelOfCoefficient);
  // What first steps add stands after the system's own coefficients, and starts from nought.
  const theta = system.layout(size).map((_, a) => fitted.theta[a] ?? 0);
  const model: Model = { system, size, moments, coefficientLabels: labels, theta };
  const covarianceUnder = (impose: readonly RestrictionName[], { estimation, solution }: ModelFit) => {
    const source = () => sourceAt(data, request, system.moments, size, solution.theta);
    const asked = unrestricted(specification, impose);
    return covarianceOfEstimates({ specification: asked, data, size, estimation, solution, source }, control)
      .covariance;
  };
  const testing: Testing = {
    model,
    goods: data.goods,
    fits: new ModelFits(model, control),
    covarianceOf: remembering(covarianceUnder),
    conventional: specification["standard errors"] === "conventional",
    linearity: linearityOf(specification, moments.weighted),
    control,
  };
  const ordered = HYPOTHESIS_NAMES.filter((name) => names.includes(name));
  const asked = hypothesesOf(ordered, { system, size, specification });
  const tests = asked.map((hypothesis, place) => {
    control.progress({ step: `testing ${hypothesis.hypothesis}`, fraction: place / asked.length });
    if ("because" in hypothesis) return hypothesis;
    if (isExactEasi(specification)) return testExactEasi(hypothesis, specification, data, model, control);
    return testHypothesis(hypothesis, testing);
  });
  return { tests, covariance: specification["standard errors"], rows: moments.rows };
}

/** The specification of a wide model, for covariances that estimate it again: maximum likelihood without curvature. */
function unrestricted(specification: SystemSpecification, impose: readonly RestrictionName[]): SystemSpecification {
  const { curvature: _, ...rest } = specification;
  return systemSpecification.parse({ ...rest, impose: [...impose], estimator: "maximum likelihood" });
}

/** Hypotheses share their wide models, and a bootstrap of one is long. */
function remembering(
  find: (impose: readonly RestrictionName[], fit: ModelFit) => number[][],
): (impose: readonly RestrictionName[], wide: FreeForm, fit: ModelFit) => number[][] | RefusedFit {
  const known = new Map<FreeForm, number[][] | RefusedFit>();
  return (impose, wide, fit) => {
    const covariance = known.get(wide) ?? unlessRefused(() => find(impose, fit));
    known.set(wide, covariance);
    return covariance;
  };
}
