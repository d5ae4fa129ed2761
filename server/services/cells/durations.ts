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
const FIRST_SPEED = 100_000;
/** Shorter ones say more about a program still warming up than about its speed. */
const SHORTEST_TIMED_MS = 200;
/** What checking a row costs for each pair of goods, in products of terms. */
const CHECK_COST = 50;
/** Readings of all rows by a form whose terms move with its coefficients, its tests included. */
const MOVING_PASSES = 8;
/** What a replicate takes of one reading of the rows, and of the passes over the coefficients: it starts near its end. */
const REPLICATE_OF_ROWS = 0.1;
const REPLICATE_OF_PASSES = 0.3;
/** Passes over coefficients and terms that the fit, its covariance and its tests come to together. */
const PASSES = 40;
const SHORTEST_MS = 100;
/** Time over which earlier estimations lose half their say: many short ones do not outweigh a long one. */
const MEMORY_MS = 10_000;
/** Of how long an estimation what is first assumed counts. */
const FIRST_MS = 100;

/** How long estimations take, from what there is to do and how fast the last ones went. */
export class Durations {
  #amount = FIRST_SPEED * FIRST_MS;
  #time = FIRST_MS;

  about(specification: SystemSpecification, work: Work): number {
    return Math.max(SHORTEST_MS, Math.round(amountOf(specification, work) * (this.#time / this.#amount)));
  }

  /** Remembers how long a system took. */
  learn(specification: CellSpecification, work: Work, tookMs: number): void {
    if (specification.kind !== "system" || tookMs < SHORTEST_TIMED_MS) return;
    const kept = MEMORY_MS / (MEMORY_MS + tookMs);
    this.#amount = kept * this.#amount + amountOf(specification, work);
    this.#time = kept * this.#time + tookMs;
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
  const replicate = REPLICATE_OF_ROWS * onePass + REPLICATE_OF_PASSES * solving;
  return rows * CHECK_COST * goods ** 2 + fit + replicates(specification) * replicate;
}

/** Shifts of the intercepts that a trend and a season come to. */
function timeTerms({ trend, season }: SystemSpecification): number {
  const round = season === undefined ? 0 : Math.min(2 * (season.harmonics ?? season.period), season.period - 1);
  return round + (trend ? 1 : 0);
}

function replicates({ "standard errors": errors }: SystemSpecification): number {
  return typeof errors === "object" && "bootstrap" in errors ? errors.replicates : 0;
}
