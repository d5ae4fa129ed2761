import { linearForm } from "../../server/engine/estimation/coefficient-form.ts";
import { conventionalCovariance } from "../../server/engine/estimation/covariance.ts";
import type { Estimation } from "../../server/engine/estimation/estimation.ts";
import { maximumLikelihood } from "../../server/engine/estimation/estimators.ts";
import type { MomentSource } from "../../server/engine/estimation/moment-source.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { nestedForm } from "../../server/engine/inference/nested-form.ts";
import { laitinenTest } from "../../server/engine/inference/restriction-tests.ts";
import { waldTest } from "../../server/engine/inference/wald-test.ts";
import { QUIET } from "../../server/engine/run.ts";
import { chiSquareTail } from "../../shared/numerics/distributions.ts";
import type { Random } from "../../shared/numerics/random.ts";
import { type Dependence, freeForm } from "../../shared/systems/free-form.ts";

const ROWS = 31;

export interface RejectionRates {
  /** Of the nominal 5 % test against χ²: Σ divided by T − k as Laitinen has it, and by T. */
  readonly corrected: number;
  readonly likelihood: number;
  /** Of Laitinen's F. */
  readonly exact: number;
}

/**
 * How often tests of homogeneity reject at 5 % while it is true: n − 1 equations with n + 1 regressors over 31 rows, as
 * Laitinen (1978, Economics Letters 1) had it. The distribution depends on these counts alone, so regressors are a
 * constant and n log prices.
 */
export function rejectionRates(goods: number, replicates: number, random: Random): RejectionRates {
  const equations = goods - 1;
  const regressors = goods + 1;
  const freedom = ROWS - regressors;
  const prices = Array.from({ length: goods }, () => Float64Array.from({ length: ROWS }, () => random.normal()));
  const places = Array.from({ length: equations * regressors }, (_, a) => [
    Math.floor(a / regressors),
    a % regressors,
  ]) as [number, number][];
  const wide = linearForm(equations, regressors, places);
  const homogeneous = Array.from({ length: equations }, (_, i): Dependence => {
    const at = (j: number) => i * regressors + 1 + j;
    const others = Array.from({ length: goods - 1 }, (_, j) => [at(j), -1] as const);
    return { place: at(goods - 1), constant: 0, on: others };
  });
  const restrictions = nestedForm(wide.expand, freeForm(places.length, homogeneous));
  const counts = { corrected: 0, likelihood: 0, exact: 0 };
  for (let replicate = 0; replicate < replicates; replicate++) {
    const source: MomentSource = {
      rows: ROWS,
      columns: prices,
      columnLabels: prices.map((_, j) => `ln price ${j + 1}`),
      terms: [[0, 0], ...prices.map((_, j) => [0, j + 1] as const)],
      responses: correlated(equations, random),
      responseLabels: Array.from({ length: equations }, (_, i) => `share ${i + 1}`),
    };
    const estimation: Estimation = {
      moments: reduceRows(source, String(replicate), QUIET),
      form: wide,
      equations: Array.from({ length: equations }, (_, i) => i),
      coefficientLabels: places.map((place) => place.join()),
    };
    const solution = maximumLikelihood(estimation, false, new Array<number>(wide.free).fill(0), "update", QUIET);
    const test = waldTest(solution.free, conventionalCovariance(estimation, solution), restrictions);
    if ("absent" in test) throw new Error(test.absent);
    const tSquared = (test.statistic * freedom) / ROWS;
    const ratio = ROWS * Math.log1p(tSquared / freedom);
    const fit = { logLikelihood: 0, freeCoefficients: wide.free };
    if (test.pValue < 0.05) counts.likelihood++;
    if (chiSquareTail(tSquared, equations) < 0.05) counts.corrected++;
    if (laitinenTest(ratio, fit, { rows: ROWS, equations }, true)!.pValue < 0.05) counts.exact++;
  }
  const rate = (count: number) => count / replicates;
  return { corrected: rate(counts.corrected), likelihood: rate(counts.likelihood), exact: rate(counts.exact) };
}

/** Errors alone, correlated between equations: shares that depend on no price. */
function correlated(equations: number, random: Random): Float64Array[] {
  const columns = Array.from({ length: equations }, () => new Float64Array(ROWS));
  for (let t = 0; t < ROWS; t++) {
    let before = random.normal();
    for (const column of columns) {
      before = 0.6 * before + random.normal();
      column[t] = before;
    }
  }
  return columns;
}

/** Exact sizes of the nominal 5 % test in Laitinen's four systems, recomputed from the distribution of T². */
export const EXACT_SIZES = [
  { goods: 5, corrected: 0.1169, likelihood: 0.1897 },
  { goods: 8, corrected: 0.2495, likelihood: 0.4441 },
  { goods: 11, corrected: 0.5228, likelihood: 0.7904 },
  { goods: 14, corrected: 0.8888, likelihood: 0.9833 },
] as const;
