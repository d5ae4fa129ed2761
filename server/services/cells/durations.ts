import type { CellSpecification } from "../../../shared/schemas/cell.ts";
import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { easiSizeOf, isExactEasi } from "../../engine/estimation/easi/specification.ts";

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
/** Readings of all rows by a form whose terms move with its coefficients, its tests included. */
const MOVING_PASSES = 30;
/** The fit, and those its tests compare it with: a replicate is one of them. */
const FITS_IN_ALL = 3;
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

/**
 * Sums of products of terms over the rows, then iterations over the coefficients, for the system and its tests; the
 * rows again in every iteration where the terms move with the coefficients, and all of it in every replicate.
 */
function amountOf(specification: SystemSpecification, { rows, goods }: Work): number {
  const system = SYSTEMS[specification.form];
  const size = {
    goods,
    demographics: specification.demographics.length + timeTerms(specification),
    alpha0: 0,
    easi: easiSizeOf(specification),
  };
  const terms = system.moments.terms(size).length + goods;
  const onePass = (rows * terms ** 2) / 2;
  const solving = PASSES * system.layout(size).length ** 2 * terms;
  const moves = system.moments.local !== undefined || isExactEasi(specification);
  const fit = (moves ? MOVING_PASSES : 1) * onePass + solving;
  return rows * CHECK_COST * goods ** 2 + fit + replicates(specification) * (fit / FITS_IN_ALL);
}

/** Shifts of the intercepts that a trend and a season come to. */
function timeTerms({ trend, season }: SystemSpecification): number {
  const round = season === undefined ? 0 : Math.min(2 * (season.harmonics ?? season.period), season.period - 1);
  return round + (trend ? 1 : 0);
}

function replicates({ "standard errors": errors }: SystemSpecification): number {
  return typeof errors === "object" && "bootstrap" in errors ? errors.replicates : 0;
}
