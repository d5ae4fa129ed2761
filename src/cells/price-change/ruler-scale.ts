import type { PriceChangeFinding, PriceQuestion } from "../../../shared/schemas/price-change.ts";
import { capital } from "../../../shared/study/words.ts";
import { EXPENDITURE, type PriceRule, rateOf, restOf, ruleOf } from "./rates.ts";

/** Where a ruler goes from and to, in what steps, and what it is called. */
export interface RulerScale {
  readonly min: number;
  readonly max: number;
  readonly step: number;
  readonly value: number;
  /** Where nothing changes. */
  readonly rest: number;
  /** Whole steps from the least to the most: the marks on the ruler. */
  readonly marks: readonly { readonly at: number; readonly size: "short" | "long" | "rest" }[];
  readonly name: string;
  /** Beside the name: what kind of change it is. */
  readonly kind: string;
  readonly isPercent: boolean;
}

/** Half a ruler, in per cent of the price before; twice it, and so on, where a number lies further out. */
const REACH = 50;
/** Per cent from mark to mark. */
const MARK = 5;
/** A price can fall no further. */
const LOWEST = -95;

const KINDS: Readonly<Record<PriceRule, string>> = {
  "per cent": "",
  to: "price",
  "ad valorem": "tax in per cent",
  specific: "tax per unit",
};

/** A round step of about so much: 1, 2 or 5 times a power of ten. */
function roundStep(about: number): number {
  const power = 10 ** Math.floor(Math.log10(about));
  const [step = 10] = [1, 2, 5].filter((multiple) => multiple * power >= about * 0.999);
  return step * power;
}

function reachOf(percent: number): readonly [number, number] {
  const beyond = Math.max(1, Math.ceil(Math.abs(percent) / REACH)) * REACH;
  return percent < -REACH ? [LOWEST, REACH] : [-REACH, beyond];
}

function marksOf([low, high]: readonly [number, number]): RulerScale["marks"] {
  const every = high > 2 * REACH ? MARK * 10 : MARK;
  const first = Math.ceil(low / every);
  const count = Math.floor(high / every) - first + 1;
  return Array.from({ length: count }, (_, index) => {
    const percent = (first + index) * every;
    return {
      at: (percent - low) / (high - low),
      size: percent === 0 ? "rest" : percent % (2 * every) === 0 ? "long" : "short",
    };
  });
}

/** The ruler of a good, or of total expenditure, at the question as it is tried. */
export function rulerScale(finding: PriceChangeFinding, question: PriceQuestion, good: string): RulerScale {
  const change = Object.hasOwn(question.prices, good) ? question.prices[good] : undefined;
  const rule = good === EXPENDITURE ? "per cent" : ruleOf(change);
  const value = rateOf(question, good);
  const rest = restOf(finding, question, good);
  const isPercent = rule === "per cent" || rule === "ad valorem";
  // A price or a tax in money moves over the same part of the price before.
  const unit = isPercent ? 1 : finding.at.pricesBefore[finding.fitted.goods.indexOf(good)] / 100;
  const reach = reachOf((value - rest) / unit);
  const step = isPercent ? 1 : roundStep(unit);
  return {
    min: rest + reach[0] * unit,
    max: rest + reach[1] * unit,
    step,
    value,
    rest,
    marks: marksOf(reach),
    name: good === EXPENDITURE ? "Total expenditure" : capital(good),
    kind: change?.tax ? "a tax" : KINDS[rule],
    isPercent,
  };
}
