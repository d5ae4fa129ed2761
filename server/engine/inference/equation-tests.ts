import { normalTwoSidedTail, tTwoSidedTail } from "../../../shared/numerics/distributions.ts";
import type { MadeTest } from "../../../shared/schemas/tests.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";

/**
 * Homogeneity of each equation, Σ_j γ_ij = 0, for all n goods: the sum over its standard error. Where equations are
 * linear in their coefficients and share their regressors, maximum likelihood is least squares equation by equation:
 * `freedom` (T − k) then makes the divisor T of the covariance T − k, and the ratio a t of that many degrees.
 * Undefined in a system with more than one row of price coefficients for each good.
 */
export function equationTests(
  system: DemandSystem,
  size: SystemSize,
  goods: readonly string[],
  fit: { readonly theta: readonly number[]; readonly covariance: readonly (readonly number[])[] },
  exact?: { readonly rows: number; readonly freedom: number },
): MadeTest["equations"] {
  const layout = system.layout(size);
  const blocks = system.blocks.filter(
    ({ name, columns }) => columns.startsWith("goods") && layout.some(({ block }) => block === name),
  );
  if (blocks.length !== 1) return undefined;
  const scale = exact ? exact.rows / exact.freedom : 1;
  const tests = goods.map((good, i) => {
    const places = layout.flatMap((place, a) => (place.block === blocks[0].name && place.good === i ? [a] : []));
    const sum = places.reduce((total, a) => total + fit.theta[a], 0);
    const variance = places.reduce(
      (total, a) => total + places.reduce((inner, b) => inner + fit.covariance[a][b], 0),
      0,
    );
    const standardError = Math.sqrt(Math.max(0, variance * scale));
    const t = sum / standardError;
    const pValue = exact ? tTwoSidedTail(t, exact.freedom) : normalTwoSidedTail(t);
    return { good, sum, standardError, t, ...(exact && { freedom: exact.freedom }), pValue };
  });
  return tests.every(({ t }) => Number.isFinite(t)) ? tests : undefined;
}
