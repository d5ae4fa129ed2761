import { standardError } from "../../../shared/numerics/matrix.ts";
import type { ExpenditureReport } from "../../../shared/schemas/equations.ts";
import type { Point } from "../../../shared/systems/demand-system.ts";
import { type FittedCoefficients, systemOf } from "../../../shared/systems/index.ts";
import { lesParts } from "../../../shared/systems/les-parts.ts";
import { supernumeraryAt } from "../../../shared/systems/les-supernumerary.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { demographicColumns } from "./points.ts";

const MOST_ROWS = 10;

/**
 * Where the linear expenditure system is regular (methods 2.4): rows whose supernumerary expenditure
 * x − Σ p_j c_j(z) is not positive, marginal budget shares outside (0, 1), and the Frisch parameter
 * φ = −x/(x − Σ p_j c_j(z)) at a point with its delta-method error (Frisch 1959, Econometrica 27). Absent for other systems.
 */
export function expenditureReport(
  fitted: FittedCoefficients,
  data: PreparedData,
  point: Point,
): ExpenditureReport | undefined {
  if (fitted.form !== "les") return undefined;
  const { size } = systemOf(fitted);
  const { share, gradient } = supernumeraryAt(fitted.theta, size, point);
  const { marginal } = lesParts(fitted.theta, size);
  return {
    withoutSupernumerary: rowsWithout(fitted, data),
    atBound: fitted.goods.flatMap((good, i) =>
      marginal[i] > 0 && marginal[i] < 1 ? [] : [{ good, estimate: marginal[i] }],
    ),
    ...(share > 0 && {
      frisch: {
        estimate: -1 / share,
        standardError: standardError(fitted.covariance, gradient) / share ** 2,
      },
    }),
  };
}

function rowsWithout(fitted: FittedCoefficients, data: PreparedData): ExpenditureReport["withoutSupernumerary"] {
  const { size } = systemOf(fitted);
  const demographics = demographicColumns(data, fitted.demographics);
  const firstRows: number[] = [];
  let rows = 0;
  let without = 0;
  let total = 0;
  for (let t = 0; t < data.rows; t++) {
    const weight = data.weights?.[t] ?? 1;
    total += weight;
    const prices = data.logPrices.map((column) => Math.exp(column[t]));
    const at = { prices, total: Math.exp(data.logTotal[t]), demographics: demographics.map((column) => column[t]) };
    if (supernumeraryAt(fitted.theta, size, at).share > 0) continue;
    rows++;
    without += weight;
    if (firstRows.length < MOST_ROWS) firstRows.push(data.rowNumbers[t]);
  }
  return { rows, weightedShare: without / total, firstRows };
}
