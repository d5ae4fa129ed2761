import { answerAt } from "../../../shared/economics/price-change/answer-at.ts";
import {
  type PriceChangeFinding,
  type PriceChangeSpecification,
  type PriceQuestion,
  priceChangeFinding,
} from "../../../shared/schemas/price-change.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital, listSome } from "../../../shared/study/words.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { QUIET, type RunControl } from "../run.ts";
import { caveatsOf } from "./caveats-of.ts";
import { incidenceOver } from "./price-change-incidence.ts";
import { refusingRanges } from "./refusing.ts";
import { pointOf } from "./slutsky-point.ts";

/**
 * A price change cell: what new prices, taxes and a change of expenditure do at one point, with its effects, welfare and
 * errors, and who bears it over the rows (methods 3.3, 3.4).
 * Errors: `Refusal` (a good or a column that is not there, a point without shares), `Cancelled`.
 */
export function runPriceChange(
  specification: PriceChangeSpecification,
  system: SystemFinding,
  data: PreparedData,
  control: RunControl = QUIET,
): PriceChangeFinding {
  const { fitted } = system;
  const { priceScale, totalScale } = data;
  const { prices, expenditure, level } = specification;
  const question: PriceQuestion = { prices, expenditure };
  requireGoods(question, fitted.goods);
  const { point, pointName } = pointOf(specification.at, system, data);
  const draws = system.bootstrap?.draws;
  const range = rangeOf(data);
  const inUnits = (ends: readonly number[]) => ends.map((end, i) => end * priceScale[i]);
  const priceRange = { low: inUnits(range.low), high: inUnits(range.high) };
  const options = { priceScale, totalScale, level, priceRange, pointName, ...(draws && { draws }) };
  const answer = refusingRanges(() => answerAt(fitted, point, question, options), pointName);
  const { shareFunction } = SYSTEMS[fitted.form];
  return priceChangeFinding.parse({
    kind: "price change",
    dataFingerprint: system.dataFingerprint,
    fitted,
    question,
    pointName,
    point,
    priceScale,
    totalScale,
    level,
    standardErrors: standardErrorsPhrase(system),
    intervals: draws ? "percentile" : "normal",
    ...answer,
    priceRange,
    ...(specification["equivalence scale"] && { equivalenceScale: specification["equivalence scale"] }),
    ...(shareFunction
      ? { noIncidence: `${capital(shareFunction.absent)}.` }
      : { incidence: incidenceOver(specification, system, data, range, control) }),
    tests: system.tests,
    ...caveatsOf(system),
  });
}

function requireGoods({ prices }: PriceQuestion, goods: readonly string[]): void {
  const unknown = Object.keys(prices).filter((good) => !goods.includes(good));
  if (unknown.length === 0) return;
  throw new Refusal(
    unknown.map((good) => ({
      sentence: `The system has no good ${good}; its goods are ${listSome([...goods])}.`,
      key: ["prices", good],
    })),
  );
}

/** Lowest and highest price of each good among the rows used, in units of estimation. */
function rangeOf({ logPrices }: PreparedData): { low: number[]; high: number[] } {
  const ends = logPrices.map((column) => {
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    for (const logPrice of column) {
      if (logPrice < low) low = logPrice;
      if (logPrice > high) high = logPrice;
    }
    return [Math.exp(low), Math.exp(high)];
  });
  return { low: ends.map(([low]) => low), high: ends.map(([, high]) => high) };
}
