import type { SystemFinding, SystemSpecification } from "../../../shared/schemas/system.ts";
import { nearestWord } from "../../../shared/study/nearest-word.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { pickRows } from "../columns/pick-rows.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { weightedMean } from "../columns/weighted.ts";
import { covarianceOfEstimates, inferenceFinding } from "../inference/covariance-of-estimates.ts";
import { linearityOf } from "../inference/linearity.ts";
import { type NestedFits, restrictionTests } from "../inference/restriction-tests.ts";
import { Refusal } from "../refusal.ts";
import { polling, type RunControl } from "../run.ts";
import { advising } from "./advice.ts";
import { systemForm } from "./coefficient-form.ts";
import { coefficientNames, labelOfCoefficient } from "./coefficient-labels.ts";
import { type CurvaturePoint, imposeCurvature } from "./curvature/impose.ts";
import { durbinWatson } from "./durbin-watson.ts";
import { exactFinding, fittedEasi } from "./easi/exact-finding.ts";
import { isExactEasi } from "./easi/specification.ts";
import { equationsExplainedBy } from "./equations-explained.ts";
import type { Estimation } from "./estimation.ts";
import { refuseConstantShares, refuseTooFewRows } from "./failures.ts";
import { firstStepFindings } from "./first-steps/findings.ts";
import { fitMeasures } from "./fit-measures.ts";
import { locatable, sourceAt } from "./local-moments.ts";
import type { Solution } from "./minimise.ts";
import type { Moments } from "./moments.ts";
import { nestedFits, rememberFit } from "./nested-fits.ts";
import { momentsRequest, sizeOf } from "./request.ts";
import { meanResponses } from "./responses.ts";
import { rowsNeeded } from "./rows-needed.ts";
import { solve, withinEquations } from "./solve.ts";
import { sampleOf, specifiedSystem } from "./specified-system.ts";
import { covarianceOf } from "./weighting.ts";

/** A system finding but for what the economics of the fitted system adds. */
export type Estimate = Omit<SystemFinding, "points" | "expenditureElasticities" | "engel" | "checks">;

/**
 * Estimates a specification from the moments of its data: n − 1 equations, results for all n goods.
 *
 * Errors: `Refusal` for too few rows, an unknown dropped good, moments that identify no solution, a
 * singular residual covariance, no convergence; `Cancelled`.
 */
export function estimateSystem(
  specification: SystemSpecification,
  data: PreparedData,
  given: Moments,
  control: RunControl,
  curvatureAt?: CurvaturePoint,
): Estimate {
  const system = specifiedSystem(specification, data);
  const size = sizeOf(specification, data);
  const moments = locatable(given, data, momentsRequest(specification, data), system.moments, size);
  const names = coefficientNames(system, size, data.goods, specification.demographics);
  const dropped = placeOfDropped(specification, data.goods);
  const linear: Estimation = {
    moments,
    form: systemForm(system, size, specification.impose),
    equations: data.goods.map((_, good) => good).filter((good) => good !== dropped),
    coefficientLabels: names.map(labelOfCoefficient),
    // Terms of time are no column that could be left out.
    demographics: specification.demographics.filter((name) => data.numeric.has(name)),
  };
  const within = systemForm(system, size, withinEquations(specification)).free;
  refuseTooFewRows(moments.rows, linear.form.free, linear.equations.length, within, neededByForm(system, size, linear));
  refuseConstantShares(linear);
  if (isExactEasi(specification)) {
    return exactFinding({ specification, data, size, names, dropped, estimation: linear }, control);
  }
  const unbent = {
    estimation: linear,
    solution: advising(specification, data, () => solve(specification, system, size, linear, control)),
  };
  const { estimation, solution, curvature } = imposeCurvature(
    specification,
    system,
    size,
    unbent,
    curvatureAt,
    control,
  );
  const source = () => sourceAt(data, momentsRequest(specification, data), system.moments, size, solution.theta);
  const inference = covarianceOfEstimates(
    { specification, data, size, estimation, solution, source, ...(curvatureAt && { curvatureAt }) },
    control,
  );
  const { covariance } = inference;
  const poll = polling(control, "measuring the fit");
  poll();
  // What the first steps add stands after the coefficients of the system itself.
  const own = SYSTEMS[specification.form].layout(size).length;
  const fit = { specification, data, system, size, estimation, solution, covariance, own };
  const { iterations, gradient, largestStep, condition } = solution;
  const measures = fitMeasures(estimation, solution);
  poll();
  rememberFit(linear, specification, unbent.solution);
  const equations = equationsExplainedBy(sampleOf(specification), data, moments.rows);
  const durbin = durbinWatsonOf(specification, data, system, size, estimation, solution);
  poll();
  return {
    kind: "system",
    dataFingerprint: data.fingerprint,
    fitted: {
      form: specification.form,
      ...(size.index && {
        index: size.index.name,
        indexMeans: { shares: [...size.index.meanShares], prices: [...size.index.meanPrices] },
      }),
      ...(specification.form === "easi" && { easi: fittedEasi(specification) }),
      goods: [...data.goods],
      ...(system.kind === "differences" && {
        meanShares: data.shares.map((share) => weightedMean(share, data.weights)),
      }),
      demographics: [...specification.demographics],
      alpha0: specification.alpha0,
      imposed: [...specification.impose],
      theta: solution.theta.slice(0, own),
      covariance: covariance.slice(0, own).map((row) => row.slice(0, own)),
    },
    coefficients: names.slice(0, own).map((name, a) => ({
      ...name,
      estimate: solution.theta[a],
      standardError: Math.sqrt(covariance[a][a]),
    })),
    estimator: specification.estimator,
    ...inferenceFinding(inference, own),
    dropped: data.goods[dropped],
    rows: moments.rows,
    ...(equations && { equations }),
    weighted: moments.weighted,
    freeCoefficients: estimation.form.free,
    ...(specification.form === "easi" && {
      implicit: { realExpenditure: "approximate" as const, method: specification.estimator },
    }),
    ...measures,
    convergence: { iterations, gradient, largestStep, condition },
    ...(durbin && { durbinWatson: durbin }),
    residualCovariance: covarianceOf(solution.residuals, moments.rows),
    ...testsOf(specification, system, size, estimation, solution, control),
    ...(curvature && { curvature }),
    ...firstStepFindings(fit, source, control),
  };
}

/** Rows that combinations of equations need whose coefficients the form itself shares between them (LES). */
function neededByForm(system: DemandSystem, size: SystemSize, { form, equations, ...rest }: Estimation): number {
  if (system.heldByForm.length === 0 || system.moments.local !== undefined) return 0;
  const start = system.start(size, meanResponses(rest));
  const free = form.expand.places.map((place) => start[place]);
  return rowsNeeded(form, free, equations);
}

function placeOfDropped({ dropped }: SystemSpecification, goods: readonly string[]): number {
  if (dropped === undefined) return goods.length - 1;
  const place = goods.indexOf(dropped);
  if (place >= 0) return place;
  const nearest = nearestWord(dropped, goods);
  const sentence = `dropped names "${dropped}", which is none of the ${goods.length} goods ${goods.join(", ")}.`;
  throw new Refusal([{ sentence, key: ["dropped"], ...(nearest !== undefined && { nearest }) }]);
}

function durbinWatsonOf(
  specification: SystemSpecification,
  data: PreparedData,
  system: DemandSystem,
  size: SystemSize,
  { form }: Estimation,
  solution: Solution,
): number[] | undefined {
  if (data.time === undefined) return undefined;
  const source = sourceAt(data, momentsRequest(specification, data), system.moments, size, solution.theta);
  const { dataRows } = source;
  const time = dataRows ? pickRows(data.time, dataRows) : data.time;
  return durbinWatson(source, time, form.coefficients(solution.free));
}

/** Restrictions that hold by the form itself cannot be tested. */
function testsOf(
  specification: SystemSpecification,
  system: DemandSystem,
  size: SystemSize,
  estimation: Estimation,
  solution: Solution,
  control: RunControl,
): Pick<SystemFinding, "tests" | "untested"> {
  if (system.heldByForm.length > 0) return { tests: [] };
  const fits: NestedFits = nestedFits(estimation, system, size, specification, solution.theta, control);
  const linearity = linearityOf(specification, estimation.moments.weighted);
  const { tests, untested } = restrictionTests(fits, {
    rows: estimation.moments.rows,
    equations: estimation.equations.length,
    ...(!("absent" in linearity) && { linear: { exact: linearity.exact } }),
  });
  const isConventional = specification["standard errors"] === "conventional";
  return {
    tests: isConventional ? tests : tests.map((test) => ({ ...test, assumes: "conventional errors" })),
    ...(untested.length > 0 && { untested }),
  };
}
