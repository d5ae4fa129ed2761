import type { Estimate, IncidenceGroup, PriceChangeFinding } from "../../schemas/price-change.ts";
import type { QuotableWord } from "../../schemas/quotable.ts";
import { printCount, type QuantityKind } from "../numbers.ts";
import { withArticle } from "../slutsky-matrix.ts";
import { type Asked, estimateInWords, NothingToQuote, placeAmong, plain, type QuotedAnswer } from "./answer.ts";

type Quote = (finding: PriceChangeFinding, asked: Asked) => QuotedAnswer;

/** The group that is named, "all rows" being one; undefined where none is: the point. */
function groupOf({ incidence }: PriceChangeFinding, written: string | undefined): IncidenceGroup | undefined {
  if (written === undefined) return undefined;
  if (incidence === undefined) throw new NothingToQuote("It tells of no groups: the system predicts no shares.");
  const refused = incidence.without.find(({ name }) => plain(name) === plain(written));
  if (refused) throw new NothingToQuote(`${refused.name}: ${refused.undefined}`);
  const all = [...incidence.groups, incidence.all];
  return all[
    placeAmong(
      written,
      all.map(({ name }) => name),
      "group",
    )
  ];
}

interface Told {
  readonly says: string;
  readonly kind: QuantityKind;
  readonly at: (finding: PriceChangeFinding) => Estimate | undefined;
  readonly of?: (group: IncidenceGroup) => Estimate | undefined;
}

/** At the point, or of the group that is named. */
function measure({ says, kind, at, of }: Told): Quote {
  return (finding, { words, part }) => {
    const group = of && groupOf(finding, words[0]);
    const found = of && group ? of(group) : at(finding);
    if (found === undefined) throw new NothingToQuote(whyAbsent(finding));
    const where = group ? `of ${group.name}` : `at ${withArticle(finding.pointName)}`;
    return {
      printed: estimateInWords({ estimate: found.value, error: found.error }, kind, part),
      says: `${says} ${where}`,
    };
  };
}

function whyAbsent({ at }: PriceChangeFinding): string {
  const reasons = [at.absent, at.tax?.noExcessBurden, at.tax?.noMarginalCost];
  return reasons.find((reason) => reason !== undefined) ?? "It has none: no price that changes is a tax.";
}

/** A loss by the expenditure before. */
function byTotal(find: (finding: PriceChangeFinding) => Estimate | undefined): Told["at"] {
  return (finding) => {
    const found = find(finding);
    const total = finding.at.totalBefore;
    return (
      found && {
        value: found.value / total,
        error: found.error / total,
        low: found.low / total,
        high: found.high / total,
      }
    );
  };
}

function effect(says: string, which: "substitution" | "income" | "change"): Quote {
  return (finding, { words, part }) => {
    const { at, fitted, pointName } = finding;
    const i = placeAmong(words[0], fitted.goods, "good");
    const estimates = which === "change" ? at.total : at.hicks?.[which];
    if (estimates === undefined) throw new NothingToQuote(whyAbsent(finding));
    const found = { estimate: estimates.values[i], error: estimates.errors[i] };
    return {
      printed: estimateInWords(found, "elasticity", part),
      says: `${says} of ${fitted.goods[i]} at ${withArticle(pointName)}`,
    };
  };
}

/** Numbers of a price change cell. */
export const PRICE_CHANGE_QUOTES: { readonly [W in QuotableWord<"price change">]: Quote } = {
  cv: measure({
    says: "compensating variation",
    kind: "money",
    at: ({ at }) => at.welfare?.compensating,
    of: ({ welfare }) => welfare?.compensating,
  }),
  ev: measure({
    says: "equivalent variation",
    kind: "money",
    at: ({ at }) => at.welfare?.equivalent,
    of: ({ welfare }) => welfare?.equivalent,
  }),
  "cv share": measure({
    says: "compensating variation by expenditure",
    kind: "share",
    at: byTotal(({ at }) => at.welfare?.compensating),
    of: ({ welfareShare }) => welfareShare?.compensating,
  }),
  "ev share": measure({
    says: "equivalent variation by expenditure",
    kind: "share",
    at: byTotal(({ at }) => at.welfare?.equivalent),
    of: ({ welfareShare }) => welfareShare?.equivalent,
  }),
  "second order": measure({
    says: "compensating variation to second order",
    kind: "money",
    at: ({ at }) => at.secondOrder,
    of: ({ secondOrder }) => secondOrder,
  }),
  surplus: measure({ says: "loss of Marshallian surplus", kind: "money", at: ({ at }) => at.marshallian }),
  "cost of living": measure({
    says: "cost of living at the utility before",
    kind: "entry",
    at: ({ at }) => at.costOfLiving.atUtilityBefore,
  }),
  revenue: measure({
    says: "revenue",
    kind: "money",
    at: ({ at }) => at.tax?.revenue,
    of: ({ tax }) => tax?.revenue,
  }),
  "excess burden": measure({
    says: "excess burden",
    kind: "money",
    at: ({ at }) => at.tax?.excessBurden,
    of: ({ tax }) => tax?.excessBurden,
  }),
  "marginal cost": measure({
    says: "marginal cost of funds",
    kind: "entry",
    at: ({ at }) => at.tax?.marginalCost,
    of: ({ tax }) => tax?.marginalCost,
  }),
  substitution: effect("substitution effect on the quantity", "substitution"),
  income: effect("income effect on the quantity", "income"),
  change: effect("change of the quantity", "change"),
  rows: (finding, { words }) => {
    const group = groupOf(finding, words[0] ?? "all rows");
    return { printed: printCount(group?.rows ?? 0), says: `rows of ${group?.name}` };
  },
};
