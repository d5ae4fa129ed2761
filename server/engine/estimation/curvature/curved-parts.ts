import type { Matrix } from "../../../../shared/numerics/matrix.ts";

/** What θ is made of, all n goods; also the shape of a direction in it. */
export interface CurvedParts {
  readonly shares: number[];
  readonly demographic: Matrix;
  readonly beta: number[];
  readonly lambda: number[];
  readonly factor: Matrix;
}

export type CurvedForm = "la-aids" | "aids" | "quaids";
