import { z } from "zod";
import { SYSTEM_NAMES } from "../systems/names.ts";
import { estimatedElasticities, estimatesByPrice } from "./elasticity-estimates.ts";
import { finite, goodName } from "./primitives.ts";

/** How unconditional elasticities are formed from those of a group and of the broader system it is a good of. */
export const UNCONDITIONAL_FORMULAS = ["carpentier guyomard", "edgerton"] as const;
export type UnconditionalFormula = (typeof UNCONDITIONAL_FORMULAS)[number];

const oneEstimate = z.strictObject({ value: finite, error: finite, low: finite, high: finite });

/** Unconditional elasticities of a group's goods, in a broader system of which the group is one good. */
export const unconditionalFinding = z.strictObject({
  formula: z.enum(UNCONDITIONAL_FORMULAS),
  /** The good of the broader system that the group is. */
  group: goodName,
  /** Of the broader system. */
  form: z.enum(SYSTEM_NAMES),
  /** Where the broader system is evaluated. */
  pointName: z.string(),
  /** What the broader system's standard errors are, in words. */
  standardErrors: z.string(),
  /**
   * The two systems' estimates as uncorrelated; or, where they rest on rows of the same upload, the most the errors can
   * be whatever their correlation.
   */
  errors: z.enum(["independent", "bound"]),
  /** On the group at the point, in the units each was uploaded in: total of its own data, share times total of the broader. */
  spent: z.strictObject({ own: finite, broader: finite }),
  /** The group as a good of the broader system. */
  asGood: z.strictObject({
    share: finite,
    expenditure: oneEstimate,
    uncompensated: oneEstimate,
    compensated: oneEstimate,
  }),
  /** Of the group's goods; shares are of the broader total. */
  ...estimatedElasticities,
  /** To the price of each other good of the broader system. */
  others: z.strictObject({
    goods: z.array(goodName),
    uncompensated: estimatesByPrice,
    compensated: estimatesByPrice,
  }),
  /** By how much the laws that tie them to the group's own elasticities are missed, at most (`unconditionalIdentities`). */
  identities: z.strictObject({
    engel: finite,
    cournot: finite,
    groupPrice: finite,
    homogeneity: finite,
    symmetry: finite,
  }),
});
export type UnconditionalFinding = z.infer<typeof unconditionalFinding>;
