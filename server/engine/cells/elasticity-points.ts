import type { z } from "zod";
import { elasticityValues } from "../../../shared/economics/elasticities.ts";
import { overDraws } from "../../../shared/economics/percentile.ts";
import { responsesAt, responsesValuesAt } from "../../../shared/economics/responses.ts";
import type {
  ElasticitiesSpecification,
  ElasticityGroup,
  undefinedGroup,
} from "../../../shared/schemas/elasticities.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import type { Point } from "../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { polling, type RunControl } from "../run.ts";
import { evaluatedGroup, notPositive } from "./elasticity-at.ts";
import type { RowGroup } from "./elasticity-groups.ts";
import { demographicColumns } from "./points.ts";
import { pointOf } from "./slutsky-point.ts";

export type GroupOrReason = ElasticityGroup | z.infer<typeof undefinedGroup>;
type Options = Pick<ElasticitiesSpecification, "shares" | "index" | "level">;

/** One point: where the specification says, or at the mean. Errors: `Refusal` of a row that is not there. */
export function atOnePoint(
  at: ElasticitiesSpecification["at"],
  options: Options,
  system: SystemFinding,
  data: PreparedData,
  control: RunControl,
): GroupOrReason {
  const { point, pointName } = pointOf(at ?? "mean", system, data);
  const own = typeof at === "object" && "row" in at ? Int32Array.of(data.rowNumbers.indexOf(at.row)) : undefined;
  return evaluate(
    { name: pointName, total: point.total * data.totalScale },
    point,
    options,
    system,
    data,
    own,
    control,
  );
}

/** At the mean point of a group: weighted geometric means of prices and total, weighted means of demographics. */
export function atGroupMean(
  { name, rows }: RowGroup,
  options: Options,
  system: SystemFinding,
  data: PreparedData,
  control: RunControl,
): GroupOrReason {
  const mean = (column: Float64Array) => meanOver(column, rows, data.weights);
  const point: Point = {
    prices: data.logPrices.map((column) => Math.exp(mean(column))),
    total: Math.exp(mean(data.logTotal)),
    demographics: demographicColumns(data, system.fitted.demographics).map(mean),
  };
  const about = {
    name,
    rows: rows.length,
    weightShare: weightOver(rows, data.weights) / weightOver(undefined, data.weights, data.rows),
    total: point.total * data.totalScale,
  };
  return evaluate(about, point, options, system, data, rows, control);
}

function evaluate(
  about: Pick<ElasticityGroup, "name" | "rows" | "weightShare" | "total">,
  point: Point,
  { shares, index, level }: Options,
  { fitted, bootstrap }: SystemFinding,
  data: PreparedData,
  rows: Int32Array | undefined,
  control: RunControl,
): GroupOrReason {
  const observed = shares === "observed" && data.shares.map((column) => meanOver(column, rows, data.weights));
  const responseOptions = { index, ...(observed && { observed }) };
  try {
    const at = responsesAt(fitted, point, responseOptions);
    const reason = notPositive(at.responses.shares, fitted.goods, shares);
    if (reason !== undefined) return { ...about, undefined: reason };
    const drawn =
      bootstrap?.draws &&
      overDraws(fitted, bootstrap.draws, (draw) => elasticityValues(responsesValuesAt(draw, point, responseOptions)));
    const named = { prices: [...point.prices], total: point.total, demographics: [...point.demographics] };
    const poll = polling(control, "evaluating elasticities");
    return { ...about, point: named, notPositive: [], ...evaluatedGroup(fitted, at, level, poll, drawn) };
  } catch (error) {
    // What a system does not define at a point (LA-AIDS far from its base prices) says so itself.
    if (!(error instanceof RangeError)) throw error;
    return { ...about, undefined: `${capital(error.message)}.` };
  }
}

/** Σ h v / Σ h over some rows, or all. */
export function meanOver(values: Float64Array, rows: Int32Array | undefined, weights: Float64Array | undefined) {
  let sum = 0;
  let total = 0;
  const count = rows ? rows.length : values.length;
  for (let at = 0; at < count; at++) {
    const t = rows ? rows[at] : at;
    const weight = weights ? weights[t] : 1;
    sum += weight * values[t];
    total += weight;
  }
  return sum / total;
}

/** Σ h over some rows, or over the first `count`. */
export function weightOver(rows: Int32Array | undefined, weights: Float64Array | undefined, count = 0): number {
  if (!rows) return weights ? weights.reduce((sum, weight) => sum + weight, 0) : count;
  return weights ? rows.reduce((sum, t) => sum + weights[t], 0) : rows.length;
}
