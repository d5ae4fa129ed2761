import { createRowChecker, type RowChecker } from "../../../shared/economics/sample.ts";
import type { FittedCoefficients } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Cancelled, type RunControl } from "../run.ts";
import { demographicColumns } from "./points.ts";

const ROWS_BETWEEN_REPORTS = 2048;
/** An eigenvalue of many goods takes a millisecond. */
const ROWS_BETWEEN_POLLS = 64;

/**
 * Stands the checker at every row used, in turn, at the row's own prices, total and demographics (in a system
 * in differences, its own shares), and
 * hands it over with the row's position and weight. Says how far it is and stops when told to.
 */
export function forEachRow(
  fitted: Omit<FittedCoefficients, "covariance">,
  data: PreparedData,
  control: RunControl,
  visit: (row: RowChecker, t: number, weight: number) => void,
): void {
  const checker = createRowChecker(fitted);
  const demographics = demographicColumns(data, fitted.demographics);
  const logPrices = new Float64Array(data.goods.length);
  const own = new Float64Array(demographics.length);
  const observed = new Float64Array(data.goods.length);
  for (let t = 0; t < data.rows; t++) {
    if (t % ROWS_BETWEEN_POLLS === 0 && control.cancelled()) throw new Cancelled("cancelled while checking rows");
    if (t % ROWS_BETWEEN_REPORTS === 0) control.progress({ step: "checking rows", fraction: t / data.rows });
    for (let j = 0; j < logPrices.length; j++) logPrices[j] = data.logPrices[j][t];
    for (let k = 0; k < own.length; k++) own[k] = demographics[k][t];
    checker.evaluate(logPrices, data.logTotal[t], own);
    if (checker.evaluateAtShares !== undefined) {
      for (let j = 0; j < observed.length; j++) observed[j] = data.shares[j][t];
      checker.evaluateAtShares(observed);
    }
    visit(checker, t, data.weights ? data.weights[t] : 1);
  }
}
