import { normalDensity, normalProbability } from "../../../../shared/numerics/normal-tail.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { Refusal } from "../../refusal.ts";
import type { Columns } from "../columns.ts";
import { columnFactor, dependentRegressor, ofRegressors, type Regressor } from "./column-factor.ts";
import { namedColumns } from "./named-columns.ts";
import { type Probit, probit } from "./probit.ts";

/** Whether a good is bought at all, row by row. */
export interface GoodParticipation {
  readonly good: string;
  /** Weighted share of rows that buy none of it, and how many. */
  readonly boughtNone: number;
  readonly rowsWithout: number;
  /** Absent where every row buys it. */
  readonly step?: {
    readonly probit: Probit;
    /** Φ̂ = Φ(x'b̂) and φ̂ = φ(x'b̂), by row. */
    readonly probability: Float64Array;
    readonly density: Float64Array;
  };
}

export interface Participation {
  readonly regressors: readonly string[];
  readonly goods: readonly GoodParticipation[];
}

/** Which columns explain participation beside the constant, the prices and ln x. */
export interface ParticipationColumns {
  readonly columns: readonly string[];
  readonly demographics: readonly Regressor[];
}

const known = new WeakMap<PreparedData, Map<string, Participation>>();

/** The first step of these data, found once for all specifications that ask for the same. */
export function participationOf(data: PreparedData, columns: ParticipationColumns): Participation {
  if (!known.has(data)) known.set(data, new Map());
  const steps = known.get(data)!;
  const key = JSON.stringify([columns.columns, columns.demographics.map(({ label }) => label)]);
  const step = steps.get(key) ?? firstStep(data, columns);
  steps.set(key, step);
  return step;
}

/**
 * The first step of Shonkwiler & Yen (1999, American Journal of Agricultural Economics 81, 972–982): for every good that
 * some rows do not buy, a probit of buying it on a constant, the demographics, all log prices, ln x and the columns
 * named. A good that every row buys needs none: Φ = 1 and φ = 0.
 *
 * Errors: no good with zeros; a good that nobody buys; columns that are constant, collinear or tell buyers from others
 * without fail; a probit that does not converge.
 */
function firstStep(data: PreparedData, { columns, demographics }: ParticipationColumns): Participation {
  const extra = namedColumns(
    data,
    columns,
    ["zeros"],
    demographics.map(({ label }) => label),
  );
  const regressors: Regressor[] = [
    ...demographics,
    ...data.logPrices.map((values, j) => ({ label: `ln price of ${data.goods[j]}`, values })),
    { label: "ln total expenditure", values: data.logTotal },
    ...extra,
  ];
  const without = data.shares.map((share) => share.reduce((count, value) => (value === 0 ? count + 1 : count), 0));
  if (without.every((count) => count === 0)) {
    throw refuse(
      `Every one of the ${data.rows} rows used buys all ${data.goods.length} goods: there are no zeros for two steps to allow for.`,
    );
  }
  const nobody = data.goods.filter((_, i) => without[i] === data.rows);
  if (nobody.length > 0)
    throw refuse(`None of the ${data.rows} rows used buys ${nobody.join(", ")}: leave it out of the goods.`);
  const triangle = factorOf(data, regressors);
  const matrix = [new Float64Array(data.rows).fill(1), ...regressors.map(({ values }) => values)];
  return {
    regressors: ["constant", ...regressors.map(({ label }) => label)],
    goods: data.goods.map((good, i) => {
      const shares = data.shares[i];
      const boughtNone = weightOf(shares, data.weights);
      if (without[i] === 0) return { good, boughtNone, rowsWithout: 0 };
      const chosen = Uint8Array.from(shares, (share) => (share === 0 ? 0 : 1));
      const found = probit({ columns: matrix, triangle, chosen, ...(data.weights && { weights: data.weights }) });
      if (typeof found === "string") throw refuseProbit(data, i, found, without[i]);
      const probability = found.index.map(normalProbability);
      return {
        good,
        boughtNone,
        rowsWithout: without[i],
        step: { probit: found, probability, density: found.index.map(normalDensity) },
      };
    }),
  };
}

const refuse = (sentence: string) => new Refusal([{ sentence, key: ["zeros"] }]);

function refuseProbit(data: PreparedData, good: number, why: "separated" | "not converged", without: number): Refusal {
  const name = data.goods[good];
  const row = data.rowNumbers[data.shares[good].indexOf(0)];
  const counts = `${without} of the ${data.rows} rows used ${without === 1 ? "buys" : "buy"} none, first row ${row}`;
  const sentence =
    why === "separated"
      ? `The probit of ${name} has no estimate: some combination of its regressors tells the rows that buy it from those that do not without fail (${counts}). Leave those rows out with keep, or put ${name} together with another good.`
      : `The probit of ${name} did not converge (${counts}).`;
  return new Refusal([{ sentence, key: ["zeros"], row }]);
}

/** R of √h·X, the constant first. */
function factorOf(data: PreparedData, regressors: readonly Regressor[]): Columns {
  const size = regressors.length + 1;
  if (data.rows <= size) throw refuse(`A probit of ${size} coefficients needs more rows than the ${data.rows} used.`);
  const triangle = columnFactor(regressors, data.logTotal, data.weights);
  const dependent = dependentRegressor(triangle);
  if (dependent !== undefined) {
    const { label } = regressors[dependent.place];
    throw refuse(
      dependent.constant
        ? `The regressor ${label} of the probits is constant over the rows used.`
        : `The regressor ${label} of the probits is an exact linear combination of the constant and those before it.`,
    );
  }
  return ofRegressors(triangle);
}

function weightOf(shares: Float64Array, weights: Float64Array | undefined): number {
  let none = 0;
  let all = 0;
  for (let t = 0; t < shares.length; t++) {
    const h = weights === undefined ? 1 : weights[t];
    all += h;
    if (shares[t] === 0) none += h;
  }
  return none / all;
}
