import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { DemandSystem, Point, SystemSize } from "../../../../shared/systems/demand-system.ts";
import { quaidsPlaces } from "../../../../shared/systems/quaids-parts.ts";
import { Refusal } from "../../refusal.ts";
import type { RunControl } from "../../run.ts";
import { constrainedForm } from "../coefficient-form.ts";
import { dot, pickColumns } from "../columns.ts";
import type { Estimation } from "../estimation.ts";
import { firstLeastSquares, leastSquares, seeminglyUnrelated } from "../estimators.ts";
import { minimise, type Solution } from "../minimise.ts";
import { asOneColumn, weightBlocks } from "../residuals.ts";
import { residualCovariance } from "../weighting.ts";
import { bentForm, restAfter } from "./bent-form.ts";
import { type CurvatureMap, curvatureMap } from "./curvature-map.ts";
import { type CurvedForm, isQuadratic } from "./curved-parts.ts";
import { compensatedResponses, entriesOfTriangle, nearestTriangle, rankOf } from "./negative-matrix.ts";
import { steepestColumn } from "./steepest-column.ts";

/** An eigenvalue of −K below this part of the largest counts as none. */
const NO_RANK = 1e-8;
const MOST_HALVINGS = 30;

export interface CurvedFit {
  readonly estimation: Estimation;
  readonly solution: Solution;
  /** Of the Slutsky matrix at the point, as estimated; less than asked where more would not raise the fit. */
  readonly rank: number;
  /** False where the estimates satisfy it without being made to. */
  readonly binds: boolean;
}

export interface CurvedTask {
  readonly specification: SystemSpecification;
  readonly form: CurvedForm;
  readonly system: DemandSystem;
  readonly size: SystemSize;
  /** Homogeneity and symmetry imposed, curvature not, and its solution. */
  readonly estimation: Estimation;
  readonly solution: Solution;
  /** k of the system itself; what stands after them in θ has restrictions of its own. */
  readonly own: number;
  readonly point: Point;
  readonly rank: number;
  readonly pointName: string;
}

/**
 * Estimates with a Slutsky matrix that is negative semidefinite of at most the given rank at a point. Where the
 * estimates without it are so already they are the answer. Otherwise from the nearest matrix that is, at the rank
 * of its negative part, and then with one column of L more as long as that raises the fit (semiflexible forms of
 * Diewert & Wales 1988, Journal of Business & Economic Statistics 6): the columns that remain are not zero, so the
 * derivatives in them are not either, and the covariance holds for the rank found.
 *
 * Errors: as of the estimator; curvature that no rank satisfies.
 */
export function fitCurved(task: CurvedTask, control: RunControl): CurvedFit {
  const { system, size, solution, own, point, rank } = task;
  const free = solution.theta.slice(0, own);
  const matrix = compensatedResponses(system.slopes(solution.theta, size, point));
  const before = rankOf(matrix, NO_RANK);
  const isFull = rank === size.goods - 1;
  if (isFull && before === rank) return { estimation: task.estimation, solution, rank, binds: false };
  let at = Math.max(1, Math.min(rank, before));
  const triangle = nearestTriangle(matrix, at);
  let fit = refit(
    task,
    at,
    [...beforeTriangle(task, free), ...(before === 0 ? triangle.map(() => 0.05) : triangle)],
    control,
  );
  while (at < rank) {
    const wider = widen(task, fit, at, control);
    if (wider === undefined) break;
    fit = wider;
    at++;
  }
  return { ...fit, rank: at, binds: true };
}

interface Fit {
  readonly estimation: Estimation;
  readonly solution: Solution;
}

function mapAt({ form, size, point }: CurvedTask, rank: number): CurvatureMap {
  return curvatureMap(form, size, point, rank);
}

/** Places in θ of α, α_is, β and λ of all goods but the last, in the order in which they stand in φ before L. */
function placesBeforeTriangle({ form, size }: CurvedTask): number[] {
  const { alpha, demographic, beta, lambda } = quaidsPlaces(size);
  const butLast = Array.from({ length: size.goods - 1 }, (_, i) => i);
  return [
    ...butLast.map(alpha),
    ...Array.from({ length: size.demographics }, (_, k) => butLast.map((i) => demographic(i, k))).flat(),
    ...butLast.map(beta),
    ...(isQuadratic(form) ? butLast.map(lambda) : []),
  ];
}

/** w* in place of α, then α_is, β and λ as they are: φ before L. */
function beforeTriangle(task: CurvedTask, theta: readonly number[]): number[] {
  const { system, size, point } = task;
  const { shares } = system.slopes(theta, size, point);
  return placesBeforeTriangle(task).map((place, f) => (f < size.goods - 1 ? shares[f] : theta[place]));
}

/** The place in θ that each free coefficient speaks of most nearly, for refusals that name it. */
function placesOf(task: CurvedTask, rank: number): number[] {
  const { gamma } = quaidsPlaces(task.size);
  const entries = entriesOfTriangle(task.size.goods, rank);
  return [...placesBeforeTriangle(task), ...entries.map(([row, column]) => gamma(row, column))];
}

function refit(task: CurvedTask, rank: number, start: readonly number[], control: RunControl): Fit {
  const { specification, system, size, own } = task;
  const map = mapAt(task, rank);
  const linear = task.estimation.form.expand;
  const rest = restAfter(linear, own);
  const further = linear.places.filter((place) => place >= own).map((place) => task.solution.theta[place]);
  const free = start.length === map.free ? [...start, ...further] : [...start];
  const formAt = (at: readonly number[]) => bentForm(system, size, map, placesOf(task, rank), rest, at);
  const estimation: Estimation = { ...task.estimation, form: formAt(free) };
  try {
    const solution = estimate(task, specification, estimation, free, control);
    // S of the expansion is what covariances are made with: formed where the estimates are.
    return { estimation: { ...estimation, form: formAt(solution.free) }, solution };
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const sentence = `Curvature could not be imposed at the ${task.pointName} with rank ${rank}. ${error.message}`;
    throw new Refusal([{ sentence, key: ["curvature"] }]);
  }
}

function estimate(
  { system, size, solution }: CurvedTask,
  { estimator }: SystemSpecification,
  estimation: Estimation,
  free: readonly number[],
  control: RunControl,
): Solution {
  switch (estimator) {
    case "least squares":
      return leastSquares(estimation, true, free, control);
    case "seemingly unrelated": {
      // Σ̂ of the first step holds no restriction across equations, curvature no more than symmetry.
      const form = constrainedForm(system, size, system.free(size, ["homogeneity"]));
      const start = form.expand.places.map((place) => solution.theta[place]);
      const first = firstLeastSquares({ ...estimation, form }, true, start, control);
      return seeminglyUnrelated(estimation, first, free, control);
    }
    case "iterated seemingly unrelated":
      return minimise(estimation, { kind: "likelihood", step: "update" }, free, control);
    case "maximum likelihood":
      return minimise(estimation, { kind: "likelihood", step: "newton" }, free, control);
  }
}

/** The fit with one column more, or undefined where none raises it. */
function widen(task: CurvedTask, fit: Fit, rank: number, control: RunControl): Fit | undefined {
  const { system, size } = task;
  const narrow = mapAt(task, rank);
  const wider = mapAt(task, rank + 1);
  const entries = wider.free - narrow.free;
  const ownFree = fit.solution.free.slice(0, narrow.free);
  const further = fit.solution.free.slice(narrow.free);
  const zeroed = [...ownFree, ...new Array<number>(entries).fill(0)];
  const direction = steepestColumn(system, size, fit.solution, task.estimation.equations, wider, zeroed, entries);
  if (direction === undefined) return undefined;
  const scale = Math.hypot(...ownFree.slice(narrow.triangle)) / Math.sqrt(narrow.free - narrow.triangle);
  for (let halving = 0; halving < MOST_HALVINGS; halving++) {
    const column = direction.map((entry) => entry * scale * 2 ** -halving);
    const next = refit(task, rank + 1, [...ownFree, ...column, ...further], control);
    if (criterionOf(next, task.specification) < criterionOf(fit, task.specification)) return next;
  }
  return undefined;
}

/** What the estimator minimises, at the solution. */
function criterionOf({ estimation, solution }: Fit, { estimator }: SystemSpecification): number {
  const { equations, moments } = estimation;
  const { residuals } = solution;
  if (estimator === "maximum likelihood" || estimator === "iterated seemingly unrelated") {
    const { logDeterminant } = residualCovariance(residuals, moments.rows, equations, moments.responseLabels);
    return (moments.rows / 2) * logDeterminant;
  }
  const weighted = weightBlocks(asOneColumn(pickColumns(residuals, equations)), residuals.rows, solution.weight);
  return 0.5 * dot(weighted.values, weighted.values);
}
