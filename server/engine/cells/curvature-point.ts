import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { basePoint, meanPoint, pointOfRow } from "./points.ts";
import { type NamedPoint, positionOf } from "./slutsky-point.ts";

/** Where a specification imposes curvature, if it does. Errors: `Refusal` for a row that is not there or is left out. */
export function curvaturePoint(
  { curvature, demographics }: SystemSpecification,
  data: PreparedData,
): NamedPoint | undefined {
  if (curvature === undefined) return undefined;
  const { at } = curvature;
  if (at === "base point") return { point: basePoint(data, demographics), pointName: at };
  if (at === "mean") return { point: meanPoint(data, demographics), pointName: at };
  const position = positionOf(at.row, data, ["curvature", "at", "row"]);
  return { point: pointOfRow(data, demographics, position), pointName: `row ${at.row}` };
}
