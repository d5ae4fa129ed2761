import { z } from "zod";
import { goodName, matrix, vector } from "./primitives.ts";

/** Estimates with standard errors and the ends of their intervals. */
export const estimates = z.strictObject({ values: vector, errors: vector, low: vector, high: vector });
export const estimatesByPrice = z.strictObject({ values: matrix, errors: matrix, low: matrix, high: matrix });
export type EstimatesByPrice = z.infer<typeof estimatesByPrice>;

const VERDICTS = ["yes", "no", "undecided"] as const;
const verdict = z.enum(VERDICTS);
/** By the sign of an elasticity: null on the diagonal. */
const pair = z.enum(["substitutes", "complements", "undecided"]).nullable();

const classOfGood = z.strictObject({
  good: goodName,
  kind: z.enum(["luxury", "necessity", "inferior", "undecided"]),
  normal: verdict,
  incomeNeutral: z.boolean(),
  giffen: verdict,
});
export type ClassOfGood = z.infer<typeof classOfGood>;

/** Elasticities of goods at one place: estimates, what they make of each good and of each pair. */
export const estimatedElasticities = {
  /** Those that stand in the formulas; over rows the group's expenditure on each good by its total. */
  shares: vector,
  expenditure: estimates,
  uncompensated: estimatesByPrice,
  compensated: estimatesByPrice,
  classes: z.array(classOfGood),
  net: z.array(z.array(pair)),
  gross: z.array(z.array(pair)),
};
