import type { CellSpecification } from "../../../shared/schemas/cell.ts";
import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";

/** How much there is to do: products of terms over rows, and of coefficients over iterations. */
export interface Work {
  readonly rows: number;
  readonly goods: number;
}

/** Until an estimation has been timed here: products a millisecond on an ordinary machine, on the slow side. */
const FIRST_SPEED = 150_000;
const SHORTEST_MS = 100;
/** How much the latest estimation counts against those before it. */
const NEWEST = 0.5;

/** How long estimations take, from what there is to do and how fast the last ones went. */
export class Durations {
  #speed = FIRST_SPEED;

  about(specification: SystemSpecification, work: Work): number {
    return Math.max(SHORTEST_MS, Math.round(amountOf(specification, work) / this.#speed));
  }

  /** Remembers how long a system took. Very short ones say more about the machine's mood than its speed. */
  learn(specification: CellSpecification, work: Work, tookMs: number): void {
    if (specification.kind !== "system" || tookMs < 20) return;
    const speed = amountOf(specification, work) / tookMs;
    this.#speed = this.#speed === FIRST_SPEED ? speed : NEWEST * speed + (1 - NEWEST) * this.#speed;
  }
}

/** Sums of products of terms over the rows, then iterations over the coefficients, for the system and its tests. */
function amountOf({ form, demographics }: SystemSpecification, { rows, goods }: Work): number {
  const system = SYSTEMS[form];
  const size = { goods, demographics: demographics.length, alpha0: 0 };
  const terms = system.moments.terms(size).length + goods;
  const coefficients = system.layout(size).length;
  const overRows = (rows * terms * terms) / 2 + rows * goods ** 3 * 4;
  return overRows + 40 * coefficients ** 2 * terms;
}
