import type { Point, SystemSize } from "../../shared/systems/demand-system.ts";
import { easiLayout } from "../../shared/systems/easi-layout.ts";

/**
 * Implicit utility of EASI from its definition, y = (ln x − p'w + ½ p'A(z)p)/(1 − ½ p'Bp) with p in logs and any
 * shares w (Lewbel & Pendakur 2009), read off the layout coefficient by coefficient.
 */
export function implicitUtility(theta: readonly number[], size: SystemSize, point: Point, shares: readonly number[]) {
  const logs = point.prices.map(Math.log);
  let numerator = Math.log(point.total) - shares.reduce((sum, share, i) => sum + share * logs[i], 0);
  let denominator = 1;
  easiLayout(size).forEach(({ block, good, column }, a) => {
    const product = 0.5 * theta[a] * logs[good];
    if (block === "price") numerator += product * logs[column!];
    if (block === "price expenditure") denominator -= product * logs[column!];
    if (block !== "price demographic") return;
    const k = Math.floor(column! / size.goods);
    numerator += product * point.demographics[k] * logs[column! % size.goods];
  });
  return numerator / denominator;
}
