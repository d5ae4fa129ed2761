import { chiSquareTail } from "../../../shared/numerics/distributions.ts";
import type { ChiSquareStatistic, MadeTest, UnmadeTest } from "../../../shared/schemas/tests.ts";
import type { FreeForm } from "../../../shared/systems/demand-system.ts";
import type { RestrictionName } from "../../../shared/systems/names.ts";
import { unlessRefused } from "../refusal.ts";
import type { RunControl } from "../run.ts";
import { equationTests } from "./equation-tests.ts";
import type { Hypothesis } from "./hypotheses.ts";
import type { Linearity } from "./linearity.ts";
import type { Model, ModelFit, ModelFits } from "./model-fits.ts";
import { nestedForm } from "./nested-form.ts";
import { italianerFactor, laitinenTest, type RefusedFit } from "./restriction-tests.ts";
import { scoreTest } from "./score-test.ts";
import { waldTest } from "./wald-test.ts";

/** How hypotheses are tested, whichever they are. */
export interface Testing {
  readonly model: Model;
  readonly goods: readonly string[];
  readonly fits: ModelFits;
  /** Covariance of θ̂ (k × k) of the kind the Wald tests use, of a model with what is imposed in it. */
  covarianceOf(impose: readonly RestrictionName[], wide: FreeForm, fit: ModelFit): number[][] | RefusedFit;
  /** Whether that kind is the conventional one. */
  readonly conventional: boolean;
  readonly linearity: Linearity;
  readonly control: RunControl;
}

type MaybeFit = ModelFit | RefusedFit;

/** Wald, likelihood ratio and score of one hypothesis, with their small-sample companions where there are any. */
export function testHypothesis(asked: Hypothesis, testing: Testing): MadeTest | UnmadeTest {
  const { hypothesis, column, given, wide, narrow } = asked;
  const named = { hypothesis, ...(column !== undefined && { column }) };
  const [free, restricted] = [testing.fits.under(wide), testing.fits.under(narrow)];
  if ("refused" in free && "refused" in restricted) {
    const reason = `Neither with the restriction nor without it is there a fit: ${restricted.refused}`;
    return { ...named, because: "could not be made", reason };
  }
  const degreesOfFreedom = wide.places.length - narrow.places.length;
  const covariance = "refused" in free ? free : testing.covarianceOf(given, wide, free);
  const likelihoodRatio = likelihoodRatioOf(free, restricted, degreesOfFreedom);
  return {
    ...named,
    given: [...given],
    degreesOfFreedom,
    wald: waldOf(asked, free, covariance),
    likelihoodRatio,
    score: scoreOf(asked, restricted, testing),
    corrected: correctedOf(likelihoodRatio, asked, testing),
    ...(hypothesis === "homogeneity" && {
      laitinen: laitinenOf(likelihoodRatio, asked, testing),
      ...equationsOf(asked, free, covariance, testing),
    }),
  };
}

const without = ({ refused }: RefusedFit) => ({ absent: `Without the restriction there is no fit: ${refused}` });
const under = ({ refused }: RefusedFit) => ({ absent: `Under the restriction there is no fit: ${refused}` });

function likelihoodRatioOf(free: MaybeFit, restricted: MaybeFit, degreesOfFreedom: number): ChiSquareStatistic {
  if ("refused" in free) return without(free);
  if ("refused" in restricted) return under(restricted);
  // A difference below zero is rounding of two equal likelihoods.
  const statistic = Math.max(0, 2 * (free.logLikelihood - restricted.logLikelihood));
  return { statistic, pValue: chiSquareTail(statistic, degreesOfFreedom) };
}

function waldOf({ wide, narrow }: Hypothesis, free: MaybeFit, covariance: number[][] | RefusedFit): ChiSquareStatistic {
  if ("refused" in free) return without(free);
  if ("refused" in covariance) return { absent: covariance.refused };
  const ofFree = wide.places.map((a) => wide.places.map((b) => covariance[a][b]));
  return waldTest(free.solution.free, ofFree, nestedForm(wide, narrow));
}

function scoreOf({ wide, narrow }: Hypothesis, restricted: MaybeFit, { fits, control }: Testing): ChiSquareStatistic {
  if ("refused" in restricted) return under(restricted);
  const restrictions = wide.places.length - narrow.places.length;
  const test = unlessRefused(() => scoreTest(fits.estimation(wide), restricted.solution.theta, restrictions, control));
  return "refused" in test ? { absent: test.refused } : test;
}

function sizeOf({ model: { moments } }: Testing) {
  return { rows: moments.rows, equations: moments.responses.columns - 1 };
}

function correctedOf(ratio: ChiSquareStatistic, { wide, narrow }: Hypothesis, testing: Testing): ChiSquareStatistic {
  if ("absent" in ratio) return ratio;
  const { rows, equations } = sizeOf(testing);
  const factor = italianerFactor(wide.places.length, narrow.places.length, { rows, equations });
  if (factor <= 0) {
    const absent = `${rows} rows are too few to correct a likelihood ratio of ${wide.places.length} coefficients in ${equations} equations.`;
    return { absent };
  }
  const statistic = ratio.statistic * factor;
  return { statistic, pValue: chiSquareTail(statistic, wide.places.length - narrow.places.length) };
}

function laitinenOf(ratio: ChiSquareStatistic, { wide }: Hypothesis, testing: Testing): MadeTest["laitinen"] {
  const { linearity } = testing;
  if ("absent" in linearity) return linearity;
  if ("absent" in ratio) return ratio;
  const { rows, equations } = sizeOf(testing);
  const freeCoefficients = wide.places.length;
  const test = laitinenTest(
    ratio.statistic,
    { logLikelihood: 0, freeCoefficients },
    { rows, equations },
    linearity.exact,
  );
  if (test) return { ...test, because: linearity.because };
  const absent = `${rows} rows leave T² of ${equations} equations with ${freeCoefficients / equations} coefficients each no degrees of freedom.`;
  return { absent };
}

function equationsOf(
  { wide }: Hypothesis,
  free: MaybeFit,
  covariance: number[][] | RefusedFit,
  testing: Testing,
): Pick<MadeTest, "equations"> {
  if ("refused" in free || "refused" in covariance) return {};
  const { model, goods, linearity, conventional } = testing;
  const { rows, equations } = sizeOf(testing);
  const freedom = rows - wide.places.length / equations;
  const exact = !("absent" in linearity) && conventional && freedom > 0 ? { rows, freedom } : undefined;
  const tests = equationTests(model.system, model.size, goods, { theta: free.solution.theta, covariance }, exact);
  return tests ? { equations: tests } : {};
}
