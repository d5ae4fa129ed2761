import { easiCostDerivatives } from "./cost-derivatives.ts";
import { easiCostEvaluator } from "./cost-evaluators.ts";
import type { DemandSystem, Evaluator, Point, SystemSize } from "./demand-system.ts";
import { easiDerivatives } from "./easi-derivatives.ts";
import { EASI_BLOCKS, easiFreeForm, easiLayout, easiStart } from "./easi-layout.ts";
import { easiMoments } from "./easi-moments.ts";
import { type EasiPoint, easiPoint } from "./easi-point.ts";
import { requirePoint, slopesByEvaluator } from "./evaluation.ts";

const NO_UTILITY = "no utility near it costs that much while cost rises with utility";

/**
 * Exact affine Stone index system (EASI) with polynomial Engel curves.
 *
 *     ln C(p, u, z) = u + p'm(u, z) + ½ p'A(z) p + ½ u p'B p,   m = Σ_r b_r u^r + C z + D z u,   A(z) = A_0 + Σ_l z_l A_l
 *     w = m(u, z) + A(z) p + B p u                                             (p in logs; Shephard's lemma)
 *     u = y = (ln x − p'w + ½ p'A(z) p)/(1 − ½ p'B p)                           (implicit utility)
 *
 * **Shares at a point** carry no residual: u solves ln C(p, u, z) = ln x, a polynomial of the degree chosen, on the
 * stretch where cost rises with utility (`risingRoot`), and with F_u = ∂ln C/∂u and s_j = ∂ln C/∂ln p_j
 *
 *     μ_i = v_i/F_u,   v_i = m_u,i + (B p)_i,   μ_ij = A_ij(z) + B_ij u − μ_i s_j,   s = w under symmetry
 *
 * where k_ij = A_ij + B_ij u − w_i δ_ij + w_i w_j. Where there is no such u, nothing is defined: shares and utility are
 * NaN and the slopes are refused.
 *
 * **Without symmetry** the share equations stand as they are and y is the same expression, in which p'Ap and p'Bp see
 * the symmetric parts only: then y is a deflated expenditure that the equations define and no utility, s ≠ w, and
 * there is no cost function. Homogeneity holds whenever the rows of every A_l and B sum to nothing.
 *
 * Real expenditure is measured at unit prices, so with Engel curves of a degree above one the estimates depend on
 * which prices are one: the means of the sample when data are normalised.
 *
 * Lewbel & Pendakur (2009, American Economic Review 99, 827–863).
 */
export const easi: DemandSystem = {
  name: "easi",
  kind: "levels",
  longName: "exact affine Stone index system",
  source: "Lewbel and Pendakur (2009), American Economic Review 99",
  blocks: EASI_BLOCKS,
  heldByForm: [],
  takesDemographics: true,
  layout: easiLayout,
  free: easiFreeForm,
  evaluator: easiEvaluator,
  notDefined: NO_UTILITY,
  slopes: (theta, size, point) => slopesByEvaluator(easiEvaluator(theta, size), size, point, refuse),
  slopeDerivatives: (theta, size, point) => {
    requirePoint(size, point);
    const logPrices = point.prices.map(Math.log);
    return easiDerivatives(solvedAt(theta, size, point, logPrices), logPrices, point.demographics);
  },
  explainPriceSlope: (theta, size, point, i, j) => {
    requirePoint(size, point);
    const at = solvedAt(theta, size, point, point.prices.map(Math.log));
    const { places, tilt } = at.parts;
    const entry = i * size.goods + j;
    return [
      { sign: 1, factors: [{ symbol: places.shifted > 0 ? "a_ij(z)" : "a_ij", value: at.matrix[entry] }] },
      ...(places.tilted > 0
        ? [
            {
              sign: 1 as const,
              factors: [
                { symbol: "b_ij", value: tilt[entry] },
                { symbol: "y", value: at.utility },
              ],
            },
          ]
        : []),
      {
        sign: -1,
        factors: [
          { symbol: "μ_i", value: at.tilts[i] / at.rise },
          { symbol: "∂ln C/∂ln p_j", value: at.gradient[j] },
        ],
      },
    ];
  },
  moments: easiMoments,
  start: easiStart,
  cost: {
    evaluator: easiCostEvaluator,
    logCostDerivatives: easiCostDerivatives,
    /** NaN where cost falls with utility. */
    logCost: (theta, size, utility, prices, demographics) => {
      requirePoint(size, { prices, total: 1, demographics });
      const at = easiPoint(theta, size);
      const logCost = at.atUtility(prices.map(Math.log), utility, demographics);
      return at.rise > 0 ? logCost : Number.NaN;
    },
    utility: (theta, size, point) => {
      requirePoint(size, point);
      const at = easiPoint(theta, size);
      at.at(point.prices.map(Math.log), Math.log(point.total), point.demographics);
      return at.utility;
    },
  },
};

function solvedAt(theta: readonly number[], size: SystemSize, point: Point, logPrices: readonly number[]): EasiPoint {
  const at = easiPoint(theta, size);
  at.at(logPrices, Math.log(point.total), point.demographics);
  if (Number.isNaN(at.utility)) refuse(point);
  return at;
}

function refuse({ total }: Point): never {
  throw new RangeError(
    `the exact affine Stone index system is not defined at ln x = ${Math.log(total).toPrecision(4)} and these prices: ${NO_UTILITY}; a lower degree or fewer interactions bend the Engel curves less`,
  );
}

function easiEvaluator(theta: readonly number[], size: SystemSize): Evaluator {
  const n = size.goods;
  const point = easiPoint(theta, size);
  const { tilts, gradient, matrix } = point;
  const { tilt } = point.parts;
  const total = new Float64Array(n);
  const prices = new Float64Array(n * n);
  return {
    shares: point.shares,
    total,
    prices,
    at(logPrices, logTotal, demographics) {
      point.at(logPrices, logTotal, demographics);
      for (let i = 0; i < n; i++) {
        const slope = tilts[i] / point.rise;
        total[i] = slope;
        for (let j = 0; j < n; j++) {
          const at = i * n + j;
          prices[at] = matrix[at] + (tilt.length > 0 ? tilt[at] * point.utility : 0) - slope * gradient[j];
        }
      }
    },
  };
}
