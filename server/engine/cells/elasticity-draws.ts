import { AggregateResponses } from "../../../shared/economics/aggregate.ts";
import { type ElasticityValues, elasticityValues } from "../../../shared/economics/elasticities.ts";
import { type ResponseOptions, responsesFrom } from "../../../shared/economics/responses.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import type { Evaluator, Slopes } from "../../../shared/systems/demand-system.ts";
import { systemOf } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { Poll } from "../run.ts";
import { demographicColumns } from "./points.ts";

/** Products over all rows and draws up to which percentiles are formed: some fifteen seconds. */
const MOST_PRODUCTS = 1e8;

/** The bootstrap's draws where going over the rows at each of them is a matter of seconds; else none. */
export function drawsOverRows(
  { bootstrap }: SystemFinding,
  { rows, goods }: PreparedData,
): readonly number[][] | undefined {
  const draws = bootstrap?.draws;
  return draws !== undefined && rows * draws.length * goods.length ** 2 <= MOST_PRODUCTS ? draws : undefined;
}

/**
 * The elasticities over some rows (`AggregateResponses`) at every bootstrap draw of the coefficients: the rows are held,
 * as they are by the delta method. Rows in which a draw defines no shares are left out at that draw.
 */
export function elasticitiesOverDraws(
  fitted: SystemFinding["fitted"],
  draws: readonly (readonly number[])[],
  rows: Int32Array,
  { observed, index }: { readonly observed: boolean; readonly index: ResponseOptions["index"] },
  data: PreparedData,
  poll: Poll,
): ElasticityValues[] {
  const { system, size } = systemOf(fitted);
  const demographics = demographicColumns(data, fitted.demographics);
  const each = Array.from(rows, (t) => ({
    logPrices: data.logPrices.map((column) => column[t]),
    logTotal: data.logTotal[t],
    own: demographics.map((column) => column[t]),
    options: { index, ...(observed && { observed: data.shares.map((column) => column[t]) }) },
    weight: (data.weights ? data.weights[t] : 1) * Math.exp(data.logTotal[t]),
  }));
  return draws.map((theta) => {
    poll();
    const evaluator = system.evaluator(theta, size);
    const sums = new AggregateResponses(data.goods.length);
    for (const { logPrices, logTotal, own, options, weight } of each) {
      evaluator.at(logPrices, logTotal, own);
      if (Number.isNaN(evaluator.shares[0])) continue;
      sums.add(responsesFrom(fitted.form, heldBy(evaluator), logPrices, options), weight);
    }
    return elasticityValues(sums.result());
  });
}

/** What an evaluator carries, as rows of numbers of one's own. */
export function heldBy({ shares, total, prices }: Evaluator): Slopes {
  const n = shares.length;
  return {
    shares: Array.from(shares),
    total: Array.from(total),
    prices: Array.from({ length: n }, (_, i) => Array.from(prices.subarray(i * n, (i + 1) * n))),
  };
}
