import { matrixAt } from "../../../shared/economics/slutsky.ts";
import { type SlutskyFinding, type SlutskySpecification, slutskyFinding } from "../../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { QUIET, type RunControl } from "../run.ts";
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
  const options = { priceScale, totalScale, pointName };
  const at = refusingRanges(() => matrixAt(fitted, point, options), pointName);
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
    at: { ...at, checks: { ...at.checks, ...(system.checks.sample && { sample: system.checks.sample }) } },
    tests: system.tests,
    ...(sample && { sample }),
    brokenRows,
  });
}
