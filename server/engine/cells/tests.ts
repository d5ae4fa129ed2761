import type { SystemFinding, SystemSpecification } from "../../../shared/schemas/system.ts";
import {
  HYPOTHESIS_NAMES,
  type HypothesisName,
  type TestsFinding,
  type TestsSpecification,
  testsFinding,
} from "../../../shared/schemas/tests.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { withTimeTerms } from "../columns/seasonal-terms.ts";
import { momentsRequest } from "../estimation/index.ts";
import { type Purchases, revealedPreference } from "../inference/revealed-preference.ts";
import { systemTests } from "../inference/system-tests.ts";
import { Refusal, unlessRefused } from "../refusal.ts";
import { QUIET, type RunControl } from "../run.ts";
import { momentsOf } from "./system.ts";

/** The system a tests cell names: what was asked, and what was found. */
export interface TestedSystem {
  readonly specification: SystemSpecification;
  readonly finding: SystemFinding;
}

/**
 * A tests cell: hypotheses of a system from nested fits, and revealed preference of the rows used. What cannot be
 * tested says why in the finding; a cell in which nothing could be done is a refusal.
 * Errors: `Refusal`, `Cancelled`.
 */
export function runTests(
  specification: TestsSpecification,
  data: PreparedData,
  system: TestedSystem | undefined,
  control: RunControl = QUIET,
): TestsFinding {
  const names = asked(specification);
  const revealed = names.includes("revealed preference") ? revealedOf(data, names.length === 1, control) : undefined;
  const tests = system ? testsOfSystem(names, system, data, control) : { tests: [], rows: data.rows };
  return testsFinding.parse({
    kind: "tests",
    dataFingerprint: data.fingerprint,
    level: specification.level,
    weighted: data.weights !== undefined,
    ...tests,
    ...(revealed && { revealed }),
  });
}

function testsOfSystem(
  names: readonly HypothesisName[],
  system: TestedSystem,
  data: PreparedData,
  control: RunControl,
) {
  const specification = withTimeTerms(system.specification, data);
  const moments = momentsOf(data, momentsRequest(specification, data), control);
  return systemTests(names, specification, system.finding.fitted, data, moments, control);
}

/** Of data revealed preference; of a system everything else, unless it is named. */
function asked({ system, of }: TestsSpecification): readonly HypothesisName[] {
  if (of) return of;
  if (system === undefined) return ["revealed preference"];
  return HYPOTHESIS_NAMES.filter((name) => name !== "revealed preference");
}

function revealedOf(data: PreparedData, alone: boolean, control: RunControl): TestsFinding["revealed"] {
  const found = unlessRefused(() => revealedPreference(purchasesOf(data), control));
  if (!("refused" in found)) {
    return { ...found, periods: isSequence(data), weighted: data.weights !== undefined };
  }
  if (alone) throw new Refusal([{ sentence: found.refused, key: ["of"] }]);
  return { absent: found.refused };
}

/** Whether every row has a time of its own. */
function isSequence({ time, rows }: PreparedData): boolean {
  return time !== undefined && new Set(time).size === rows;
}

/** Prices and quantities of the rows used, q = w x/p, in units of estimation: no cost ratio depends on them. */
function purchasesOf({ logPrices, logTotal, shares, rowNumbers }: PreparedData): Purchases {
  const prices = logPrices.map((column) => column.map(Math.exp));
  const quantities = shares.map((share, i) =>
    share.map((value, t) => (value === 0 ? 0 : value * Math.exp(logTotal[t] - logPrices[i][t]))),
  );
  return { prices, quantities, rowNumbers };
}
