import { placesOf } from "./almost-ideal.ts";
import type { CostDerivatives, SystemSize } from "./demand-system.ts";
import { easiPoint } from "./easi-point.ts";
import { committedAt, lesParts, lesPlaces } from "./les-parts.ts";
import { quaidsPlaces } from "./quaids-parts.ts";
import { quaidsAt } from "./quaids-point.ts";
import { translogAt, translogDerivatives } from "./translog.ts";

/**
 * Derivatives of ln c(u, p; z) by u and by every coefficient, utility held: what the delta method needs of a cost
 * function. That utility itself moves with θ when the total is held follows from them (`economics/welfare-errors.ts`).
 */
type Derivatives = (
  theta: readonly number[],
  size: SystemSize,
  utility: number,
  prices: readonly number[],
  demographics: readonly number[],
) => CostDerivatives;

/** ln c = ln P + u b, b = Π p_k^β_k: ∂/∂u = b, ∂/∂β_k = u b ln p_k, the rest through ln P. */
export const aidsCostDerivatives: Derivatives = (theta, size, utility, prices, demographics) => {
  const { logPrices, parts } = translogAt(theta, size, { prices, total: 1, demographics });
  const deflator = Math.exp(logPrices.reduce((sum, logPrice, k) => sum + parts.beta[k] * logPrice, 0));
  const byTheta = byIndex(size, logPrices, demographics);
  const places = placesOf(size);
  logPrices.forEach((logPrice, k) => {
    byTheta[places.beta(k)] = utility * deflator * logPrice;
  });
  return { utility: deflator, theta: byTheta };
};

/**
 * ln c = ln a + b u/s, s = 1 − λ(p) u: ∂/∂u = b/s², ∂/∂β_k = (b u/s) ln p_k, ∂/∂λ_k = (b u²/s²) ln p_k, the rest
 * through ln a.
 */
export const quaidsCostDerivatives: Derivatives = (theta, size, utility, prices, demographics) => {
  const { logPrices, deflator, bend } = quaidsAt(theta, size, { prices, total: 1, demographics });
  const slack = 1 - bend * utility;
  const places = quaidsPlaces(size);
  const byTheta = [...byIndex(size, logPrices, demographics), ...logPrices.map(() => 0)];
  logPrices.forEach((logPrice, k) => {
    byTheta[places.beta(k)] = ((deflator * utility) / slack) * logPrice;
    byTheta[places.lambda(k)] = deflator * (utility / slack) ** 2 * logPrice;
  });
  return { utility: deflator / slack ** 2, theta: byTheta };
};

/** ∂ln P/∂θ of the translog index: the negative of ∂m/∂θ. */
function byIndex(size: SystemSize, logPrices: readonly number[], demographics: readonly number[]): number[] {
  return translogDerivatives(size, logPrices, demographics).realByTheta.map((entry) => 0 - entry);
}

/** c = Σ p_j c_j(z) + u Π p_j^{b_j}: ∂/∂u = Π p^b, ∂/∂c_j = p_j, ∂/∂c_jk = p_j z_k, ∂/∂b_j = u Π p^b ln p_j, all over c. */
export const lesCostDerivatives: Derivatives = (theta, size, utility, prices, demographics) => {
  const parts = lesParts(theta, size);
  const committed = new Float64Array(size.goods);
  committedAt(parts, demographics, committed);
  const level = Math.exp(prices.reduce((sum, price, j) => sum + parts.marginal[j] * Math.log(price), 0));
  const cost = prices.reduce((sum, price, j) => sum + price * committed[j], utility * level);
  const places = lesPlaces(size);
  const byTheta = new Array<number>(places.count).fill(0);
  prices.forEach((price, j) => {
    byTheta[places.committed(j)] = price / cost;
    demographics.forEach((z, k) => {
      byTheta[places.demographic(j, k)] = (price * z) / cost;
    });
    byTheta[places.marginal(j)] = (utility * level * Math.log(price)) / cost;
  });
  return { utility: level / cost, theta: byTheta };
};

/**
 * ln C = u + p'm(u, z) + ½ p'A(z)p + ½ u p'Bp is linear in θ: ∂/∂b_ri = p_i u^r, ∂/∂c_ik = p_i z_k,
 * ∂/∂d_ik = p_i z_k u, ∂/∂a_ij = ½ p_i p_j, ∂/∂a_ijl = ½ z_l p_i p_j, ∂/∂b_ij = ½ u p_i p_j (p in logs).
 */
export const easiCostDerivatives: Derivatives = (theta, size, utility, prices, demographics) => {
  const logPrices = prices.map(Math.log);
  const at = easiPoint(theta, size);
  at.atUtility(logPrices, utility, demographics);
  const { places } = at.parts;
  const byTheta = new Array<number>(places.count).fill(0);
  logPrices.forEach((own, i) => {
    for (let r = 0; r <= places.degree; r++) byTheta[places.power(i, r)] = own * utility ** r;
    demographics.forEach((z, k) => {
      byTheta[places.demographic(i, k)] = own * z;
      if (k < places.crossed) byTheta[places.cross(i, k)] = own * z * utility;
    });
    logPrices.forEach((other, j) => {
      const half = 0.5 * own * other;
      byTheta[places.price(i, j)] = half;
      for (let k = 0; k < places.shifted; k++) byTheta[places.shift(i, k, j)] = half * demographics[k];
      if (places.tilted > 0) byTheta[places.tilt(i, j)] = half * utility;
    });
  });
  return { utility: at.rise, theta: byTheta };
};
