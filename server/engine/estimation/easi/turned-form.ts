import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import { easiMoments } from "../../../../shared/systems/easi-moments.ts";
import type { BaseColumn, MomentTerm } from "../../../../shared/systems/moment-form.ts";
import type { Poll } from "../../run.ts";
import type { CoefficientForm, Entry } from "../coefficient-form.ts";
import { type Columns, columnOf, identity, multiply, zeros } from "../columns.ts";
import { triangularFactor } from "../householder.ts";
import { solveUpper, solveUpperTransposed } from "../triangle.ts";
import type { WhitenedPrices } from "./whitened-prices.ts";

/**
 * The share equations over whitened prices, in coordinates ψ = Rφ of the free coefficients in which the coefficients of
 * whitened terms are orthonormal: C = C₀ + Qψ, QR the derivatives of C by φ. However nearly collinear the log prices
 * are, the equations determine ψ to rounding, and φ as well as the prices' own digits do. Where prices are as they are,
 * so are the coefficients: R is the identity and Q as sparse as the restrictions.
 */
export interface TurnedForm {
  /** Over whitened terms; its free coefficients, and all it expands to, are ψ. */
  readonly form: CoefficientForm;
  /** The coefficient of θ that each ψ_f speaks of, given those before it. */
  readonly places: readonly number[];
  /** R, F × F upper triangular. */
  readonly root: Columns;
  /** Rφ. */
  turn(free: readonly number[]): number[];
  /** R⁻¹ψ. */
  turnBack(turned: readonly number[]): number[];
}

export function turnedForm(of: CoefficientForm, size: SystemSize, prices: WhitenedPrices, poll?: Poll): TurnedForm {
  return prices.whitened ? overWhitenedPrices(of, size, prices, poll) : asItIs(of);
}

function asItIs(of: CoefficientForm): TurnedForm {
  return {
    places: of.expand.places,
    root: identity(of.free),
    form: { ...of, expand: freeAlone(of.free) },
    turn: (free) => [...free],
    turnBack: (turned) => [...turned],
  };
}

/** The free coefficients themselves in place of θ. */
function freeAlone(free: number): CoefficientForm["expand"] {
  const places = Array.from({ length: free }, (_, f) => f);
  return { matrix: places.map((f) => places.map((g) => (f === g ? 1 : 0))), offset: places.map(() => 0), places };
}

function overWhitenedPrices(of: CoefficientForm, size: SystemSize, prices: WhitenedPrices, poll?: Poll): TurnedForm {
  const terms = easiMoments.terms(size);
  const parts = partsOfTerms(terms, prices).map((sum) => sum.filter(([, factor]) => factor !== 0));
  const equations = size.goods;
  const height = equations * terms.length;
  const origin = of.expand.places.map(() => 0);
  const fixed = overWhitened(of.coefficients(origin), parts);
  const directions = zeros(height, of.free);
  of.derivatives(origin).forEach((entries, f) => {
    const column = columnOf(directions, f);
    for (const [equation, term, value] of entries) {
      for (const [whitened, factor] of parts[term]) column[equation * terms.length + whitened] += value * factor;
    }
  });
  const root = triangularFactor(directions, poll);
  orthonormalise(directions, root);
  const entries = entriesOfColumns(directions, terms.length);
  return {
    places: of.expand.places,
    root,
    form: {
      free: of.free,
      expand: freeAlone(of.free),
      derivatives: () => entries,
      coefficients: (turned) => {
        const moved = multiply(directions, { rows: of.free, columns: 1, values: Float64Array.from(turned) }).values;
        return fixed.map((row, equation) => row.map((value, term) => value + moved[equation * terms.length + term]));
      },
    },
    turn: (free) => [...multiply(root, { rows: of.free, columns: 1, values: Float64Array.from(free) }).values],
    turnBack: (turned) => {
      const free = Float64Array.from(turned);
      solveUpper(root, free);
      return [...free];
    },
  };
}

type Part = readonly [whitened: number, factor: number];

/** Every term as a sum of whitened ones: z_k ln p_j = means_j z_k + Σ_i R_ij z_k u_i. */
function partsOfTerms(terms: readonly MomentTerm[], { means, triangle }: WhitenedPrices): Part[][] {
  const nameOf = (left: BaseColumn | undefined, right: BaseColumn | undefined) => JSON.stringify([left, right]);
  const factorsOf = (term: MomentTerm): [BaseColumn | undefined, BaseColumn | undefined] => {
    if (term.kind === "constant") return [undefined, undefined];
    if (term.kind === "column") return [undefined, term.column];
    if (term.kind === "product") return [term.left, term.right];
    throw new RangeError("easi has no product of more than two columns");
  };
  const placeOf = new Map(terms.map((term, place) => [nameOf(...factorsOf(term)), place]));
  return terms.map((term, place) => {
    const [left, right] = factorsOf(term);
    if (right?.kind !== "log price") return [[place, 1]];
    const column = columnOf(triangle, right.good);
    // What a price is multiplied with is a term by itself: the constant, a demographic, y.
    const alone = placeOf.get(nameOf(undefined, left))!;
    return [
      [alone, means[right.good]],
      ...Array.from({ length: right.good + 1 }, (_, i): Part => {
        return [placeOf.get(nameOf(left, { kind: "log price", good: i }))!, column[i]];
      }),
    ];
  });
}

function overWhitened(coefficients: readonly (readonly number[])[], parts: readonly (readonly Part[])[]): number[][] {
  return coefficients.map((row) => {
    const whitened = row.map(() => 0);
    row.forEach((value, term) => {
      for (const [place, factor] of parts[term]) whitened[place] += value * factor;
    });
    return whitened;
  });
}

/** D R⁻¹ in place of D, row by row. */
function orthonormalise(directions: Columns, root: Columns): void {
  const row = new Float64Array(directions.columns);
  for (let r = 0; r < directions.rows; r++) {
    for (let f = 0; f < row.length; f++) row[f] = directions.values[f * directions.rows + r];
    if (row.every((value) => value === 0)) continue;
    solveUpperTransposed(root, row);
    for (let f = 0; f < row.length; f++) directions.values[f * directions.rows + r] = row[f];
  }
}

function entriesOfColumns(directions: Columns, terms: number): Entry[][] {
  return Array.from({ length: directions.columns }, (_, f) => {
    const entries: Entry[] = [];
    columnOf(directions, f).forEach((value, place) => {
      if (value !== 0) entries.push([Math.floor(place / terms), place % terms, value]);
    });
    return entries;
  });
}
