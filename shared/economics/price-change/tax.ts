import type { PriceQuestion } from "../../schemas/price-change.ts";
import { listWords } from "../../study/words.ts";
import type { Bundle } from "./bundle.ts";
import { combination, type Dual, difference, quotient, weighted } from "./dual.ts";
import type { Exact } from "./exact-welfare.ts";
import { otherChanges } from "./question.ts";

/** What taxes raise and cost, in units of estimation. */
export interface TaxMeasures {
  readonly revenue: Dual;
  readonly paidByBuyers: Dual;
  readonly excessBurden?: Dual;
  readonly noExcessBurden?: string;
  readonly marginalCost?: Dual;
  readonly noMarginalCost?: string;
}

interface Taxed {
  readonly before: readonly number[];
  readonly after: Bundle;
  readonly taxes: readonly number[];
}

/**
 * Revenue Σ t_i q1_i; what buyers pay of it Σ (p1_i − p0_i) q1_i over the taxed goods; excess burden EV less what buyers pay
 * (Auerbach 1985, Handbook of Public Economics 1), which is not negative; and the marginal cost of funds.
 */
export function taxMeasures({ before, after, taxes }: Taxed, question: PriceQuestion, exact: Exact): TaxMeasures {
  const borne = after.prices.map((price, i) => (taxes[i] === 0 ? 0 : price - before[i]));
  const revenue = weighted(taxes, after.quantities);
  const paidByBuyers = weighted(borne, after.quantities);
  const others = otherChanges(question);
  return {
    revenue,
    paidByBuyers,
    ...("absent" in exact
      ? { noExcessBurden: exact.absent }
      : others.length > 0
        ? { noExcessBurden: `${listWords(others)} changes too, and not by a tax` }
        : { excessBurden: difference(exact.equivalent, paidByBuyers) }),
    ...marginalCost(after, taxes, borne),
  };
}

/**
 * The marginal cost of funds where every tax is raised in proportion: buyers lose Σ q_j b_j a unit, b_j = ρ_j t_j, and
 * revenue rises by Σ t_i q_i + Σ_ij t_i (∂q_i/∂p_j) b_j. In τ_i = t_i/p_i and a_j = b_j/p_j, divided by x:
 *
 *     Σ a_j w_j / [Σ τ_i w_i + Σ_i τ_i (Σ_j μ_ij a_j − w_i a_i)]
 *
 * Ahmad & Stern (1984, Journal of Public Economics 25), whose λ by good this is for a change of all at once.
 */
function marginalCost(
  after: Bundle,
  taxes: readonly number[],
  borne: readonly number[],
): Pick<TaxMeasures, "marginalCost" | "noMarginalCost"> {
  const rates = taxes.map((tax, i) => tax / after.prices[i]);
  const borneRates = borne.map((part, i) => part / after.prices[i]);
  const moved = after.along(borneRates).map((slope, i) => combination([1, slope], [-borneRates[i], after.shares[i]]));
  const raised = combination([1, weighted(rates, after.shares)], [1, weighted(rates, moved)]);
  const lost = weighted(borneRates, after.shares);
  // A subsidy's further unit of money costs revenue and gains its buyers: the ratio is as good.
  if (!(raised.value * Math.sign(lost.value) > 0)) {
    return { noMarginalCost: "higher taxes would raise no more revenue: what is bought falls by as much" };
  }
  return { marginalCost: quotient(lost, raised) };
}
