import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, it } from "vitest";
import { demoStudy } from "../../server/demo/cells.ts";
import { runData } from "../../server/engine/cells/index.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import { readCsv } from "../../server/engine/columns/read-csv.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import { bytesOf } from "../server/engine/columns/bytes.ts";
import { estimated } from "../support/estimating.ts";
import { specificationOf, tunaWeeks } from "../support/tuna.ts";

/**
 * Robust standard errors on the tuna weeks and on the demo survey (weights, demographics, villages) against R 4.2.2:
 * scores written out with numDeriv's derivatives for maximum likelihood, the package sandwich 3.0-2 on lm for least
 * squares. fixtures/sandwich.R made fixtures/sandwich.json. Bound: 1e-8 relative to each error.
 */
const reference = JSON.parse(readFileSync(new URL("./fixtures/sandwich.json", import.meta.url), "utf8"));
const CLOSE = 1e-8;

const KINDS = ["heteroskedastic", "clustered"] as const;
const BOTH = ["homogeneity", "symmetry"];

interface Sample {
  readonly data: PreparedData;
  readonly demographics: readonly string[];
  readonly cluster: string;
}

const samples = {} as Record<"tuna" | "survey", Sample>;

beforeAll(async () => {
  const tuna = await tunaWeeks();
  const quarter = tuna.time!.map((week) => Math.ceil(week / 13));
  const numeric = new Map([...tuna.numeric, ["quarter", quarter]]);
  samples.tuna = { data: { ...tuna, numeric }, demographics: [], cluster: "quarter" };
  const { upload, cells } = demoStudy();
  const { table } = await readCsv(bytesOf(upload.csv, 65_536), upload.name);
  const survey = cells.find(({ name }) => name === "survey")!;
  const data = runData(specificationOf("data", survey.source), table);
  samples.survey = { data, demographics: ["log_size", "urban"], cluster: "village" };
});

function errorsOf(name: "tuna" | "survey", kind: (typeof KINDS)[number], specification: object): SystemFinding {
  const { data, demographics, cluster } = samples[name];
  const errors = kind === "clustered" ? { cluster } : kind;
  return estimated(data, { demographics, ...specification, "standard errors": errors }) as SystemFinding;
}

/** Standard errors of a block by good, those of the first m goods and, of γ, their first m prices. */
function block({ coefficients, fitted }: SystemFinding, name: string): number[][] {
  const goods = fitted.goods.slice(0, -1);
  return goods.map((good) =>
    coefficients
      .filter((one) => one.block === name && one.good === good && one.column !== fitted.goods.at(-1))
      .map(({ standardError }) => standardError),
  );
}

function farthest(actual: readonly (readonly number[])[], expected: readonly (readonly number[])[]): number {
  expect(actual.map(({ length }) => length)).toEqual(expected.map(({ length }) => length));
  const apart = actual.flatMap((row, i) => row.map((value, j) => Math.abs(value / expected[i][j] - 1)));
  return Math.max(0, ...apart);
}

const column = (values: readonly number[]) => values.map((value) => [value]);

describe.each(["tuna", "survey"] as const)("robust errors on the %s rows", (name) => {
  it.each(["la-aids", "aids"] as const)("of maximum likelihood: %s", (form) => {
    const expected = reference[name][form === "aids" ? "aids" : "laAids"];
    for (const kind of KINDS) {
      const finding = errorsOf(name, kind, { form, impose: BOTH });
      expect(finding.standardErrors).toBe(kind);
      const errors = expected[kind];
      expect(farthest(block(finding, "alpha"), column(errors.alpha))).toBeLessThan(CLOSE);
      expect(farthest(block(finding, "beta"), column(errors.beta))).toBeLessThan(CLOSE);
      expect(farthest(block(finding, "gamma"), errors.gamma)).toBeLessThan(CLOSE);
      if (name === "survey") {
        expect(farthest(block(finding, "demographic"), errors.demographic)).toBeLessThan(CLOSE);
        expect(finding.effectiveRows! / reference.survey.effectiveRows).toBeCloseTo(1, 12);
      }
      if (kind === "clustered") expect(finding.clusters?.count).toBe(expected.clusters);
    }
  });

  it("of least squares, equation by equation", () => {
    for (const kind of KINDS) {
      const finding = errorsOf(name, kind, { form: "la-aids", impose: [], estimator: "least squares" });
      expect(finding.rows).toBe(reference[name].rows);
      const found = finding.fitted.goods.map((good) =>
        ["alpha", "demographic", "gamma", "beta"].flatMap((part) =>
          finding.coefficients
            .filter((one) => one.block === part && one.good === good)
            .map(({ standardError }) => standardError),
        ),
      );
      expect(farthest(found, reference[name].leastSquares[kind])).toBeLessThan(CLOSE);
    }
  });
});
