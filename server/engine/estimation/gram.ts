import type { Poll } from "../run.ts";
import { momentMatrix } from "./accumulate-sums.ts";
import type { Columns } from "./columns.ts";
import { multiplyAccumulate } from "./multiply-accumulate.ts";
import { densePlan, type TilePlan } from "./tile-plan.ts";

/** Rows at a time: some hundred columns of them stay in the second-level cache. */
const PANEL_ROWS = 256;

const plans = new Map<number, TilePlan>();

/** A'A, exactly symmetric, in sixteen sums at a time. */
export function gram({ rows, columns, values }: Columns, poll: Poll = () => {}): Columns {
  if (!plans.has(columns)) plans.set(columns, densePlan(columns));
  const plan = plans.get(columns)!;
  const sums = new Float64Array(plan.tiles * 16);
  for (let from = 0; from < rows; from += PANEL_ROWS) {
    poll();
    multiplyAccumulate(values.subarray(from), rows, Math.min(PANEL_ROWS, rows - from), plan, sums);
  }
  return momentMatrix(plan, sums);
}
