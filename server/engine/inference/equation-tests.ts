import { normalTwoSidedTail, tTwoSidedTail } from "../../../shared/numerics/distributions.ts";
import type { MadeTest } from "../../../shared/schemas/tests.ts";
import type { DemandSystem, SystemSize } from "../../../shared/systems/demand-system.ts";

/** Of a variance, relative to the variances of what is summed: below it is rounding. */
const ROUNDING = 1e-14;

/**
 * Homogeneity of each equation, Σ_j γ_ij = 0, for all n goods: the sum over its standard error. Where equations are
 * linear in their coefficients and share their regressors, maximum likelihood is least squares equation by equation:
 * `freedom` (T − k) then makes the divisor T of the covariance T − k, and the ratio a t of that many degrees.
 * Undefined in a system with more than one row of price coefficients for each good, and where a sum does not vary.
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
    const size = places.reduce((total, a) => total + fit.covariance[a][a], 0);
    // A sum that does not vary, as where restrictions fix it, has no t value: what is left is rounding.
    const standardError = variance > ROUNDING * size ? Math.sqrt(variance * scale) : 0;
    const t = sum / standardError;
    const pValue = exact ? tTwoSidedTail(t, exact.freedom) : normalTwoSidedTail(t);
    return { good, sum, standardError, t, ...(exact && { freedom: exact.freedom }), pValue };
  });
  return tests.every(({ t }) => Number.isFinite(t)) ? tests : undefined;
}
