import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { withTimeTerms } from "../../server/engine/columns/seasonal-terms.ts";
import { estimateSystem } from "../../server/engine/estimation/estimate.ts";
import { locatable } from "../../server/engine/estimation/local-moments.ts";
import { type Reduction, reduceRows } from "../../server/engine/estimation/moments.ts";
import { momentsRequest, sizeOf, sourceOf } from "../../server/engine/estimation/request.ts";
import { specifiedSystem } from "../../server/engine/estimation/specified-system.ts";
import { QUIET } from "../../server/engine/run.ts";
import { type SystemSpecification, systemSpecification } from "../../shared/schemas/system.ts";

export function systemOver(data: PreparedData, specification: object): SystemSpecification {
  return systemSpecification.parse({
    kind: "system",
    data: "households",
    demographics: [...data.numeric.keys()],
    ...specification,
  });
}

/** Estimates from data in one call, by the reduction that is asked for. */
export function estimated(data: PreparedData, specification: object, reduction?: Reduction) {
  const parsed = withTimeTerms(systemOver(data, specification), data);
  const request = momentsRequest(parsed, data);
  const moments = reduceRows(sourceOf(data, request), request.key, QUIET, reduction);
  const { moments: form } = specifiedSystem(parsed, data);
  return estimateSystem(parsed, data, locatable(moments, data, request, form, sizeOf(parsed, data), reduction), QUIET);
}

/** Largest |a − b|/(1 + |b|). */
export function largestDifference(left: readonly number[], right: readonly number[]): number {
  if (left.length !== right.length) throw new RangeError(`${left.length} numbers against ${right.length}`);
  return left.reduce((most, value, k) => Math.max(most, Math.abs(value - right[k]) / (1 + Math.abs(right[k]))), 0);
}
