import type { PriceChangeFinding, PriceQuestion } from "../../schemas/price-change.ts";
import type { Point } from "../../systems/demand-system.ts";
import { type FittedCoefficients, SYSTEMS } from "../../systems/index.ts";
import { theoryChecksAt } from "../checks.ts";
import { type ChangeOptions, changeAt } from "./change-at.ts";
import { unseenPrices } from "./unseen-prices.ts";

/** The parts of a price change finding that need no rows. */
export type PriceAnswer = Pick<PriceChangeFinding, "at" | "unseen" | "checks">;

interface AnswerOptions extends ChangeOptions {
  /** The sample's lowest and highest prices, n each, units uploaded. */
  readonly priceRange: PriceChangeFinding["priceRange"];
  /** Where the change stands, in words. */
  readonly pointName: string;
}

/**
 * What a price change does at a point (units uploaded), which new prices the sample has not seen, and what theory says at
 * the prices and total after: what the server stores and what the browser answers while rates are tried.
 * Errors: as for `changeAt`.
 */
export function answerAt(
  fitted: FittedCoefficients,
  point: Point,
  question: PriceQuestion,
  { priceRange, pointName, ...options }: AnswerOptions,
): PriceAnswer {
  const at = changeAt(fitted, point, question, options);
  const after = {
    ...point,
    prices: at.pricesAfter.map((price, i) => price / options.priceScale[i]),
    total: at.totalAfter / options.totalScale,
  };
  return {
    at,
    unseen: unseenPrices(fitted.goods, at.pricesAfter, priceRange),
    checks: theoryChecksAt(fitted, after, SYSTEMS[fitted.form].shareFunction ? pointName : "the new prices"),
  };
}
