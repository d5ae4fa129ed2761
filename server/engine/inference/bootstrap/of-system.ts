import type { BootstrapSpecification, ClustersFinding } from "../../../../shared/schemas/standard-errors.ts";
import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { demographicColumn } from "../../columns/seasonal-terms.ts";
import type { CurvaturePoint } from "../../estimation/curvature/impose.ts";
import { isExactEasi } from "../../estimation/easi/specification.ts";
import type { Estimation } from "../../estimation/estimation.ts";
import type { Solution } from "../../estimation/minimise.ts";
import type { MomentSource } from "../../estimation/moment-source.ts";
import { planReduction } from "../../estimation/moments.ts";
import { requirePeriods, timeOrder } from "../../estimation/time-order.ts";
import { Refusal } from "../../refusal.ts";
import type { RunControl } from "../../run.ts";
import { clusterRows } from "../clustered-rows.ts";
import { clusterColumn, clustersOfRows } from "../row-groups.ts";
import { momentsOfClusters } from "../sandwich.ts";
import { withoutRows } from "./drawn-moments.ts";
import type { Drawable, ReplicateWork } from "./replicate.ts";
import { residualSource } from "./residuals.ts";
import { defaultBlock, type Sampling } from "./sampling.ts";

/** A fitted system whose estimates are to be drawn again. */
export interface Fitted {
  readonly specification: SystemSpecification;
  readonly data: PreparedData;
  readonly size: SystemSize;
  readonly estimation: Estimation;
  readonly solution: Solution;
  /** The rows of the equations, with terms that move with θ as they are at the solution. */
  source(): MomentSource;
  /** Where negativity is imposed, if it is. */
  readonly curvatureAt?: CurvaturePoint;
}

/**
 * How replicates of a specification are drawn and estimated from moments.
 *
 * Rows, clusters and blocks carry their weights; LA-AIDS keeps the index, with the means of the sample, that its
 * rows have. Of residuals, prices, total and index stay as observed, also where the index holds current shares.
 *
 * Errors: a refusal for a cluster column that groups nothing, for blocks without one row a period.
 */
export function replicateWork(
  fitted: Fitted,
  asked: BootstrapSpecification,
  control: RunControl,
): { work: ReplicateWork; clusters?: ClustersFinding } {
  const { specification, data, size, estimation, solution } = fitted;
  const { sampling, drawable, clusters } = drawn(fitted, asked, control);
  const work: ReplicateWork = {
    specification,
    data: whatIsLookedAt(drawable, specification, data),
    size,
    equations: estimation.equations,
    coefficientLabels: estimation.coefficientLabels,
    theta: solution.theta,
    sampling,
    drawable,
    ...(fitted.curvatureAt && { curvatureAt: fitted.curvatureAt }),
  };
  return { work, ...(clusters && { clusters }) };
}

function drawn(
  { specification, data, estimation, solution, source: rowsOf }: Fitted,
  { bootstrap: of, seed, block, cluster }: BootstrapSpecification,
  control: RunControl,
): { sampling: Sampling; drawable: Drawable; clusters?: ClustersFinding } {
  const source = rowsOf();
  const units = source.rows;
  const whole = wholeWay(specification, estimation);
  if (whole && source.dataRows) throw withoutPeriodBefore(whole);
  const rows: Drawable = whole ? { kind: "data" } : { kind: "rows", source, reduction: planReduction(source, control) };
  switch (of) {
    case "rows":
      return { sampling: { of, seed, units }, drawable: rows };
    case "blocks": {
      requirePeriods(data, "A bootstrap of blocks", ["standard errors", "bootstrap"]);
      const length = block ?? defaultBlock(units);
      if (length > units) throw tooLong(length, units);
      return { sampling: { of, seed, units, block: length, order: orderOfTime(data, source) }, drawable: rows };
    }
    case "residuals": {
      if (whole) throw notOfResiduals(whole);
      const coefficients = estimation.form.coefficients(solution.free);
      const residuals = residualSource(source, planReduction(source, control), coefficients);
      const runningWeights = source.weights && runningSums(source.weights);
      const sampling = { of, seed, units, ...(runningWeights && { runningWeights }) };
      return { sampling, drawable: { kind: "residuals", residuals } };
    }
    case "clusters": {
      const key = ["standard errors", cluster === undefined ? "bootstrap" : "cluster"];
      const { codes, finding } = clustersOfRows(data, source, clusterColumn(data, cluster), key);
      const sampling: Sampling = { of, seed, units: codes.count };
      const named = { ...codes, column: finding.column };
      const moments = whole ? undefined : momentsOfClusters(source, named, estimation.moments.terms, control);
      if (moments)
        return { sampling, drawable: { kind: "clusters", header: withoutRows(source), moments }, clusters: finding };
      const together = clusterRows(source, codes);
      const { starts, order } = together;
      const drawable: Drawable = whole
        ? { kind: "data", starts, order }
        : { kind: "rows", source: together.source, reduction: planReduction(source, control), starts };
      return { sampling, drawable, clusters: finding };
    }
  }
}

/** What makes a replicate go the whole way from the rows, if anything does. */
function wholeWay(specification: SystemSpecification, { moments }: Estimation): string | undefined {
  const { instruments, zeros } = specification;
  if (isExactEasi(specification)) return "implicit utility holds the shares of its row";
  if (instruments !== undefined) return "its first stage explains total expenditure";
  if (zeros !== undefined) return "its first step explains who buys at all";
  return moments.local && "terms of this system move with its coefficients";
}

function notOfResiduals(because: string): Refusal {
  const sentence = `A bootstrap of residuals holds everything but the shares fixed, and ${because}: draw rows or clusters instead.`;
  return new Refusal([{ sentence, key: ["standard errors", "bootstrap"] }]);
}

function withoutPeriodBefore(because: string): Refusal {
  const sentence = `Rows drawn again have no period before them, which these equations need, and ${because}: ask for conventional, heteroskedastic or clustered standard errors.`;
  return new Refusal([{ sentence, key: ["standard errors", "bootstrap"] }]);
}

function tooLong(block: number, periods: number): Refusal {
  const sentence = `block is ${block} periods, and the data have ${periods}.`;
  return new Refusal([{ sentence, key: ["standard errors", "block"] }]);
}

/** Rows of the source in the order of time. */
function orderOfTime(data: PreparedData, { dataRows }: MomentSource): Int32Array {
  if (dataRows === undefined) return timeOrder(data);
  const { time } = data;
  return Int32Array.from(dataRows.keys()).sort((one, two) => time![dataRows[one]] - time![dataRows[two]]);
}

/** The whole way looks at every column; besides, only a system in differences looks at the data again. */
function whatIsLookedAt(drawable: Drawable, specification: SystemSpecification, data: PreparedData): PreparedData {
  if (drawable.kind !== "data") return specification.differences ? data : withoutColumns(data);
  // Seasons and trend count from the sample's first period, which need not be drawn.
  const shifts = specification.demographics.map((name) => [name, demographicColumn(data, name)!] as const);
  return { ...data, numeric: new Map([...data.numeric, ...shifts]) };
}

function runningSums(weights: Float64Array): Float64Array {
  let sum = 0;
  return weights.map((weight) => {
    sum += weight;
    return sum;
  });
}

function withoutColumns(data: PreparedData): PreparedData {
  const none = new Float64Array(0);
  const { labelled: _, clusters: __, weights: ___, ...rest } = data;
  return { ...rest, shares: [], logPrices: [], logTotal: none, numeric: new Map(), rowNumbers: new Int32Array(0) };
}
