import type { CellSpecification } from "../../../shared/schemas/cell.ts";
import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";

/** How much there is to do: products of terms over rows, and of coefficients over iterations. */
export interface Work {
  readonly rows: number;
  readonly goods: number;
}

/** Until an estimation has been timed here: products a millisecond on an ordinary machine, on the slow side. */
const FIRST_SPEED = 600_000;
/** Shorter ones say more about a program still warming up than about its speed. */
const SHORTEST_TIMED_MS = 200;
/** What checking a row costs for each pair of goods, in products of terms. */
const CHECK_COST = 50;
/** Passes over coefficients and terms that the fit, its covariance and its tests come to together. */
const PASSES = 40;
const SHORTEST_MS = 100;
/** How much the latest estimation counts against those before it. */
const NEWEST = 0.5;

/** How long estimations take, from what there is to do and how fast the last ones went. */
export class Durations {
  #speed = FIRST_SPEED;

  about(specification: SystemSpecification, work: Work): number {
    return Math.max(SHORTEST_MS, Math.round(amountOf(specification, work) / this.#speed));
  }

  /** Remembers how long a system took. */
  learn(specification: CellSpecification, work: Work, tookMs: number): void {
    if (specification.kind !== "system" || tookMs < SHORTEST_TIMED_MS) return;
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
  return rows * (terms ** 2 / 2 + CHECK_COST * goods ** 2) + PASSES * coefficients ** 2 * terms;
}
