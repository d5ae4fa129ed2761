import type { CoefficientBlock, CoefficientPlace, EasiSize, FreeForm, SystemSize } from "./demand-system.ts";
import { requireTheta } from "./evaluation.ts";
import { type Dependence, freeForm, remainder } from "./free-form.ts";
import type { InteractionName, RestrictionName } from "./names.ts";

/**
 * θ of EASI, blocks in this order, each good by good:
 *
 *     b_0 (n) · b_r, r = 1..R (n × R) · C (n × s) · D (n × s) · A_0 (n × n) · A_l, l = 1..s (n × s n) · B (n × n)
 *
 * D, A_l and B are there only where the interactions name them.
 */
export const EASI_BLOCKS: readonly CoefficientBlock[] = [
  { name: "constant", symbol: "b₀", columns: "one" },
  { name: "power", symbol: "b", columns: "powers" },
  { name: "demographic", symbol: "c", columns: "demographics" },
  { name: "demographic expenditure", symbol: "d", columns: "demographics by expenditure" },
  { name: "price", symbol: "a", columns: "goods" },
  { name: "price demographic", symbol: "a", columns: "goods by demographics" },
  { name: "price expenditure", symbol: "b", columns: "goods by expenditure" },
];

export function easiSize({ easi }: SystemSize): EasiSize {
  if (easi === undefined) {
    throw new RangeError("easi is evaluated with its degree and interactions; none were given");
  }
  return easi;
}

/** Where in θ a coefficient stands, and which blocks there are. */
export function easiPlaces(size: SystemSize) {
  const { goods: n, demographics: s } = size;
  const { degree, interactions } = easiSize(size);
  const has = (name: InteractionName) => interactions.includes(name);
  const crossed = has("expenditure with demographics") ? s : 0;
  const shifted = has("prices with demographics") ? s : 0;
  const tilted = has("prices with expenditure") ? 1 : 0;
  const demographic = n + n * degree;
  const cross = demographic + n * s;
  const price = cross + n * crossed;
  const shift = price + n * n;
  const tilt = shift + n * n * shifted;
  return {
    degree,
    /** Demographics in D and in A_l: all s, or none. */
    crossed,
    shifted,
    /** 1 where there is a B. */
    tilted,
    /** b_ri, r = 0..R. */
    power: (i: number, r: number) => (r === 0 ? i : n + i * degree + r - 1),
    demographic: (i: number, k: number) => demographic + i * s + k,
    cross: (i: number, k: number) => cross + i * crossed + k,
    price: (i: number, j: number) => price + i * n + j,
    shift: (i: number, k: number, j: number) => shift + (i * shifted + k) * n + j,
    tilt: (i: number, j: number) => tilt + i * n + j,
    count: tilt + n * n * tilted,
  };
}
export type EasiPlaces = ReturnType<typeof easiPlaces>;

const upTo = (count: number) => Array.from({ length: count }, (_, index) => index);

export function easiLayout(size: SystemSize): CoefficientPlace[] {
  const { goods: n, demographics: s } = size;
  const { degree, crossed, shifted, tilted } = easiPlaces(size);
  const block = (name: string, columns: number) =>
    upTo(n).flatMap((good) => upTo(columns).map((column) => ({ block: name, good, column })));
  return [
    ...upTo(n).map((good) => ({ block: "constant", good })),
    ...block("power", degree),
    ...block("demographic", s),
    ...block("demographic expenditure", crossed),
    ...block("price", n),
    ...block("price demographic", n * shifted),
    ...block("price expenditure", n * tilted),
  ];
}

/** Where entry (i, j) of each matrix of price effects stands: A_0, every A_l, B. */
function priceMatrices(size: SystemSize): ((i: number, j: number) => number)[] {
  const at = easiPlaces(size);
  return [
    at.price,
    ...upTo(at.shifted).map((k) => (i: number, j: number) => at.shift(i, k, j)),
    ...upTo(at.tilted).map(() => at.tilt),
  ];
}

/**
 * Adding-up: ι'b_0 = 1, every other column sums to nothing over goods. Homogeneity: the rows of A_0, A_l and B sum
 * to nothing. Symmetry: each of them is symmetric.
 */
export function easiFreeForm(size: SystemSize, impose: readonly RestrictionName[]): FreeForm {
  const { goods: n, demographics: s } = size;
  const at = easiPlaces(size);
  const over = (place: (good: number) => number, total = 0) => remainder(upTo(n).map(place), total);
  const dependences: Dependence[] = [];
  for (let r = 0; r <= at.degree; r++) dependences.push(over((i) => at.power(i, r), r === 0 ? 1 : 0));
  for (let k = 0; k < s; k++) dependences.push(over((i) => at.demographic(i, k)));
  for (let k = 0; k < at.crossed; k++) dependences.push(over((i) => at.cross(i, k)));
  for (const entry of priceMatrices(size)) {
    for (let j = 0; j < n; j++) dependences.push(over((i) => entry(i, j)));
    if (impose.length > 0) for (let i = 0; i < n - 1; i++) dependences.push(over((j) => entry(i, j)));
    if (!impose.includes("symmetry")) continue;
    for (let i = 1; i < n - 1; i++) {
      for (let j = 0; j < i; j++) dependences.push({ place: entry(i, j), constant: 0, on: [[entry(j, i), 1]] });
    }
  }
  return freeForm(at.count, dependences);
}

/** Iteration starts from constant shares. */
export function easiStart(size: SystemSize, meanShares: readonly number[]): number[] {
  const theta = new Array<number>(easiPlaces(size).count).fill(0);
  for (let i = 0; i < size.goods; i++) theta[i] = meanShares[i];
  return theta;
}

/** θ taken apart for fast evaluation; `power` holds b_r for r = 0..R row by row, matrices likewise. */
export interface EasiParts {
  readonly places: EasiPlaces;
  readonly power: Float64Array;
  readonly demographic: Float64Array;
  readonly cross: Float64Array;
  readonly price: Float64Array;
  readonly shift: Float64Array;
  readonly tilt: Float64Array;
}

export function easiParts(theta: readonly number[], size: SystemSize): EasiParts {
  const { goods: n, demographics: s } = size;
  const places = easiPlaces(size);
  requireTheta(theta, places.count);
  const power = new Float64Array(n * (places.degree + 1));
  for (let i = 0; i < n; i++) {
    for (let r = 0; r <= places.degree; r++) power[i * (places.degree + 1) + r] = theta[places.power(i, r)];
  }
  const from = (start: number, length: number) => Float64Array.from(theta.slice(start, start + length));
  return {
    places,
    power,
    demographic: from(places.demographic(0, 0), n * s),
    cross: from(places.cross(0, 0), n * places.crossed),
    price: from(places.price(0, 0), n * n),
    shift: from(places.shift(0, 0, 0), n * n * places.shifted),
    tilt: from(places.tilt(0, 0), n * n * places.tilted),
  };
}
