import { z } from "zod";
import { caveats } from "./caveats.ts";
import { theoryChecks, undefinedRows } from "./checks.ts";
import { estimates, groupsSpecification } from "./elasticities.ts";
import { cellName, columnName, count, fingerprint, finite, goodName, vector } from "./primitives.ts";
import { pointSpecification } from "./slutsky.ts";
import { fittedSystem, namedPoint, restrictionTest } from "./system.ts";

/** What stands for total expenditure divided by the equivalence scale where a column is asked for. */
export const EXPENDITURE_PER_ADULT = "expenditure per equivalent adult";

/** The four ways in which a price is said to change, one of which each good names. */
export const PRICE_RULES = ["per cent", "to", "ad valorem", "specific"] as const;

/** How the price of one good changes. */
export const goodPriceSpecification = z
  .strictObject({
    /** By so many per cent of the price before. */
    "per cent": finite.gt(-100).optional(),
    /** To this price, in the units uploaded. */
    to: finite.positive().optional(),
    /** A tax (negative: a subsidy) in per cent of what the seller receives. */
    "ad valorem": finite.gt(-100).optional(),
    /** A tax (negative: a subsidy) per unit, in the units uploaded. */
    specific: finite.optional(),
    /** Whether the change is a tax: revenue is counted for those only. Said of ad valorem and specific by their names. */
    tax: z.boolean().optional(),
    /** The share of the tax that reaches the buyer's price; 1 unless said otherwise. */
    "pass-through": finite.positive().max(3).optional(),
  })
  .superRefine((change, context) => {
    const given = PRICE_RULES.filter((rule) => change[rule] !== undefined);
    const tell = (path: string[], message: string) => context.addIssue({ code: "custom", path, message });
    if (given.length !== 1) {
      const found = given.length === 0 ? "none is given" : `${given.join(" and ")} are given`;
      tell([], `a price changes by one of per cent, to, ad valorem, specific; ${found}`);
    }
    const taxed = change.tax ?? (change["ad valorem"] !== undefined || change.specific !== undefined);
    if (change["pass-through"] !== undefined && !taxed) {
      tell(
        ["pass-through"],
        "it is the share of a tax that reaches the price, and this change is no tax: add tax: true",
      );
    }
  });
export type GoodPriceSpecification = z.infer<typeof goodPriceSpecification>;

/** Needs of a household in equivalent adults: a column that says them, or the square root of a column of members. */
export const equivalenceScaleSpecification = z.union([columnName, z.strictObject({ "square root of": columnName })]);
export type EquivalenceScaleSpecification = z.infer<typeof equivalenceScaleSpecification>;

export const priceChangeSpecification = z
  .strictObject({
    kind: z.literal("price change"),
    system: cellName,
    /** Where substitution and income effects are taken; who bears the change is counted over all rows. */
    at: pointSpecification.default("mean"),
    /** By good; a good that is not named keeps its price. */
    prices: z.record(goodName, goodPriceSpecification).default({}),
    /** Change of total expenditure in per cent, everyone's alike. */
    expenditure: finite.gt(-100).default(0),
    /** Groups of rows among which who bears it is told. */
    groups: groupsSpecification.optional(),
    "equivalence scale": equivalenceScaleSpecification.optional(),
    /** Of confidence, of every interval. */
    level: z.number().min(0.5).max(0.999).default(0.95),
  })
  .superRefine((specification, context) => {
    if (specification.groups?.of !== EXPENDITURE_PER_ADULT || specification["equivalence scale"] !== undefined) return;
    context.addIssue({
      code: "custom",
      path: ["groups", "of"],
      message: `${EXPENDITURE_PER_ADULT} needs equivalence scale: a column of equivalent adults, or {square root of: members}`,
    });
  });
export type PriceChangeSpecification = z.infer<typeof priceChangeSpecification>;

/** An estimate with its standard error and the ends of its interval. */
export const estimate = z.strictObject({ value: finite, error: finite, low: finite, high: finite });
export type Estimate = z.infer<typeof estimate>;
export type Estimates = z.infer<typeof estimates>;

/** The two parts of a change of quantities, by good, in the units uploaded. */
const effects = z.strictObject({ substitution: estimates, income: estimates });
export type Effects = z.infer<typeof effects>;

/** Losses are positive, in money of the units uploaded. */
export const welfareEffects = z.strictObject({
  /** CV = c(p1, u0) − x1. */
  compensating: estimate,
  /** EV = x0 − c(p0, u1). */
  equivalent: estimate,
});

/** Of the goods whose change is a tax. */
export const taxEffects = z.strictObject({
  /** Σ t_i q1_i. */
  revenue: estimate,
  /** The part of it that buyers bear, Σ (p1_i − p0_i) q1_i: the same where all of the tax is passed on. */
  paidByBuyers: estimate,
  /** EV − what buyers pay; absent, with the reason, where something other than a tax changes. */
  excessBurden: estimate.optional(),
  noExcessBurden: z.string().optional(),
  /** Buyers' loss by a further unit of revenue, every tax raised in proportion. */
  marginalCost: estimate.optional(),
  noMarginalCost: z.string().optional(),
});
export type TaxEffects = z.infer<typeof taxEffects>;

/** A good whose predicted share leaves [0, 1] somewhere along the change. */
export const outsideUnit = z.strictObject({
  good: goodName,
  where: z.enum(["before", "compensated", "after"]),
  share: finite,
});

/** What a price change does at one point: a pure function of fitted system, point and question, but for a bootstrap's draws. */
export const changeAtPoint = z.strictObject({
  /** Units uploaded, by good. */
  pricesBefore: vector,
  pricesAfter: vector,
  /** Tax per unit, 0 where the change is none. */
  taxes: vector,
  totalBefore: finite,
  totalAfter: finite,
  /** Bootstrap draws at which everything here is defined, where the system was bootstrapped. */
  draws: count.optional(),
  /** Budget shares; those observed in a system in differences. */
  shares: z.strictObject({ before: estimates, compensated: estimates.optional(), after: estimates.optional() }),
  /** In the units uploaded. `hicks` at the utility before; `slutsky` where the bundle before is affordable. */
  quantities: z.strictObject({
    before: estimates,
    hicks: estimates.optional(),
    slutsky: estimates.optional(),
    after: estimates.optional(),
  }),
  /** After − before. */
  total: estimates.optional(),
  hicks: effects.optional(),
  slutsky: effects.optional(),
  /** dq_i = Σ_j (S_ij − q_j ∂q_i/∂x) dp_j + ∂q_i/∂x dx at the slopes before. */
  infinitesimal: effects,
  welfare: welfareEffects.optional(),
  /** Σ q0 Δp + ½ ΣΣ S Δp Δp − Δx. */
  secondOrder: estimate,
  /** −ΔCS, along the straight path of prices and expenditure. */
  marshallian: estimate.optional(),
  /** What the change makes of the cost of living, before = 1. */
  costOfLiving: z.strictObject({
    /** c(p1, u0)/c(p0, u0). */
    atUtilityBefore: estimate.optional(),
    /** Σ p1 q0 / Σ p0 q0. */
    laspeyres: estimate,
    /** Σ p1 q1 / Σ p0 q1. */
    paasche: estimate.optional(),
  }),
  /** Where a changed price is a tax. */
  tax: taxEffects.optional(),
  /** Why what a cost function gives is not here, as a sentence. */
  absent: z.string().optional(),
  outside: z.array(outsideUnit),
});
export type ChangeAtPoint = z.infer<typeof changeAtPoint>;

/** A good whose new price lies outside the prices of the sample, in the units uploaded. */
export const unseenPrice = z.strictObject({
  good: goodName,
  /** Of the new prices asked about, the one furthest from the sample. */
  price: finite,
  /** The nearest price of the sample. */
  bound: finite,
  side: z.enum(["above", "below"]),
  /** Rows whose new price is there; absent at a point. */
  rows: count.optional(),
});
export type UnseenPrice = z.infer<typeof unseenPrice>;

/** Who bears a change: weighted means over the rows of a group, each row at its own prices and total. */
export const incidenceGroup = z.strictObject({
  name: z.string(),
  rows: count,
  weightShare: finite,
  /** Mean total expenditure before, units uploaded. */
  expenditure: finite,
  /** Mean of expenditure per equivalent adult, where there is an equivalence scale. */
  perAdult: finite.optional(),
  welfare: welfareEffects.optional(),
  /** Mean loss by mean expenditure. */
  welfareShare: welfareEffects.optional(),
  secondOrder: estimate,
  secondOrderShare: estimate,
  tax: taxEffects.optional(),
  /** Mean revenue by mean expenditure. */
  revenueShare: estimate.optional(),
  /** Mean quantities by good: bought, and how they change; the part that is substitution where there is a cost function. */
  quantitiesBefore: vector,
  quantityChange: estimates,
  substitution: estimates.optional(),
  /** Rows in which the answer is not defined; in none of the means. */
  notDefined: undefinedRows.optional(),
  /** Rows in the means in which a share leaves [0, 1]: one that the system predicts, before or after, or what a household would buy. */
  outside: z.strictObject({ system: count, household: count }),
});
export type IncidenceGroup = z.infer<typeof incidenceGroup>;

/** A row where the answer is not defined, or a share leaves [0, 1]. Never part of a referee copy. */
export const namedRow = z.strictObject({
  row: count,
  /** In the units uploaded. */
  total: finite,
  /** Why it is in none of the means, as a clause; absent where it is in them. */
  notDefined: z.string().optional(),
  /** The shares that leave [0, 1]: predicted by the system, or what the household would buy. */
  outside: z.array(
    z.strictObject({
      good: goodName,
      share: finite,
      of: z.enum(["system", "household"]),
      when: z.enum(["before", "after"]),
    }),
  ),
});
export type NamedRow = z.infer<typeof namedRow>;

export const incidence = z.strictObject({
  /** What parts the rows; absent where none is asked for. */
  groupedBy: groupsSpecification.optional(),
  groups: z.array(incidenceGroup),
  all: incidenceGroup,
  /** Why a group has no row in which the answer is defined. */
  without: z.array(z.strictObject({ name: z.string(), rows: count, undefined: z.string() })),
  /** The worst rows first, at most 500, and how many there are. */
  brokenRows: z.array(namedRow).max(500),
  namedRows: count,
  /** Rows whose new price lies outside the prices of the sample, by good. */
  unseen: z.array(unseenPrice),
  /** How many rows the derivatives behind the standard errors were taken at, where not at all. */
  derivativeRows: z.strictObject({ used: count, of: count }).optional(),
});
export type Incidence = z.infer<typeof incidence>;

/** The question as it was asked, in the order of the goods: enough to put another to the same fitted system. */
export const priceQuestion = z.strictObject({
  prices: z.record(goodName, goodPriceSpecification),
  expenditure: finite,
});
export type PriceQuestion = z.infer<typeof priceQuestion>;

export const priceChangeFinding = z.strictObject({
  kind: z.literal("price change"),
  dataFingerprint: fingerprint,
  fitted: fittedSystem,
  question: priceQuestion,
  pointName: z.string(),
  /** Before the change, in units of estimation. */
  point: namedPoint,
  /** Divisors that lead back to units uploaded. */
  priceScale: vector,
  totalScale: finite,
  level: finite,
  /** What the system's standard errors are, in words. */
  standardErrors: z.string(),
  /** Of what is at the point; over rows intervals are normal. */
  intervals: z.enum(["normal", "percentile"]),
  at: changeAtPoint,
  /** Lowest and highest price of each good among the rows used, units uploaded. */
  priceRange: z.strictObject({ low: vector, high: vector }),
  unseen: z.array(unseenPrice),
  equivalenceScale: equivalenceScaleSpecification.optional(),
  /** Absent, with the reason, of a system that predicts no shares. */
  incidence: incidence.optional(),
  noIncidence: z.string().optional(),
  /** What theory says at the prices and total after. */
  checks: theoryChecks,
  tests: z.array(restrictionTest),
  caveats,
});
export type PriceChangeFinding = z.infer<typeof priceChangeFinding>;
