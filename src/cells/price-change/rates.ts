import {
  type GoodPriceSpecification,
  PRICE_RULES,
  type PriceChangeFinding,
  type PriceQuestion,
} from "../../../shared/schemas/price-change.ts";
import type { Value } from "../../../shared/study/edit.ts";
import type { KeyPath } from "../form/written.ts";

export type PriceRule = (typeof PRICE_RULES)[number];

/** What stands for total expenditure among the rulers: no good can be called so, since names are not empty. */
export const EXPENDITURE = "";

/** By which rule a good's price changes; by per cent where nothing is said of it. */
export function ruleOf(change: GoodPriceSpecification | undefined): PriceRule {
  return PRICE_RULES.find((rule) => change?.[rule] !== undefined) ?? "per cent";
}

const ownChange = ({ prices }: PriceQuestion, good: string) => (Object.hasOwn(prices, good) ? prices[good] : undefined);

/** The number a ruler stands at: per cent, or a price or tax in the units uploaded. */
export function rateOf(question: PriceQuestion, good: string): number {
  if (good === EXPENDITURE) return question.expenditure;
  const change = ownChange(question, good);
  return change?.[ruleOf(change)] ?? 0;
}

/** Where a ruler stands when nothing changes: nought, or of a rule that names a price the price before. */
export function restOf({ at, fitted }: PriceChangeFinding, question: PriceQuestion, good: string): number {
  return ruleOf(ownChange(question, good)) === "to" ? at.pricesBefore[fitted.goods.indexOf(good)] : 0;
}

/**
 * The question with another number for a good or for total expenditure. A good that the stored question does not name
 * leaves it again at nought.
 */
export function withRate(stored: PriceQuestion, question: PriceQuestion, good: string, rate: number): PriceQuestion {
  if (good === EXPENDITURE) return { ...question, expenditure: rate };
  const { [good]: own, ...others } = question.prices;
  if (rate === 0 && ownChange(stored, good) === undefined) return { ...question, prices: others };
  return { ...question, prices: { ...question.prices, [good]: { ...own, [ruleOf(own)]: rate } } };
}

/** Nothing changes any more, each good by its own rule. */
export function atRest(finding: PriceChangeFinding, question: PriceQuestion): PriceQuestion {
  const goods = [...finding.fitted.goods, EXPENDITURE];
  return goods.reduce((next, good) => withRate(finding.question, next, good, restOf(finding, next, good)), question);
}

/** The keys of a cell that differ between what is stored and what is tried: nothing else of its source is written. */
export function editsTo(stored: PriceQuestion, tried: PriceQuestion): (readonly [KeyPath, Value | undefined])[] {
  const goods = Object.entries(tried.prices).flatMap(([good, change]): (readonly [KeyPath, Value | undefined])[] => {
    const before = ownChange(stored, good);
    const rule = ruleOf(change);
    const rate = change[rule] ?? 0;
    if (before === undefined) return [[["prices", good], { [rule]: rate }]];
    return before[rule] === rate ? [] : [[["prices", good, rule], rate]];
  });
  const { expenditure } = tried;
  const money: (readonly [KeyPath, Value | undefined])[] =
    expenditure === stored.expenditure ? [] : [[["expenditure"], expenditure === 0 ? undefined : expenditure]];
  return [...goods, ...money];
}
