import { describe, expect, test } from "vitest";
import { elasticitiesAt, elasticityValues } from "../../shared/economics/elasticities.ts";
import { responsesAt, responsesValuesAt } from "../../shared/economics/responses.ts";
import { unconditionalValues } from "../../shared/economics/two-stage.ts";
import { groupAsGood, type Stage, unconditionalElasticities } from "../../shared/economics/two-stage-errors.ts";
import { unconditionalIdentities } from "../../shared/economics/two-stage-identities.ts";
import { standardError, zeros } from "../../shared/numerics/matrix.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { UNCONDITIONAL_FORMULAS } from "../../shared/schemas/two-stage.ts";
import type { Point } from "../../shared/systems/demand-system.ts";
import type { FittedCoefficients } from "../../shared/systems/index.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES, type SystemName } from "../../shared/systems/names.ts";
import { exactly, fittedFrom } from "../support/fitted.ts";
import { derivative, gap, moved } from "./derivatives.ts";
import { IMPOSED, randomCase, stepOf } from "./random-systems.ts";

const ROUNDING = 1e-11;
const [, , BOTH] = IMPOSED;

/** Of a nest: what its goods' own system says, the broader one of groups, and the system of every good at once. */
interface Tree {
  readonly own: FittedCoefficients;
  readonly ownPoint: Point;
  readonly broader: FittedCoefficients;
  readonly broaderPoint: Point;
  readonly oneStage: FittedCoefficients;
  readonly point: Point;
}

const les = (committed: readonly number[], marginal: readonly number[]) =>
  exactly(
    "les",
    marginal.map((_, i) => `good ${i + 1}`),
    [...committed, ...marginal],
  );

/**
 * Stone and Geary's utility of `goods` goods, the first `inside` a group. Given what is spent on it the group's goods
 * follow a linear expenditure system of marginal shares β_i / B, B their sum, and so do the groups and other goods among
 * each other: at a group price P of 1, by which all its prices move together, the group commits Σ c_j p_j and takes B.
 */
function tree(seed: number, goods = 5, inside = 3): Tree {
  const random = seededRandom(seed);
  const raw = Array.from({ length: goods }, () => 0.3 + random.uniform());
  const marginal = raw.map((one) => one / raw.reduce((sum, each) => sum + each, 0));
  const committed = Array.from({ length: goods }, () => 0.25 * random.uniform());
  const prices = Array.from({ length: goods }, () => Math.exp(0.4 * random.normal()));
  const total = 2.5 + committed.reduce((sum, one, j) => sum + one * prices[j], 0);
  const sum = (of: readonly number[]) => of.reduce((all, one) => all + one, 0);
  const [mine, rest] = [(of: readonly number[]) => of.slice(0, inside), (of: readonly number[]) => of.slice(inside)];
  const taken = sum(mine(marginal));
  const needs = sum(mine(committed).map((one, j) => one * prices[j]));
  const spare = total - committed.reduce((all, one, j) => all + one * prices[j], 0);
  return {
    own: les(
      mine(committed),
      mine(marginal).map((one) => one / taken),
    ),
    ownPoint: { prices: mine(prices), total: needs + taken * spare, demographics: [] },
    broader: les([needs, ...rest(committed)], [taken, ...rest(marginal)]),
    broaderPoint: { prices: [1, ...rest(prices)], total, demographics: [] },
    oneStage: les(committed, marginal),
    point: { prices, total, demographics: [] },
  };
}

const unconditionalOf = (
  { own, ownPoint, broader, broaderPoint }: Tree,
  formula: (typeof UNCONDITIONAL_FORMULAS)[number],
) => {
  const within = elasticityValues(responsesValuesAt(own, ownPoint));
  const group = groupAsGood(responsesValuesAt(broader, broaderPoint), 0);
  return { within, group, values: unconditionalValues(within, group, formula) };
};

describe("a linear expenditure system in another", () => {
  test.each([1, 2, 3, 4, 5, 6])("is by Carpentier and Guyomard what one system of all goods says, tree %i", (seed) => {
    const nest = tree(seed);
    const truth = elasticitiesAt(nest.oneStage, nest.point);
    const { values } = unconditionalOf(nest, "carpentier guyomard");
    expect(gap(values.shares, truth.shares.slice(0, 3))).toBeLessThan(ROUNDING);
    expect(gap(values.expenditure, truth.expenditure.slice(0, 3))).toBeLessThan(ROUNDING);
    for (const which of ["uncompensated", "compensated"] as const) {
      const block = truth[which].slice(0, 3).map((row) => row.slice(0, 3));
      expect(gap(values[which].flat(), block.flat())).toBeLessThan(ROUNDING);
      expect(
        gap(
          values.others[which].flat(),
          truth[which].slice(0, 3).flatMap((row) => row.slice(3)),
        ),
      ).toBeLessThan(ROUNDING);
    }
  });

  test("is not by Edgerton's formula, which breaks symmetry where goods of the group are luxuries and necessities", () => {
    const nest = tree(1);
    const truth = elasticitiesAt(nest.oneStage, nest.point)
      .compensated.slice(0, 3)
      .flatMap((row) => row.slice(0, 3));
    const { within, group, values } = unconditionalOf(nest, "edgerton");
    expect(gap(values.compensated.flat(), truth)).toBeGreaterThan(0.01);
    expect(unconditionalIdentities(within, group, values, "edgerton").symmetry).toBeGreaterThan(0.001);
  });

  /** The linear expenditure system of published-checks.md, A2 and 9.5 (computed, not published), goods 1 and 2 grouped. */
  test("agrees with numbers computed elsewhere to twelve digits", () => {
    const [c, b, p] = [
      [10, 4, 2],
      [0.3, 0.5, 0.2],
      [1, 2, 1.5],
    ];
    const own = elasticityValues(
      responsesValuesAt(les([10, 4], [0.375, 0.625]), { prices: [1, 2], total: 18.7 + 22.5, demographics: [] }),
    );
    const group = groupAsGood(
      responsesValuesAt(les([18, c[2]], [0.8, b[2]]), { prices: [1, p[2]], total: 50, demographics: [] }),
      0,
    );
    expect(group.compensated).toBeCloseTo(-0.112621359223, 11);
    expect(group.expenditure).toBeCloseTo(0.970873786408, 11);
    expect(gap(own.expenditure, [0.826203208556, 1.14444444444])).toBeLessThan(1e-10);
    const { expenditure, uncompensated, others } = unconditionalValues(own, group, "carpentier guyomard");
    expect(gap(expenditure, [0.802139037433, 1.11111111111])).toBeLessThan(1e-10);
    expect(
      gap(uncompensated.flat(), [-0.625668449198, -0.128342245989, -0.222222222222, -0.822222222222]),
    ).toBeLessThan(1e-10);
    expect(gap(others.uncompensated.flat(), [-0.048128342246, -0.0666666666667])).toBeLessThan(1e-10);
  });
});

/** Nested CES of published-checks.md, A6 (computed there to forty digits, not published). */
test("of nested CES both formulas are exact, as every good of a homothetic group has an elasticity of one within it", () => {
  const [sigma, top, share] = [1.5, 0.9, 0.54885835];
  const w = [0.55051026, 0.44948974];
  const compensated = w.map((_, i) => w.map((other, j) => sigma * (other - (i === j ? 1 : 0))));
  const own = {
    shares: w,
    expenditure: [1, 1],
    compensated,
    uncompensated: compensated.map((row) => row.map((one, j) => one - w[j])),
  };
  const group = {
    share,
    expenditure: 1,
    compensated: -top * (1 - share),
    others: { compensated: [top * (1 - share)], uncompensated: [(top - 1) * (1 - share)] },
  };
  const printed = [-1.199909061, 0.245023226, 0.3000909395, -1.254976774];
  for (const formula of UNCONDITIONAL_FORMULAS) {
    const values = unconditionalValues(own, group, formula);
    // Shares are given to eight digits.
    expect(gap(values.uncompensated.flat(), printed)).toBeLessThan(3e-8);
    expect(values.others.uncompensated[0][0]).toBeCloseTo(-0.01502900369 - 0.0300851618, 7);
    expect(unconditionalIdentities(own, group, values, formula).symmetry).toBeLessThan(ROUNDING);
  }
});

/** A system at random coefficients and a random point at which no share is near nothing. */
function randomStage(random: ReturnType<typeof seededRandom>, name: SystemName) {
  for (;;) {
    const { size, free, theta, point } = randomCase(random, name, BOTH);
    const fitted = fittedFrom(random, name, size, BOTH, free, theta);
    const { shares } = responsesValuesAt(fitted, point);
    if (shares.length > 2 && shares.every((share) => share > 0.03 && share < 0.9)) return { fitted, point, size };
  }
}

const stageOf = ({ fitted, point }: ReturnType<typeof randomStage>): Stage => ({
  ...responsesAt(fitted, point),
  covariance: fitted.covariance,
});

test("uncompensated ones are the formulas as printed, from memory of the works", () => {
  const nest = tree(2);
  const { within, group, values } = unconditionalOf(nest, "carpentier guyomard");
  const edgerton = unconditionalOf(nest, "edgerton").values.uncompensated;
  const [w, E, e] = [within.shares, within.expenditure, within.uncompensated];
  const own = group.compensated - group.share * group.expenditure;
  for (const [i, row] of e.entries()) {
    for (const [j, conditional] of row.entries()) {
      const first = w[j] * (1 / E[j] + own) * E[i] * E[j];
      const second = w[j] * group.share * group.expenditure * E[i] * (E[j] - 1);
      expect(values.uncompensated[i][j]).toBeCloseTo(conditional + first + second, 12);
      expect(edgerton[i][j]).toBeCloseTo(conditional + E[i] * w[j] * (1 + own), 12);
    }
  }
});

describe.each(SYSTEM_NAMES)("%s in another system", (name) => {
  const random = seededRandom(41);
  const pairs = Array.from({ length: 4 }, () => ({
    own: randomStage(random, name),
    broader: randomStage(random, SYSTEM_NAMES[random.integer(SYSTEM_NAMES.length)]),
  }));

  test.each(UNCONDITIONAL_FORMULAS)("Engel, Cournot, a common change of prices and homogeneity hold, %s", (formula) => {
    for (const { own, broader } of pairs) {
      const within = elasticityValues(responsesValuesAt(own.fitted, own.point));
      const group = groupAsGood(responsesValuesAt(broader.fitted, broader.point), 1);
      const { symmetry, ...laws } = unconditionalIdentities(
        within,
        group,
        unconditionalValues(within, group, formula),
        formula,
      );
      for (const miss of Object.values(laws)) expect(miss).toBeLessThan(5e-11);
      if (formula === "carpentier guyomard") expect(symmetry).toBeLessThan(5e-11);
    }
  });

  test.each(UNCONDITIONAL_FORMULAS)(
    "errors are those of numerical derivatives in both systems' coefficients, %s",
    (formula) => {
      const { own, broader } = pairs[0];
      const found = unconditionalElasticities(stageOf(own), stageOf(broader), 1, { formula, errors: "independent" });
      const flat = (mine: FittedCoefficients, theirs: FittedCoefficients) => {
        const within = elasticityValues(responsesValuesAt(mine, own.point));
        const group = groupAsGood(responsesValuesAt(theirs, broader.point), 1);
        const { expenditure, uncompensated, compensated, others } = unconditionalValues(within, group, formula);
        return [expenditure, uncompensated, compensated, others.uncompensated, others.compensated].flat(2);
      };
      const inCoefficients = ({ fitted, size }: typeof own, evaluate: (theta: number[]) => number[]) => {
        const layout = SYSTEMS[fitted.form].layout(size);
        // Products of three elasticities bend more than elasticities: steps a sixteenth of theirs.
        const columns = fitted.theta.map((_, k) =>
          derivative((h) => evaluate(moved(fitted.theta, k, h)), stepOf(layout[k]) / 16),
        );
        return columns[0].map((_, entry) => columns.map((column) => column[entry]));
      };
      const inOwn = inCoefficients(own, (theta) => flat({ ...own.fitted, theta }, broader.fitted));
      const inBroader = inCoefficients(broader, (theta) => flat(own.fitted, { ...broader.fitted, theta }));
      const parts = inOwn.map((gradient, entry) => [
        standardError(own.fitted.covariance, gradient),
        standardError(broader.fitted.covariance, inBroader[entry]),
      ]);
      const errors = ({ expenditureErrors, uncompensatedErrors, compensatedErrors, othersErrors }: typeof found) =>
        [
          expenditureErrors,
          uncompensatedErrors,
          compensatedErrors,
          othersErrors.uncompensated,
          othersErrors.compensated,
        ].flat(2);
      const scale = Math.max(1, ...parts.flat());
      expect(
        gap(
          errors(found),
          parts.map(([sigma, tau]) => Math.hypot(sigma, tau)),
        ) / scale,
      ).toBeLessThan(1e-7);
      const bound = unconditionalElasticities(stageOf(own), stageOf(broader), 1, { formula, errors: "bound" });
      expect(
        gap(
          errors(bound),
          parts.map(([sigma, tau]) => sigma + tau),
        ) / scale,
      ).toBeLessThan(1e-7);
    },
  );
});

test("with coefficients of the broader system known, errors are those of the group's own system, and the other way round", () => {
  const random = seededRandom(7);
  const [own, broader] = [stageOf(randomStage(random, "aids")), stageOf(randomStage(random, "les"))];
  const known = (stage: Stage): Stage => ({
    ...stage,
    covariance: zeros(stage.covariance.length, stage.covariance.length),
  });
  const of = (a: Stage, b: Stage) =>
    unconditionalElasticities(a, b, 0, { formula: "carpentier guyomard", errors: "independent" }).expenditureErrors;
  const both = of(own, broader);
  const squares = of(known(own), broader).map((tau, i) => Math.hypot(tau, of(own, known(broader))[i]));
  expect(gap(both, squares)).toBeLessThan(1e-14);
  expect(Math.max(...of(known(own), known(broader)))).toBe(0);
});
