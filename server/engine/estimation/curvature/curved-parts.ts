import type { Matrix } from "../../../../shared/numerics/matrix.ts";
import { SYSTEMS } from "../../../../shared/systems/index.ts";

/** What θ is made of, all n goods; also the shape of a direction in it. */
export interface CurvedParts {
  readonly shares: number[];
  readonly demographic: Matrix;
  readonly beta: number[];
  readonly lambda: number[];
  readonly factor: Matrix;
}

export type CurvedForm = "la-aids" | "aids" | "quaids";

/** Whether θ ends with the λ of quadratic Engel curves. */
export const isQuadratic = (form: CurvedForm): boolean => SYSTEMS[form].blocks.some(({ name }) => name === "lambda");
