import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { systemForm } from "../../estimation/coefficient-form.ts";
import { type CurvaturePoint, imposeCurvature } from "../../estimation/curvature/impose.ts";
import { solveExact } from "../../estimation/easi/solve-exact.ts";
import { isExactEasi } from "../../estimation/easi/specification.ts";
import type { Estimation } from "../../estimation/estimation.ts";
import { locatable } from "../../estimation/local-moments.ts";
import type { MomentSource } from "../../estimation/moment-source.ts";
import { type Moments, type ReductionPlan, reduceRows } from "../../estimation/moments.ts";
import { momentsRequest, sourceOf } from "../../estimation/request.ts";
import { solveNear } from "../../estimation/solve.ts";
import { specifiedSystem } from "../../estimation/specified-system.ts";
import { Refusal, type Refused, unlessRefused } from "../../refusal.ts";
import type { RunControl } from "../../run.ts";
import { task } from "../../threads/map-in-order.ts";
import type { ClusterMoments } from "../cluster-moments.ts";
import { dataOfRows } from "./drawn-data.ts";
import { momentsOfClusters, momentsOfRows } from "./drawn-moments.ts";
import { momentsOfResiduals, type ResidualSource } from "./residuals.ts";
import { draw, type Sampling } from "./sampling.ts";

/** What a drawn sample's moments are formed from. */
export type Drawable =
  | { readonly kind: "clusters"; readonly header: MomentSource; readonly moments: ClusterMoments }
  | {
      readonly kind: "rows";
      readonly source: MomentSource;
      readonly reduction: ReductionPlan;
      /** Where clusters are drawn: rows in the order of their clusters. */
      readonly starts?: Int32Array;
    }
  | { readonly kind: "residuals"; readonly residuals: ResidualSource }
  /** Where first steps come before the system, or its terms move with θ: the drawn rows go the whole way again. */
  | { readonly kind: "data"; readonly starts?: Int32Array; readonly order?: Int32Array };

/** All that a replicate needs: plain data, so that any thread can estimate any of them. */
export interface ReplicateWork {
  readonly specification: SystemSpecification;
  readonly data: PreparedData;
  readonly size: SystemSize;
  readonly equations: readonly number[];
  readonly coefficientLabels: readonly string[];
  /** θ̂, where replicates start. */
  readonly theta: readonly number[];
  readonly sampling: Sampling;
  readonly drawable: Drawable;
  readonly curvatureAt?: CurvaturePoint;
}

/** θ* of a replicate, or why it has none. */
export type Replicate = { readonly theta: number[] } | Refused;

export const replicateTask = task(
  import.meta.url,
  "replicateTask",
  (work: ReplicateWork, replicate: number, control: RunControl): Replicate =>
    // One replicate's failure is none of the others'.
    unlessRefused(() => {
      if (work.drawable.kind === "data") return { theta: reestimateData(work, work.drawable, replicate, control) };
      return { theta: reestimate(work, drawnMoments(work, work.drawable, replicate, control), control) };
    }),
);

/** The moments of replicate number `replicate`. */
function drawnMoments(
  { sampling }: ReplicateWork,
  drawable: Exclude<Drawable, { kind: "data" }>,
  replicate: number,
  control: RunControl,
): Moments {
  const drawn = draw(sampling, replicate);
  switch (drawable.kind) {
    case "clusters":
      return momentsOfClusters(drawable.header, drawable.moments, drawn);
    case "rows": {
      const rows = drawable.starts === undefined ? drawn : rowsOfClusters(drawn, drawable.starts);
      return momentsOfRows(drawable.source, drawable.reduction, rows, control);
    }
    case "residuals":
      return momentsOfResiduals(drawable.residuals, drawn, control);
  }
}

/** The rows of the clusters drawn, those of cluster g standing from `starts[g]` to before `starts[g + 1]`. */
function rowsOfClusters(drawn: Int32Array, starts: Int32Array): Int32Array {
  const rows = new Int32Array(drawn.reduce((sum, g) => sum + starts[g + 1] - starts[g], 0));
  let place = 0;
  for (const g of drawn) for (let row = starts[g]; row < starts[g + 1]; row++) rows[place++] = row;
  return rows;
}

/** θ* by the estimator of the specification from the moments of a drawn sample. Errors: as those of estimating. */
function reestimate(
  { specification, data, size, equations, coefficientLabels, theta, curvatureAt }: ReplicateWork,
  moments: Moments,
  control: RunControl,
): number[] {
  const system = specifiedSystem(specification, data);
  if (system.layout(size).length !== coefficientLabels.length) {
    throw new Refusal(
      "In the rows drawn other goods have zeros than in the sample, so that other coefficients are estimated.",
    );
  }
  const form = systemForm(system, size, specification.impose);
  const estimation: Estimation = { moments, form, equations, coefficientLabels };
  const fit = { estimation, solution: solveNear(theta, specification, system, size, estimation, control) };
  return imposeCurvature(specification, system, size, fit, curvatureAt, control).solution.theta;
}

/** θ* from the rows drawn, first steps included. Errors: as those of estimating. */
function reestimateData(
  work: ReplicateWork,
  { starts, order }: Extract<Drawable, { kind: "data" }>,
  replicate: number,
  control: RunControl,
): number[] {
  const drawn = draw(work.sampling, replicate);
  const grouped = starts === undefined ? drawn : rowsOfClusters(drawn, starts);
  const data = dataOfRows(work.data, order === undefined ? grouped : grouped.map((place) => order[place]));
  const { specification, size } = work;
  const request = momentsRequest(specification, data);
  const nearby = reduceRows(sourceOf(data, request), request.key, control);
  const theta = isExactEasi(specification)
    ? exactTheta(work, data, nearby, control)
    : reestimate({ ...work, data }, locatable(nearby, data, request, momentsForm(work, data), size), control);
  if (theta.length === work.theta.length) return theta;
  throw new Refusal("Among the drawn rows some good is bought by all, or by none, that is not among the rows used.");
}

const momentsForm = ({ specification }: ReplicateWork, data: PreparedData) =>
  specifiedSystem(specification, data).moments;

/** θ* of EASI with implicit utility, from the moments of its approximate form. */
function exactTheta(work: ReplicateWork, data: PreparedData, moments: Moments, control: RunControl): number[] {
  const { specification, size, equations, coefficientLabels } = work;
  const form = systemForm(specifiedSystem(specification, data), size, specification.impose);
  const estimation: Estimation = { moments, form, equations, coefficientLabels };
  return solveExact(specification, data, size, estimation, control).exact.solution.theta;
}
