import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, test } from "vitest";
import { runElasticities, runSystem } from "../../server/engine/cells/index.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { compensatingVariationWithError, equivalentVariationWithError } from "../../shared/economics/welfare-errors.ts";
import type { ElasticityGroup } from "../../shared/schemas/elasticities.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import { specificationOf, tunaWeeks } from "../support/tuna.ts";

/**
 * Elasticities and welfare on the weekly tuna file against numDeriv over the fits of fixtures/tuna.R (R 4.2.2,
 * systemfit 1.1.28): fixtures/tuna-elasticities.R, its values in tuna-elasticities.json.
 *
 * Bounds, relative to 1 + |value|: twice those of the fits themselves (1e-9 for LA-AIDS; 1e-8 for AIDS and LES, whose
 * reference steps to 1e-9 because its derivatives are numerical).
 */
const reference = JSON.parse(readFileSync(new URL("./fixtures/tuna-elasticities.json", import.meta.url), "utf8"));
const LINEAR = 2e-9;
const NONLINEAR = 2e-8;

function near(actual: readonly number[], expected: readonly number[], bound: number): void {
  expect(actual).toHaveLength(expected.length);
  actual.forEach((value, at) => {
    expect(Math.abs(value - expected[at]) / (1 + Math.abs(expected[at])), `entry ${at}`).toBeLessThan(bound);
  });
}

interface Expected {
  readonly expenditure: number[];
  readonly expenditureErrors?: number[];
  readonly uncompensated: number[][];
  readonly uncompensatedErrors?: number[][];
  readonly compensated: number[][];
  readonly compensatedErrors?: number[][];
}

function agrees(group: ElasticityGroup, expected: Expected, bound: number): void {
  near(group.expenditure.values, expected.expenditure, bound);
  near(group.uncompensated.values.flat(), expected.uncompensated.flat(), bound);
  near(group.compensated.values.flat(), expected.compensated.flat(), bound);
  if (expected.expenditureErrors === undefined) return;
  near(group.expenditure.errors, expected.expenditureErrors, bound);
  near(group.uncompensated.errors.flat(), expected.uncompensatedErrors!.flat(), bound);
  near(group.compensated.errors.flat(), expected.compensatedErrors!.flat(), bound);
}

let data: PreparedData;
const fitted: Record<string, SystemFinding> = {};

beforeAll(async () => {
  data = await tunaWeeks();
  const estimate = (name: string, keys: string) => {
    fitted[name] = runSystem(specificationOf("system", `data: weeks\n${keys}\n`), data);
  };
  estimate("aids", "form: aids\nimpose: [homogeneity, symmetry]");
  estimate("les", "form: les");
  estimate(
    "stone",
    "form: la-aids\nindex: stone\nimpose: [homogeneity, symmetry]\nestimator: iterated seemingly unrelated",
  );
});

const groupOf = (name: string, keys: string) =>
  runElasticities(specificationOf("elasticities", `system: s\n${keys}\n`), fitted[name], data).groups[0];

describe("elasticities of AIDS", () => {
  test("at the sample mean", () => agrees(groupOf("aids", "at: mean"), reference.aids.mean, NONLINEAR));

  test("over the weeks, each weighted by what it spends on the brand", () =>
    agrees(groupOf("aids", "over: rows"), reference.aids.rows, NONLINEAR));
});

describe("elasticities of LA-AIDS with Stone's index at the sample mean", () => {
  test("its weights held", () => agrees(groupOf("stone", "at: mean"), reference.stone.held, LINEAR));

  test("its weights moving: derivatives of the implicit shares", () =>
    agrees(groupOf("stone", "at: mean\nindex: exact"), reference.stone.exact, LINEAR));
});

describe("welfare of the first brand dearer by a tenth at the sample mean", () => {
  test.each(["aids", "les"])("CV and EV of %s with their standard errors", (name) => {
    const { fitted: system, points } = fitted[name];
    const dearer = points.mean.prices.map((price, i) => (i === 0 ? price * 1.1 : price));
    const found = [compensatingVariationWithError, equivalentVariationWithError].map((of) =>
      of(system, points.mean, dearer),
    );
    const { value, error } = reference[name].welfare;
    near(
      found.map((one) => one.value),
      value,
      NONLINEAR,
    );
    near(
      found.map((one) => one.standardError),
      error,
      NONLINEAR,
    );
  });
});
