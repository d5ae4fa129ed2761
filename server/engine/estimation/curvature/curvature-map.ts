import { type Matrix, zeros } from "../../../../shared/numerics/matrix.ts";
import type { Point, SystemSize } from "../../../../shared/systems/demand-system.ts";
import { type CurvedForm, type CurvedParts, isQuadratic } from "./curved-parts.ts";
import { type Deflation, deflation } from "./deflation.ts";
import { entriesOfTriangle, factorOf } from "./negative-matrix.ts";

/**
 * Coefficients of an almost ideal system whose Slutsky matrix at one point is −B B', from free ones:
 *
 *     φ = (w*, α_is, β, λ of QUAIDS, L),  the last good of each following from adding-up
 *     Γ = −B B' + diag(w*) − w* w*' − [β β' m + (β λ' + λ β') q + 2 λ λ' c],   q = m²/b, c = m³/b²
 *     α = w* − β m − λ q − Γ l − Σ α_s z_s
 *
 * with l, m, b the log prices, ln(x/P) and Π p^β at the point; in LA-AIDS the square bracket and λ are absent,
 * as its index is held there. Homogeneity and symmetry hold by construction. Diewert & Wales (1987, Econometrica 55),
 * Moschini (1998, European Economic Review 42), Ryan & Wales (1998, Journal of Business & Economic Statistics 16);
 * for any point, not the base alone, because w* and not α is free.
 */
export interface CurvatureMap {
  /** F. */
  readonly free: number;
  /** Where the entries of L begin in φ. */
  readonly triangle: number;
  /** θ in the order of the system's layout. */
  theta(free: readonly number[]): number[];
  /** ∂θ/∂φ, k × F. */
  jacobian(free: readonly number[]): Matrix;
}

export function curvatureMap(form: CurvedForm, size: SystemSize, point: Point, rank: number): CurvatureMap {
  const { goods: n, demographics: s } = size;
  const entries = entriesOfTriangle(n, rank).length;
  const quadratic = isQuadratic(form);
  const blocks = (n - 1) * (1 + s + 1 + (quadratic ? 1 : 0));
  const free = blocks + entries;
  const partsOf = (values: readonly number[], sum: number): CurvedParts => {
    let next = 0;
    const column = (total: number) => {
      const own = values.slice(next, next + n - 1);
      next += n - 1;
      return [...own, own.reduce((rest, value) => rest - value, total)];
    };
    const shares = column(sum);
    const byDemographic = Array.from({ length: s }, () => column(0));
    const beta = column(0);
    const lambda = quadratic ? column(0) : new Array<number>(n).fill(0);
    return {
      shares,
      demographic: Array.from({ length: n }, (_, i) => byDemographic.map((shifts) => shifts[i])),
      beta,
      lambda,
      factor: factorOf(values.slice(next), n, rank),
    };
  };
  const deflate = deflation(form, size, point);
  const logPrices = point.prices.map(Math.log);
  const layout = (parts: CurvedParts, gamma: Matrix, levels: readonly number[]): number[] => [
    ...levels.map((level, i) =>
      parts.demographic[i].reduce((rest, shift, k) => rest - shift * point.demographics[k], level),
    ),
    ...parts.demographic.flat(),
    ...gamma.flat(),
    ...parts.beta,
    ...(quadratic ? parts.lambda : []),
  ];
  return {
    free,
    triangle: blocks,
    theta: (values) => {
      const parts = partsOf(values, 1);
      const at = deflate.at(parts);
      const gamma = gammaOf(parts, at);
      const levels = parts.shares.map(
        (share, i) => share - parts.beta[i] * at.real - parts.lambda[i] * at.square - along(gamma[i], logPrices),
      );
      return layout(parts, gamma, levels);
    },
    jacobian: (values) => {
      const parts = partsOf(values, 1);
      const at = deflate.at(parts);
      const columns = Array.from({ length: free }, (_, f) => {
        const unit = new Array<number>(free).fill(0);
        unit[f] = 1;
        const change = partsOf(unit, 0);
        const moved = deflate.change(parts, at, change);
        const gamma = gammaChange(parts, at, change, moved);
        const levels = change.shares.map(
          (share, i) =>
            share -
            change.beta[i] * at.real -
            parts.beta[i] * moved.real -
            change.lambda[i] * at.square -
            parts.lambda[i] * moved.square -
            along(gamma[i], logPrices),
        );
        return layout(change, gamma, levels);
      });
      return columns[0].map((_, a) => columns.map((column) => column[a]));
    },
  };
}

const along = (row: readonly number[], vector: readonly number[]) =>
  row.reduce((sum, entry, j) => sum + entry * vector[j], 0);

/** Γ at real expenditure m: what is subtracted is what K holds beside Γ. */
function gammaOf({ shares, beta, lambda, factor }: CurvedParts, { price, cross, cubic }: Deflation): Matrix {
  const n = shares.length;
  const gamma = zeros(n, n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      gamma[i][j] =
        -along(factor[i], factor[j]) +
        (i === j ? shares[i] : 0) -
        shares[i] * shares[j] -
        beta[i] * beta[j] * price -
        (beta[i] * lambda[j] + lambda[i] * beta[j]) * cross -
        2 * lambda[i] * lambda[j] * cubic;
    }
  }
  return gamma;
}

function gammaChange(parts: CurvedParts, at: Deflation, change: CurvedParts, moved: Deflation): Matrix {
  const { shares: w, beta: b, lambda: l, factor } = parts;
  const { shares: dw, beta: db, lambda: dl } = change;
  const n = w.length;
  const gamma = zeros(n, n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      gamma[i][j] =
        -along(change.factor[i], factor[j]) -
        along(factor[i], change.factor[j]) +
        (i === j ? dw[i] : 0) -
        dw[i] * w[j] -
        w[i] * dw[j] -
        (db[i] * b[j] + b[i] * db[j]) * at.price -
        b[i] * b[j] * moved.price -
        (db[i] * l[j] + b[i] * dl[j] + dl[i] * b[j] + l[i] * db[j]) * at.cross -
        (b[i] * l[j] + l[i] * b[j]) * moved.cross -
        2 * (dl[i] * l[j] + l[i] * dl[j]) * at.cubic -
        2 * l[i] * l[j] * moved.cubic;
    }
  }
  return gamma;
}
