import { z } from "zod";
import { PRICE_INDEX_NAMES, SYSTEM_NAMES } from "../systems/names.ts";
import { caveats } from "./caveats.ts";
import { theoryChecks, undefinedRows } from "./checks.ts";
import { estimatedElasticities } from "./elasticity-estimates.ts";
import { cellName, columnName, count, fingerprint, finite, goodName } from "./primitives.ts";
import { pointSpecification } from "./slutsky.ts";
import { namedPoint, restrictionTest } from "./system.ts";
import { UNCONDITIONAL_FORMULAS, unconditionalFinding } from "./two-stage.ts";

export { type ClassOfGood, type EstimatesByPrice, estimates } from "./elasticity-estimates.ts";

/** What stands for total expenditure where a column is asked for. */
export const TOTAL_EXPENDITURE = "total expenditure";

/** Rows parted by the values of a column, or by quantiles of one. */
export const groupsSpecification = z.strictObject({
  /** A column of the data, text or number; or total expenditure. */
  of: columnName,
  /** So many groups of equal weight, lowest first; without it each value is a group. */
  quantiles: z.number().int().min(2).max(20).optional(),
});
export type GroupsSpecification = z.infer<typeof groupsSpecification>;

export const elasticitiesSpecification = z
  .strictObject({
    kind: z.literal("elasticities"),
    system: cellName,
    /** One point; the mean unless said otherwise. */
    at: pointSpecification.optional(),
    groups: groupsSpecification.optional(),
    /** At the mean point, or over the rows, each weighted by what it spends on the good. */
    over: z.enum(["means", "rows"]).default("means"),
    /** Which shares stand in the formulas. */
    shares: z.enum(["predicted", "observed"]).default("predicted"),
    /** Whether the weights of Stone's index in la-aids are held or move with the shares. */
    index: z.enum(["held", "exact"]).default("held"),
    /** Of confidence, of every interval and class. */
    level: z.number().min(0.5).max(0.999).default(0.95),
    /** A broader system that has the goods of `system` as one good: two-stage budgeting. */
    within: cellName.optional(),
    /** Which good of the broader system that is. */
    as: goodName.optional(),
    /** By which formula; Carpentier and Guyomard's unless said otherwise. */
    unconditional: z.enum(UNCONDITIONAL_FORMULAS).optional(),
  })
  .superRefine(({ at, groups, over, shares, within, as, unconditional }, context) => {
    const tell = (path: string, message: string) => context.addIssue({ code: "custom", path: [path], message });
    if (at !== undefined && groups !== undefined) {
      tell("at", "at is one point and groups are several: give one of them");
    } else if (at !== undefined && over === "rows") {
      tell("at", "at is one point, and over: rows goes over all rows or groups of them: give one of them");
    }
    if (within === undefined) {
      if (as !== undefined) tell("as", "as names a good of the broader system: name that system in within");
      if (unconditional !== undefined) {
        tell("unconditional", "unconditional elasticities need a broader system: name it in within");
      }
    } else {
      if (as === undefined) tell("within", "within needs as beside it: which good of the broader system the group is");
      if (groups !== undefined || over === "rows") {
        tell("within", "within meets both systems at one point: leave out groups and over");
      }
      if (typeof at === "object" && "prices" in at) {
        tell(
          "at",
          "prices of one's own are known of one system only: within takes base point, mean, a row or a quantile",
        );
      }
    }
    const unobserved = typeof at === "object" && ("prices" in at || "x" in at);
    if (shares === "observed" && unobserved) {
      tell("shares", "shares are observed in rows, and none at this point: give the base point, the mean or a row");
    }
  });
export type ElasticitiesSpecification = z.infer<typeof elasticitiesSpecification>;

/** Who is spoken of: rows used (none of an imagined point) and their part of the weight. */
const about = {
  name: z.string(),
  rows: count.optional(),
  weightShare: finite.optional(),
  /** In the units uploaded: total expenditure at the point, or the mean over the rows. */
  total: finite,
};

export const elasticityGroup = z.strictObject({
  ...about,
  /** Where they are evaluated, in units of estimation; absent over rows. */
  point: namedPoint.optional(),
  ...estimatedElasticities,
  /** Over rows: those of the group in which the system predicts no shares; they are in none of the sums. */
  notDefined: undefinedRows.optional(),
  /** Over rows: how many rows have a share that is not positive, by good. */
  notPositive: z.array(z.strictObject({ good: goodName, rows: count })),
});
export type ElasticityGroup = z.infer<typeof elasticityGroup>;

/** A group that has none, with the reason. */
export const undefinedGroup = z.strictObject({ ...about, undefined: z.string() });

export const elasticitiesFinding = z.strictObject({
  kind: z.literal("elasticities"),
  dataFingerprint: fingerprint,
  form: z.enum(SYSTEM_NAMES),
  priceIndex: z.enum(PRICE_INDEX_NAMES).optional(),
  goods: z.array(goodName),
  over: z.enum(["means", "rows"]),
  shares: z.enum(["predicted", "observed"]),
  index: z.enum(["held", "exact"]),
  level: finite,
  /** What the system's standard errors are, in words: "clustered by village, 212 clusters". */
  standardErrors: z.string(),
  /** Estimate and standard error times a normal quantile, or the bootstrap's own percentiles, over rows where these are few enough. */
  intervals: z.enum(["normal", "percentile"]),
  /** What parts the rows; absent of one point, and over all rows. */
  groupedBy: groupsSpecification.optional(),
  groups: z.array(elasticityGroup).min(1),
  /** What theory says: at the one point, or, of several groups, where the system's own checks stand. */
  checks: theoryChecks,
  tests: z.array(restrictionTest),
  without: z.array(undefinedGroup),
  caveats,
  /** Over rows: how many of them the standard errors' derivatives were taken at, where not at all. */
  derivativeRows: z.strictObject({ used: count, of: count }).optional(),
  /** The group whose expenditure the system's total is: everything above is conditional on it. */
  conditionalOn: goodName.optional(),
  /** Where a broader system is named. */
  unconditional: unconditionalFinding.optional(),
});
export type ElasticitiesFinding = z.infer<typeof elasticitiesFinding>;
