import { type DrawnIntervals, drawnIntervals, withDrawnLargest } from "../../../shared/economics/drawn-intervals.ts";
import { matrixAt } from "../../../shared/economics/slutsky.ts";
import { quantityFactors } from "../../../shared/economics/slutsky-matrix.ts";
import { type SlutskyFinding, type SlutskySpecification, slutskyFinding } from "../../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import type { Matrix, Point } from "../../../shared/systems/demand-system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { polling, QUIET, type RunControl } from "../run.ts";
import { caveatsOf } from "./caveats-of.ts";
import { refusingRanges } from "./refusing.ts";
import { pointOf } from "./slutsky-point.ts";
import { negativityOverRows } from "./slutsky-sample.ts";

/**
 * A slutsky cell: the matrix of a fitted system at one point with its checks, and negativity over all rows.
 * Errors: `Refusal` (a row that was left out, a point without shares), `Cancelled`.
 */
export function runSlutsky(
  specification: SlutskySpecification,
  system: SystemFinding,
  data: PreparedData,
  control: RunControl = QUIET,
): SlutskyFinding {
  const { fitted } = system;
  const { priceScale, totalScale } = data;
  const { point, pointName } = pointOf(specification.at, system, data);
  const options = { priceScale, totalScale, pointName, poll: polling(control, "evaluating the matrix") };
  const at = refusingRanges(() => matrixAt(fitted, point, options), pointName);
  const drawn = system.bootstrap?.draws && drawnIntervals(fitted, system.bootstrap.draws, point);
  const checks = withDrawnLargest(at.checks, drawn);
  const { sample, brokenRows } = negativityOverRows(fitted, data, control);
  return slutskyFinding.parse({
    kind: "slutsky",
    dataFingerprint: system.dataFingerprint,
    fitted,
    form: specification.form,
    pointName,
    point,
    priceScale,
    totalScale,
    at: {
      ...at,
      ...(drawn && {
        eigenvalues: at.eigenvalues.map((one, r) => ({ ...one, interval: drawn.eigenvalues[r] })),
        intervals: intervalsOf(drawn, point, data),
      }),
      checks: { ...checks, ...(system.checks.sample && { sample: system.checks.sample }) },
    },
    tests: system.tests,
    ...caveatsOf(system),
    ...(system.conditionalOn !== undefined && { conditionalOn: system.conditionalOn }),
    ...(sample && { sample }),
    brokenRows,
  });
}

/** The quantity form is x/(p_i p_j) times the share form, and so are the ends of its intervals. */
function intervalsOf({ draws, share, compensated }: DrawnIntervals, point: Point, data: PreparedData) {
  const prices = point.prices.map((price, i) => price * data.priceScale[i]);
  const factors = quantityFactors(prices, point.total * data.totalScale);
  const inQuantities = (ends: Matrix) => ends.map((row, i) => row.map((end, j) => end * factors[i][j]));
  return { draws, share, quantity: { low: inQuantities(share.low), high: inQuantities(share.high) }, compensated };
}
