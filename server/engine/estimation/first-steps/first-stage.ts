import { fTail } from "../../../../shared/numerics/distributions.ts";
import { printSize } from "../../../../shared/tables/numbers.ts";
import { countedRows } from "../../../../shared/tables/phrases.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { Refusal } from "../../refusal.ts";
import { type Columns, columnOf } from "../columns.ts";
import { invertUpper, solveUpper } from "../triangle.ts";
import { columnFactor, dependentRegressor, ofRegressors, type Regressor } from "./column-factor.ts";
import { namedColumns } from "./named-columns.ts";

/** The regression of ln x on what explains it. */
export interface FirstStage {
  /** Constant, demographics, log prices, instruments; the instruments are the last. */
  readonly coefficients: readonly {
    readonly name: string;
    readonly estimate: number;
    readonly standardError: number;
  }[];
  /** F of the instruments: their coefficients are all zero. */
  readonly f: {
    readonly statistic: number;
    readonly numerator: number;
    readonly denominator: number;
    readonly pValue: number;
  };
  /** Of the instruments given the other regressors. */
  readonly partialRSquared: number;
  /** v̂ = ln x less what is predicted, by row. */
  readonly residuals: Float64Array;
}

/** Which columns take part beside the constant and the prices. */
export interface FirstStageColumns {
  readonly instruments: readonly string[];
  readonly demographics: readonly Regressor[];
}

const known = new WeakMap<PreparedData, Map<string, FirstStage>>();

/** The first stage of these data, found once for all specifications with the same instruments and demographics. */
export function firstStageOf(data: PreparedData, columns: FirstStageColumns): FirstStage {
  if (!known.has(data)) known.set(data, new Map());
  const stages = known.get(data)!;
  const key = JSON.stringify([columns.instruments, columns.demographics.map(({ label }) => label)]);
  const stage = stages.get(key) ?? regress(data, columns);
  stages.set(key, stage);
  return stage;
}

/**
 * ln x on a constant, the demographics, all n log prices and the instruments, by least squares (weighted where rows
 * are) through an orthogonal factorisation:
 *
 *     ln x = π₀ + Σ_k π_k z_k + Σ_j π_j ln p_j + Σ_l π_l I_l + v
 *
 * Standard errors √(s²(X'HX)⁻¹) with s² = v̂'Hv̂/(T − K), the textbook's. F of the m instruments on (m, T − K) and their
 * partial R², the part of what the other regressors leave unexplained that they explain (Bound, Jaeger & Baker 1995,
 * Journal of the American Statistical Association 90). Blundell & Robin (1999, Journal of Applied Econometrics 14).
 *
 * Errors: an instrument that is no column, a demographic as well, constant or collinear; a regressor that is collinear;
 * too few rows; instruments that explain ln x exactly.
 */
function regress(data: PreparedData, { instruments, demographics }: FirstStageColumns): FirstStage {
  const excluded = namedColumns(
    data,
    instruments,
    ["instruments"],
    demographics.map(({ label }) => label),
  );
  const prices = data.logPrices.map((values, j) => ({ label: `ln price of ${data.goods[j]}`, values }));
  const regressors = [...demographics, ...prices, ...excluded];
  const count = regressors.length + 1;
  const freedom = data.rows - count;
  if (freedom <= 0) {
    throw refuse(
      `The first stage has ${count} coefficients and ${countedRows(data.rows)} used: it needs at least ${count + 1}.`,
    );
  }
  const triangle = columnFactor(regressors, data.logTotal, data.weights);
  refuseDependent(triangle, regressors, excluded.length);
  const estimates = columnOf(triangle, count).slice(0, count);
  const projected = estimates.slice();
  const upper = ofRegressors(triangle);
  solveUpper(upper, estimates);
  const left = triangle.values[count * triangle.rows + count];
  const squares = left * left;
  const deviations = Math.hypot(...columnOf(triangle, count).subarray(1));
  if (!(left > 1e-10 * deviations)) {
    throw refuse(
      `The instruments and the other regressors explain ln total expenditure exactly (residuals are ${printSize(left / deviations)} of its deviations): nothing of it is left that could be endogenous.`,
    );
  }
  const variance = squares / freedom;
  const inverse = invertUpper(upper);
  const explained = projected.subarray(count - excluded.length).reduce((sum, value) => sum + value * value, 0);
  const statistic = explained / excluded.length / variance;
  return {
    coefficients: ["constant", ...regressors.map(({ label }) => label)].map((name, a) => ({
      name,
      estimate: estimates[a],
      standardError: Math.sqrt(variance * rowSquares(inverse, a)),
    })),
    f: {
      statistic,
      numerator: excluded.length,
      denominator: freedom,
      pValue: fTail(statistic, excluded.length, freedom),
    },
    partialRSquared: explained / (explained + squares),
    residuals: residualsOf(data.logTotal, regressors, estimates),
  };
}

const refuse = (sentence: string) => new Refusal([{ sentence, key: ["instruments"] }]);

function refuseDependent(triangle: Columns, regressors: readonly Regressor[], instruments: number): void {
  const dependent = dependentRegressor(triangle);
  if (dependent === undefined) return;
  const { label } = regressors[dependent.place];
  const isInstrument = dependent.place >= regressors.length - instruments;
  if (dependent.constant) {
    throw refuse(
      `${isInstrument ? `The instrument ${label}` : label} is constant over the rows used: it explains nothing.`,
    );
  }
  const others = "the constant, the demographics, the log prices and the instruments before it";
  throw refuse(
    isInstrument
      ? `The instrument ${label} is an exact linear combination of ${others}: it brings nothing of its own.`
      : `The first stage is singular: ${label} is an exact linear combination of the regressors before it.`,
  );
}

function rowSquares({ rows, columns, values }: Columns, row: number): number {
  let sum = 0;
  for (let j = row; j < columns; j++) sum += values[j * rows + row] ** 2;
  return sum;
}

/** y − Xπ̂, by row; unweighted. */
function residualsOf(response: Float64Array, regressors: readonly Regressor[], estimates: Float64Array): Float64Array {
  const residuals = response.map((value) => value - estimates[0]);
  regressors.forEach(({ values }, a) => {
    const slope = estimates[a + 1];
    for (let t = 0; t < residuals.length; t++) residuals[t] -= slope * values[t];
  });
  return residuals;
}
