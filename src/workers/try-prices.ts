import { answerAt, type PriceAnswer } from "../../shared/economics/price-change/answer-at.ts";
import type { PricesAsked } from "./protocol.ts";

/**
 * What other prices do at a finding's point, by the function that the finding itself was computed with; intervals are
 * normal, since a bootstrap's draws stay with the server.
 * Errors: as for `answerAt`.
 */
export function tryPrices({ fitted, point, question, ...options }: PricesAsked): PriceAnswer {
  const { priceScale, totalScale, level, priceRange, pointName } = options;
  return answerAt(fitted, point, question, { priceScale, totalScale, level, priceRange, pointName });
}
