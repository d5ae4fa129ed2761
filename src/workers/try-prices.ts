import { theoryChecksAt } from "../../shared/economics/checks.ts";
import { changeAt } from "../../shared/economics/price-change/change-at.ts";
import { unseenPrices } from "../../shared/economics/price-change/unseen-prices.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import type { PricesAsked, PricesTried } from "./protocol.ts";

/**
 * What other prices do at a finding's point, by the functions that the finding itself was computed with; intervals are
 * normal, since a bootstrap's draws stay with the server.
 * Errors: as for `changeAt`.
 */
export function tryPrices(asked: PricesAsked): PricesTried {
  const { fitted, point, question, priceScale, totalScale, level, priceRange, pointName } = asked;
  const at = changeAt(fitted, point, question, { priceScale, totalScale, level });
  const after = {
    ...point,
    prices: at.pricesAfter.map((price, i) => price / priceScale[i]),
    total: at.totalAfter / totalScale,
  };
  return {
    at,
    unseen: unseenPrices(fitted.goods, at.pricesAfter, priceRange),
    checks: theoryChecksAt(fitted, after, SYSTEMS[fitted.form].shareFunction ? pointName : "the new prices"),
  };
}
