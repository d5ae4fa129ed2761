import type { RowAccounting } from "../../../shared/schemas/data.ts";
import type { SlutskySpecification } from "../../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import type { Point } from "../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { pointOfRow } from "./points.ts";
import { weightedQuantiles } from "./weighted.ts";

/** Where a slutsky cell stands, in units of estimation, and what that place is called. */
export interface NamedPoint {
  readonly point: Point;
  readonly pointName: string;
}

/** Errors: `Refusal` for a row that is not there or is left out, and for prices that do not cover the goods. */
export function pointOf(at: SlutskySpecification["at"], system: SystemFinding, data: PreparedData): NamedPoint {
  const { base, mean } = system.points;
  if (at === "base point") return { point: base, pointName: "base point" };
  if (at === "mean") return { point: mean, pointName: "mean" };
  if ("row" in at) {
    const point = pointOfRow(data, system.fitted.demographics, positionOf(at.row, data));
    return { point, pointName: `row ${at.row}` };
  }
  if ("prices" in at) return { point: ownPoint(at, system, data), pointName: "a point of one's own" };
  const fraction = Number(at.x.slice("quantile ".length));
  const [logTotal] = weightedQuantiles(data.logTotal, [fraction], data.weights);
  return { point: { ...mean, total: Math.exp(logTotal) }, pointName: `quantile ${fraction} of expenditure` };
}

/** Prices and x as uploaded, demographics at their means. */
function ownPoint(at: { prices: Record<string, number>; x: number }, system: SystemFinding, data: PreparedData): Point {
  const { goods } = system.fitted;
  const missing = goods.filter((good) => at.prices[good] === undefined);
  if (missing.length > 0) {
    const given = Object.keys(at.prices).length;
    const sentence = `prices has ${given} ${given === 1 ? "good" : "goods"}, the system has ${goods.length}: ${missing.join(", ")} without a price.`;
    throw new Refusal([{ sentence, key: ["at", "prices"] }]);
  }
  return {
    prices: goods.map((good, i) => at.prices[good] / data.priceScale[i]),
    total: at.x / data.totalScale,
    demographics: system.points.mean.demographics,
  };
}

/** Where in the rows used a row of the upload stands. Errors: `Refusal` under `key`. */
export function positionOf(row: number, data: PreparedData, key = ["at", "row"]): number {
  const position = data.rowNumbers.indexOf(row);
  if (position >= 0) return position;
  const { accounting } = data.finding;
  if (row > accounting.uploaded) {
    throw new Refusal([{ sentence: `The upload has ${accounting.uploaded} rows; there is no row ${row}.`, key, row }]);
  }
  const reason = reasonOf(row, accounting);
  const because = reason ? `: ${reason.charAt(0).toLowerCase()}${reason.slice(1)}` : "";
  throw new Refusal([{ sentence: `Row ${row} is not among the rows used${because}.`, key, row }]);
}

/** By the row itself, or, where a reason took more rows than it lists, by being the only one in that part of the file. */
function reasonOf(row: number, { leftOut, uploaded }: RowAccounting): string | undefined {
  const listed = leftOut.find(({ rows }) => rows.includes(row));
  if (listed) return listed.label;
  const there = leftOut.filter(({ rows, count, strip }) => {
    const slice = Math.min(strip.length - 1, Math.floor(((row - 1) * strip.length) / uploaded));
    return count > rows.length && strip[slice] > 0;
  });
  return there.length === 1 ? there[0].label : undefined;
}
