import { z } from "zod";
import { caveats } from "./caveats.ts";
import { theoryChecks, undefinedRows } from "./checks.ts";
import { estimates, groupsSpecification, undefinedGroup } from "./elasticities.ts";
import { estimate } from "./price-change.ts";
import { cellName, count, fingerprint, finite, goodName, vector } from "./primitives.ts";
import { pointSpecification } from "./slutsky.ts";
import { restrictionTest } from "./system.ts";

/** What a figure shows, in the order in which it is offered. */
export const FIGURE_NAMES = [
  "engel curves",
  "demand curve",
  "elasticities",
  "fit of shares",
  "largest eigenvalue",
  "incidence",
  "shares by group",
  "price distribution",
] as const;
export type FigureName = (typeof FIGURE_NAMES)[number];

export const FIGURE_READS = ["system", "data", "price change"] as const;
export type FigureReads = (typeof FIGURE_READS)[number];

/** What each figure is drawn of, how many goods it takes, and which other keys mean something to it. */
export const FIGURE_ASKS: Readonly<
  Record<
    FigureName,
    {
      readonly reads: FigureReads;
      readonly goods: "some" | "one" | "none";
      readonly at: boolean;
      readonly groups: boolean;
    }
  >
> = {
  "engel curves": { reads: "system", goods: "some", at: true, groups: false },
  "demand curve": { reads: "system", goods: "one", at: true, groups: false },
  elasticities: { reads: "system", goods: "some", at: true, groups: true },
  "fit of shares": { reads: "system", goods: "some", at: false, groups: false },
  "largest eigenvalue": { reads: "system", goods: "none", at: true, groups: false },
  incidence: { reads: "price change", goods: "none", at: false, groups: false },
  "shares by group": { reads: "data", goods: "some", at: false, groups: true },
  "price distribution": { reads: "data", goods: "one", at: false, groups: false },
};

export const figureSpecification = z
  .strictObject({
    kind: z.literal("figure"),
    system: cellName.optional(),
    data: cellName.optional(),
    "price change": cellName.optional(),
    show: z.enum(FIGURE_NAMES),
    /** All of them unless some are named. */
    goods: z.array(goodName).min(1).optional(),
    /** The mean unless said otherwise. */
    at: pointSpecification.optional(),
    /** Of elasticities; of shares, tenths of total expenditure unless said otherwise. */
    groups: groupsSpecification.optional(),
    /** Of confidence, of every interval. */
    level: z.number().min(0.5).max(0.999).default(0.95),
  })
  .superRefine((specification, context) => {
    const { show, goods, at, groups } = specification;
    const tell = (path: string, message: string) => context.addIssue({ code: "custom", path: [path], message });
    const named = FIGURE_READS.filter((key) => specification[key] !== undefined);
    const asks = FIGURE_ASKS[show];
    if (named.length > 1) tell(named[1], `a figure reads one cell, and ${named.join(" and ")} are named: keep one`);
    else if (named[0] !== asks.reads)
      tell(named[0] ?? "show", `${show} is drawn of a ${asks.reads} cell: name it under ${asks.reads}`);
    if (asks.goods === "one" && goods?.length !== 1) {
      tell(goods === undefined ? "show" : "goods", `${show} is of one good: name it, as in goods: [the good]`);
    }
    if (asks.goods === "none" && goods !== undefined)
      tell("goods", `${show} is of all goods together: leave goods out`);
    const twice = goods?.find((good, i) => goods.indexOf(good) < i);
    if (twice !== undefined) tell("goods", `goods has ${twice} twice`);
    if (!asks.at && at !== undefined) tell("at", `${show} stands at no one point: leave at out`);
    if (!asks.groups && groups !== undefined) tell("groups", `${show} has no groups of its own: leave groups out`);
    if (asks.at && at !== undefined && groups !== undefined) {
      tell("at", "at is one point and groups are several: give one of them");
    }
  });
export type FigureSpecification = z.infer<typeof figureSpecification>;

/** Points asked for at which the system is not defined: in none of the curves. */
const leftOut = z.strictObject({ points: count, of: count });
/** Bootstrap draws behind the intervals, where these are percentiles. */
const draws = count.optional();

export const engelFigure = z.strictObject({
  show: z.literal("engel curves"),
  /** Total expenditure in the units uploaded. */
  totals: vector,
  /** Predicted shares, a curve for each good. */
  curves: z.array(z.strictObject({ good: goodName, ...estimates.shape })),
  leftOut,
  draws,
});

export const demandFigure = z.strictObject({
  show: z.literal("demand curve"),
  good: goodName,
  /** Its own price, in the units uploaded; other prices stay at the point. */
  prices: vector,
  /** Quantities in the units uploaded, at the total of the point. */
  uncompensated: estimates,
  /** At the utility of the point. */
  compensated: estimates.optional(),
  /** Why there is none, as a sentence. */
  noCompensated: z.string().optional(),
  /** Where the two meet. */
  here: z.strictObject({ price: finite, quantity: finite, total: finite }),
  /** Whether the weights of the system's price index move along the curve, which elasticities of la-aids hold. */
  indexMoves: z.boolean(),
  leftOut,
  draws,
});

const elasticityFigure = z.strictObject({
  show: z.literal("elasticities"),
  goods: z.array(goodName),
  groupedBy: groupsSpecification.optional(),
  groups: z.array(
    z.strictObject({
      name: z.string(),
      rows: count.optional(),
      total: finite,
      expenditure: estimates,
      own: estimates,
      ownCompensated: estimates,
    }),
  ),
  without: z.array(undefinedGroup),
});

/** Rows whose predicted shares of a good are near each other. */
export const fitBin = z.strictObject({ rows: count, weightShare: finite, predicted: finite, observed: estimate });

const fitFigure = z.strictObject({
  show: z.literal("fit of shares"),
  goods: z.array(z.strictObject({ good: goodName, bins: z.array(fitBin) })),
  rows: count,
  /** Of the rows used, those without predicted shares. */
  notDefined: undefinedRows.optional(),
});

const eigenvalueFigure = z.strictObject({
  show: z.literal("largest eigenvalue"),
  totals: vector,
  eigenvalue: estimates,
  /** Stretches of expenditure in which it is above nought. */
  breaks: z.array(z.strictObject({ from: finite, to: finite })),
  leftOut,
  draws,
});

const bearer = z.strictObject({
  name: z.string(),
  rows: count,
  weightShare: finite,
  /** Mean loss by mean expenditure, and in money of the units uploaded. */
  share: estimate,
  amount: estimate,
});

const incidenceFigure = z.strictObject({
  show: z.literal("incidence"),
  /** The compensating variation, or its approximation where there is no cost function. */
  measure: z.enum(["compensating variation", "second order"]),
  groupedBy: groupsSpecification.optional(),
  groups: z.array(bearer),
  all: bearer,
  /** Groups in which the answer is nowhere defined. */
  without: z.array(z.strictObject({ name: z.string(), rows: count, undefined: z.string() })),
  /** Rows in none of the means. */
  notDefined: count,
});

const sharesFigure = z.strictObject({
  show: z.literal("shares by group"),
  goods: z.array(goodName),
  groupedBy: groupsSpecification,
  groups: z.array(
    z.strictObject({
      name: z.string(),
      rows: count,
      weightShare: finite,
      /** Geometric mean of total expenditure, units uploaded. */
      total: finite,
      /** Weighted mean shares by good. */
      shares: estimates,
    }),
  ),
});

const priceFigure = z.strictObject({
  show: z.literal("price distribution"),
  good: goodName,
  rows: count,
  /** How many different prices there are. */
  different: count,
  /** Between the 1st and the 99th percentile, units uploaded. */
  edges: vector,
  /** Of the weight of all rows, by bin; what lies below the first edge and above the last. */
  shares: vector,
  below: finite,
  above: finite,
  quartiles: z.tuple([finite, finite, finite]),
});

export const figureFinding = z.strictObject({
  kind: z.literal("figure"),
  dataFingerprint: fingerprint,
  level: finite,
  /** Where prices, demographics or everything stand. */
  pointName: z.string().optional(),
  /** What the standard errors are, in words. */
  standardErrors: z.string().optional(),
  intervals: z.enum(["normal", "percentile"]),
  drawn: z.discriminatedUnion("show", [
    engelFigure,
    demandFigure,
    elasticityFigure,
    fitFigure,
    eigenvalueFigure,
    incidenceFigure,
    sharesFigure,
    priceFigure,
  ]),
  /** Of the system beneath, where there is one. */
  checks: theoryChecks.optional(),
  tests: z.array(restrictionTest).optional(),
  caveats,
  /** The group whose expenditure the system's total is. */
  conditionalOn: goodName.optional(),
});
export type FigureFinding = z.infer<typeof figureFinding>;
export type Drawn = FigureFinding["drawn"];
export type DrawnOf<S extends FigureName> = Extract<Drawn, { show: S }>;
/** A finding known to show one thing. */
export type FindingOfFigure<S extends FigureName> = FigureFinding & { readonly drawn: DrawnOf<S> };
