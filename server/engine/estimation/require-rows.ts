import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { printCount, printFixed } from "../../../shared/tables/numbers.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { effectiveRows } from "../inference/covariance-of-estimates.ts";
import { Refusal } from "../refusal.ts";
import { systemForm } from "./coefficient-form.ts";
import { refuseTooFewRows, rowsForEquations } from "./failures.ts";
import { sizeOf } from "./request.ts";
import { withinEquations } from "./solve.ts";
import { specifiedSystem } from "./specified-system.ts";

/**
 * Refuses before any row is read what so many rows cannot estimate, or so few of any weight (Kish's effective number,
 * (Σh)²/Σh²): many coefficients make many products of columns, and forming them takes long for nothing.
 *
 * Errors: `Refusal` with the rows there are and the rows that are needed.
 */
export function requireRows(specification: SystemSpecification, data: PreparedData): void {
  const system = specifiedSystem(specification, data);
  const size = sizeOf(specification, data);
  const equations = size.goods - 1;
  const within = systemForm(system, size, withinEquations(specification)).free;
  const { free } = systemForm(system, size, specification.impose);
  refuseTooFewRows(data.rows, free, equations, within);
  if (data.weights === undefined) return;
  const effective = effectiveRows(data.weights);
  const needed = rowsForEquations(within, equations);
  if (effective >= needed) return;
  throw new Refusal(
    `The weights make ${printCount(data.rows)} rows tell as much as ${printFixed(effective, 1)} of one weight; ${printCount(free)} free coefficients in ${printCount(equations)} equations need at least ${printCount(needed)}.`,
  );
}
