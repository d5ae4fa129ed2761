import type { Dual } from "../../shared/economics/price-change/dual.ts";
import { type Measures, measuresAt } from "../../shared/economics/price-change/measures.ts";
import { type Random, seededRandom } from "../../shared/numerics/random.ts";
import type { GoodPriceSpecification, PriceQuestion } from "../../shared/schemas/price-change.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import type { FittedCoefficients } from "../../shared/systems/index.ts";
import type { RestrictionName, SystemName } from "../../shared/systems/names.ts";
import { fittedFrom } from "../support/fitted.ts";
import { randomCase } from "./random-systems.ts";

/** A fitted system at random coefficients, a point, a question, and what the change does there. */
export interface ChangeCase {
  readonly fitted: FittedCoefficients;
  readonly point: Point;
  readonly question: PriceQuestion;
  readonly measures: Measures;
}

export const BOTH = ["homogeneity", "symmetry"] as const;

/** Every way in which a price is said to change, none, and a change of money in a third of the cases. */
export function randomQuestion(random: Random, { goods }: FittedCoefficients, { prices }: Point): PriceQuestion {
  const changes = goods.flatMap((good, i): [string, GoodPriceSpecification][] => {
    const passed = 0.5 + random.uniform();
    const size = 10 * random.normal();
    switch (random.integer(6)) {
      case 0:
        return [[good, { "per cent": size }]];
      case 1:
        return [[good, { "per cent": size, tax: true, "pass-through": passed }]];
      case 2:
        return [[good, { to: prices[i] * Math.exp(0.1 * random.normal()) }]];
      case 3:
        return [[good, { "ad valorem": Math.abs(size), "pass-through": passed }]];
      case 4:
        return [[good, { specific: 0.1 * prices[i] * random.uniform(), "pass-through": passed }]];
      default:
        return [];
    }
  });
  return { prices: Object.fromEntries(changes), expenditure: random.integer(3) === 0 ? 5 * random.normal() : 0 };
}

/** So many cases in which everything is defined that the system has. */
export function changeCases(
  name: SystemName,
  seed: number,
  count: number,
  impose: readonly RestrictionName[] = BOTH,
  ask = randomQuestion,
): ChangeCase[] {
  const random = seededRandom(seed);
  const list: ChangeCase[] = [];
  for (let tries = 0; list.length < count; tries++) {
    if (tries > 50 * count) throw new Error(`${list.length} of ${tries} cases of ${name} are defined`);
    const { size, free, theta, point } = randomCase(random, name, impose);
    const fitted = fittedFrom(random, name, size, impose, free, theta);
    const question = ask(random, fitted, point);
    const measures = measured({ fitted, point, question });
    if (measures !== undefined) list.push({ fitted, point, question, measures });
  }
  return list;
}

/** Undefined where the system predicts no shares, or utility ends. */
function measured({ fitted, point, question }: Omit<ChangeCase, "measures">): Measures | undefined {
  try {
    const measures = measuresAt({ fitted, derivatives: true }, point, question);
    return measures.absent?.includes("not defined") ? undefined : measures;
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

/** Every number that is reported, by name. */
export function reported(measures: Measures): Record<string, readonly Dual[]> {
  const { bundles, hicks, slutsky, infinitesimal, costOfLiving, tax } = measures;
  const effects = { hicks, slutsky, infinitesimal };
  const one = (of: Dual | undefined) => (of ? [of] : []);
  return {
    ...Object.fromEntries(
      Object.entries(bundles).flatMap(([name, bundle]) => [
        [`shares ${name}`, bundle.shares],
        [`quantities ${name}`, bundle.quantities],
      ]),
    ),
    ...Object.fromEntries(
      Object.entries(effects).flatMap(([name, parts]) =>
        parts === undefined
          ? []
          : [
              [`${name} substitution`, parts.substitution],
              [`${name} income`, parts.income],
            ],
      ),
    ),
    total: measures.total ?? [],
    compensating: one(measures.compensating),
    equivalent: one(measures.equivalent),
    secondOrder: one(measures.secondOrder),
    marshallian: one(measures.marshallian),
    atUtilityBefore: one(costOfLiving.atUtilityBefore),
    laspeyres: one(costOfLiving.laspeyres),
    paasche: one(costOfLiving.paasche),
    revenue: one(tax?.revenue),
    paidByBuyers: one(tax?.paidByBuyers),
    excessBurden: one(tax?.excessBurden),
    marginalCost: one(tax?.marginalCost),
  };
}

export const values = (duals: readonly Dual[]): number[] => duals.map(({ value }) => value);
