import type { PriceQuestion } from "../../schemas/price-change.ts";
import { listWords } from "../../study/words.ts";
import type { Bundle } from "./bundle.ts";
import { combination, type Dual, difference, quotient, weighted } from "./dual.ts";
import type { Exact } from "./exact-welfare.ts";
import { otherChanges } from "./question.ts";

/** Sums over buyers, in money: they add up over households. */
export interface TaxSums {
  /** Σ t_i q1_i. */
  readonly revenue: Dual;
  /** Σ (p1_i − p0_i) q1_i over the taxed goods. */
  readonly paidByBuyers: Dual;
  /** What buyers lose, and what revenue gains, where every tax is raised by a further unit of itself. */
  readonly lost: Dual;
  readonly raised: Dual;
}

/**
 * Where every tax is raised in proportion, buyers lose Σ q_j b_j a unit, b_j = p1_j − p0_j = ρ_j t_j, and revenue rises by
 * Σ t_i q_i + Σ_ij t_i (∂q_i/∂p_j) b_j; in τ_i = t_i/p_i and a_j = b_j/p_j
 *
 *     x Σ a_j w_j   and   x [Σ τ_i w_i + Σ_i τ_i (Σ_j μ_ij a_j − w_i a_i)].
 *
 * `shares` are what is bought: the system's own, or a household's with its residual.
 */
export function taxSums(
  after: Pick<Bundle, "prices" | "total" | "along">,
  shares: readonly Dual[],
  before: readonly number[],
  taxes: readonly number[],
): TaxSums {
  const x = after.total.value;
  const rates = taxes.map((tax, i) => tax / after.prices[i]);
  const borne = taxes.map((tax, i) => (tax === 0 ? 0 : (after.prices[i] - before[i]) / after.prices[i]));
  const moved = after.along(borne).map((slope, i) => combination([1, slope], [-borne[i], shares[i]]));
  const paid = weighted(borne, shares);
  const revenue = weighted(rates, shares);
  return {
    revenue: combination([x, revenue]),
    paidByBuyers: combination([x, paid]),
    lost: combination([x, paid]),
    raised: combination([x, revenue], [x, weighted(rates, moved)]),
  };
}

/** What taxes raise and cost, in units of estimation. */
export interface TaxMeasures {
  readonly revenue: Dual;
  readonly paidByBuyers: Dual;
  readonly excessBurden?: Dual;
  readonly noExcessBurden?: string;
  readonly marginalCost?: Dual;
  readonly noMarginalCost?: string;
}

/**
 * Revenue; what buyers pay of it; the excess burden EV less what buyers pay (Auerbach 1985, Handbook of Public Economics
 * 1), which is not negative where cost is concave; and the marginal cost of funds lost/raised (Ahmad & Stern 1984, Journal
 * of Public Economics 25, for all taxes at once). `question` says what changes beside taxes: then no excess burden is theirs.
 */
export function taxMeasures(
  { revenue, paidByBuyers, lost, raised }: TaxSums,
  question: PriceQuestion,
  exact: Exact | { readonly equivalent: Dual },
): TaxMeasures {
  const others = otherChanges(question);
  return {
    revenue,
    paidByBuyers,
    ...("absent" in exact
      ? { noExcessBurden: exact.absent }
      : others.length > 0
        ? { noExcessBurden: `${listWords(others)} ${others.length === 1 ? "changes" : "change"} too, and not by a tax` }
        : { excessBurden: difference(exact.equivalent, paidByBuyers) }),
    // Of a subsidy both are negative.
    ...(raised.value * Math.sign(lost.value) > 0
      ? { marginalCost: quotient(lost, raised) }
      : { noMarginalCost: "higher taxes would raise no more revenue: what is bought falls by as much" }),
  };
}
