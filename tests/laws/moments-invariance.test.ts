import { describe, expect, it } from "vitest";
import { prepareData } from "../../server/engine/columns/prepare.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { dataSpecification } from "../../shared/schemas/data.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { type RestrictionName, SYSTEM_NAMES, type SystemName } from "../../shared/systems/names.ts";
import { estimated, largestDifference } from "../support/estimating.ts";
import { simulateShares } from "../support/simulated-shares.ts";

/** What must not matter under maximum likelihood does not, to 1e-9, in every registered system, by either reduction of the rows. */
const SYSTEMS_UNDER: [form: SystemName, impose: RestrictionName[]][] = SYSTEM_NAMES.flatMap((form) =>
  (SYSTEMS[form].heldByForm.length > 0 ? [[]] : [["homogeneity", "symmetry"] as RestrictionName[], []]).map(
    (impose): [SystemName, RestrictionName[]] => [form, impose],
  ),
);
const LEVELS = SYSTEMS_UNDER.filter(([form]) => SYSTEMS[form].kind === "levels");
const BOUND = 1e-9;

/** Rows of the almost ideal system serve every other but the LES, which does not come near them. */
function sample(form: SystemName, impose: readonly RestrictionName[], weighted = false): PreparedData {
  const source = form === "les" || form === "la-aids" ? form : "aids";
  const shape = { goods: 4, rows: 300, noise: 0.03, weighted };
  const { data } = simulateShares({ ...shape, form: source, impose, random: seededRandom(7) });
  return { ...data, time: Float64Array.from({ length: data.rows }, (_, t) => t) };
}

function pickRows(data: PreparedData, order: readonly number[]): PreparedData {
  const pick = (column: Float64Array) => Float64Array.from(order, (row) => column[row]);
  return {
    ...data,
    rows: order.length,
    shares: data.shares.map(pick),
    logPrices: data.logPrices.map(pick),
    logTotal: pick(data.logTotal),
    ...(data.weights && { weights: pick(data.weights) }),
    ...(data.time && { time: pick(data.time) }),
  };
}

type Estimate = ReturnType<typeof estimated>;

const addsUpToConstant = ({ fitted }: Estimate) => SYSTEMS[fitted.form].kind === "levels";

function expectSame(one: Estimate, other: Estimate) {
  expect(largestDifference(one.fitted.theta, other.fitted.theta)).toBeLessThan(BOUND);
  expect(largestDifference(one.fitted.covariance.flat(), other.fitted.covariance.flat())).toBeLessThan(BOUND);
  expect(largestDifference([one.logLikelihood], [other.logLikelihood])).toBeLessThan(BOUND);
  expect(largestDifference(one.residualCovariance.flat(), other.residualCovariance.flat())).toBeLessThan(BOUND);
  expect(largestDifference(one.rSquared, other.rSquared)).toBeLessThan(BOUND);
  // McElroy's R² measures against the responses' own variation, which no good can stand for unless they add up to a
  // constant: contributions to the volume of all goods do not, and then it is that of the equations estimated.
  if (addsUpToConstant(one) || one.dropped === other.dropped) {
    expect(largestDifference([one.systemRSquared], [other.systemRSquared])).toBeLessThan(BOUND);
  }
  const statistics = (estimate: Estimate) => estimate.tests.map((test) => test.statistic);
  expect(largestDifference(statistics(one), statistics(other))).toBeLessThan(BOUND);
}

describe.each(SYSTEMS_UNDER)("%s %j", (form, impose) => {
  it.each(["maximum likelihood", "iterated seemingly unrelated"])("whichever good is dropped (%s)", (estimator) => {
    const data = sample(form, impose, true);
    const last = estimated(data, { form, impose, estimator });
    for (const dropped of data.goods.slice(0, -1)) {
      expectSame(estimated(data, { form, impose, estimator, dropped }), last);
    }
  });

  it.each(["reflected", "summed"] as const)("whatever the order of the rows (%s)", (reduction) => {
    const data = sample(form, impose, true);
    const random = seededRandom(3);
    const order = Array.from({ length: data.rows }, (_, row) => row);
    for (let row = order.length - 1; row > 0; row--) {
      const other = random.integer(row + 1);
      [order[row], order[other]] = [order[other], order[row]];
    }
    expectSame(
      estimated(pickRows(data, order), { form, impose }, reduction),
      estimated(data, { form, impose }, reduction),
    );
  });

  it("by reflections of the rows or from their sums", () => {
    const data = sample(form, impose, true);
    expectSame(estimated(data, { form, impose }, "summed"), estimated(data, { form, impose }, "reflected"));
  });

  it("in whatever units prices and money are uploaded, when normalised", () => {
    const data = sample(form, impose);
    const uploaded = (priceUnits: number[], money: number) => {
      const quantity = (i: number) =>
        Float64Array.from(data.shares[i], (share, t) => share * Math.exp(data.logTotal[t] - data.logPrices[i][t]));
      const columns = data.goods.flatMap((_, i) => [
        {
          name: `p${i}`,
          type: "number" as const,
          values: data.logPrices[i].map((value) => Math.exp(value) * priceUnits[i] * money),
        },
        { name: `q${i}`, type: "number" as const, values: quantity(i).map((value) => value / priceUnits[i]) },
      ]);
      columns.push({ name: "week", type: "number" as const, values: Float64Array.from(data.time!) });
      const goods = Object.fromEntries(data.goods.map((good, i) => [good, { price: `p${i}`, quantity: `q${i}` }]));
      return prepareData(
        dataSpecification.parse({ kind: "data", upload: "rows", goods, time: "week", normalise: "mean" }),
        {
          name: "rows",
          sha256: "0".repeat(64),
          rows: data.rows,
          columns,
        },
      );
    };
    const plain = estimated(uploaded([1, 1, 1, 1], 1), { form, impose, demographics: [] });
    const scaled = estimated(uploaded([1e6, 1e-6, 1, 42], 1e6), { form, impose, demographics: [] });
    expectSame(scaled, plain);
  });
});

// In differences a copy of a row is a period without change.
describe.each(LEVELS)("%s %j", (form, impose) => {
  it("with a weight or with that many copies of the row", () => {
    const { time: _, ...data } = sample(form, impose);
    const copies = Array.from({ length: data.rows }, (_, row) => 1 + (row % 3));
    const total = copies.reduce((sum, count) => sum + count, 0);
    const weighted = {
      ...data,
      weights: Float64Array.from(copies, (count) => (count * data.rows) / total),
    };
    const repeated = pickRows(
      data,
      copies.flatMap((count, row) => new Array<number>(count).fill(row)),
    );
    const byWeight = estimated(weighted, { form, impose });
    const byCopies = estimated(repeated, { form, impose });
    expect(largestDifference(byWeight.fitted.theta, byCopies.fitted.theta)).toBeLessThan(BOUND);
    expect(largestDifference(byWeight.residualCovariance.flat(), byCopies.residualCovariance.flat())).toBeLessThan(
      BOUND,
    );
    const perRow = (estimate: Estimate) => [estimate.logLikelihood / estimate.rows];
    expect(largestDifference(perRow(byWeight), perRow(byCopies))).toBeLessThan(BOUND);
  });
});
