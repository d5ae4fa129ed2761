import type { Random } from "../../shared/numerics/random.ts";
import type { CoefficientPlace, EasiSize, FreeForm, Point, SystemSize } from "../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import {
  INTERACTION_NAMES,
  PRICE_INDEX_NAMES,
  type RestrictionName,
  type SystemName,
} from "../../shared/systems/names.ts";

/** A system at random coefficients that satisfy the restrictions, and a random point near ordinary prices. */
export interface Case {
  readonly size: SystemSize;
  readonly free: FreeForm;
  readonly phi: number[];
  readonly theta: number[];
  readonly point: Point;
}

function proportions(random: Random, n: number): number[] {
  const raw = Array.from({ length: n }, () => 0.4 + random.uniform());
  const sum = raw.reduce((total, entry) => total + entry, 0);
  return raw.map((entry) => entry / sum);
}

/** θ = Sφ + s. */
export function thetaOf(free: FreeForm, phi: readonly number[]): number[] {
  return free.matrix.map((row, k) => row.reduce((sum, weight, f) => sum + weight * phi[f], free.offset[k]));
}

export function randomPoint(random: Random, size: SystemSize): Point {
  return {
    prices: Array.from({ length: size.goods }, () => Math.exp(0.3 * random.normal())),
    total: Math.exp(0.5 * random.normal()),
    demographics: Array.from({ length: size.demographics }, () => random.normal()),
  };
}

/**
 * Every free coefficient is moved from the system's own start by a normal of 0.05, so a system that is
 * added to the registry needs no line here. Shares start from random proportions.
 */
export function randomCase(random: Random, name: SystemName, impose: readonly RestrictionName[]): Case {
  const system = SYSTEMS[name];
  const goods = 2 + random.integer(5);
  const size: SystemSize = {
    goods,
    demographics: system.takesDemographics ? random.integer(3) : 0,
    alpha0: 0.2 * random.normal(),
    index: {
      name: PRICE_INDEX_NAMES[random.integer(PRICE_INDEX_NAMES.length)],
      meanShares: proportions(random, goods),
      meanPrices: Array.from({ length: goods }, () => Math.exp(0.1 * random.normal())),
    },
    meanShares: proportions(random, goods),
  };
  if (name === "easi") Object.assign(size, { easi: randomEasi(random) });
  const free = system.free(size, impose);
  const start = system.start(size, proportions(random, goods));
  const layout = system.layout(size);
  const phi = free.places.map((place) => start[place] + spreadOf(layout[place]) * random.normal());
  return { size, free, phi, theta: thetaOf(free, phi), point: randomPoint(random, size) };
}

/** Powers of real expenditure bend Engel curves little, so that cost rises with utility around ordinary points. */
function spreadOf({ block, column }: CoefficientPlace): number {
  if (block !== "power") return 0.05;
  return [0.05, 0.02, 0.006, 0.0015, 0.0003][column!];
}

/** The step of a numerical derivative in a coefficient: two fifths of how far the cases move it. */
export function stepOf(place: CoefficientPlace): number {
  return 0.4 * spreadOf(place);
}

/** Engel curves up to the fifth degree and each interaction half of the time. */
function randomEasi(random: Random): EasiSize {
  return {
    degree: 1 + random.integer(5),
    interactions: INTERACTION_NAMES.filter(() => random.uniform() < 0.5),
  };
}

/** The restrictions under which the laws are checked, with the laws' names for them. */
export const IMPOSED: readonly (readonly RestrictionName[])[] = [[], ["homogeneity"], ["homogeneity", "symmetry"]];
