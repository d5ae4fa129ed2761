import { beforeAll, describe, expect, it } from "vitest";
import { runSlutsky, runSystem } from "../../../../server/engine/cells/index.ts";
import type { PreparedData } from "../../../../server/engine/columns/prepared-data.ts";
import { sealedContentOf } from "../../../../server/services/sealed-content.ts";
import { drawnIntervals } from "../../../../shared/economics/drawn-intervals.ts";
import { overDraws, percentileInterval } from "../../../../shared/economics/percentile.ts";
import { matrixAt, type SlutskyAtPoint } from "../../../../shared/economics/slutsky.ts";
import { sealedContent } from "../../../../shared/schemas/referee-copy.ts";
import { type SlutskyFinding, slutskyFinding } from "../../../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import { slutskyVerdicts } from "../../../../shared/tables/verdicts.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

const SOURCE =
  "data: weeks\nform: la-aids\nimpose: [homogeneity, symmetry]\nstandard errors: {bootstrap: rows, replicates: 100, seed: 3}";

let data: PreparedData;
let system: SystemFinding;
let finding: SlutskyFinding;
let drawn: SlutskyAtPoint[];
beforeAll(async () => {
  data = await tunaWeeks();
  system = runSystem(specificationOf("system", SOURCE), data);
  finding = runSlutsky(specificationOf("slutsky", "system: base\nat: mean"), system, data);
  const { priceScale, totalScale } = data;
  // By the whole matrix of each draw, its errors and all: another way than the engine's.
  drawn = overDraws(system.fitted, system.bootstrap?.draws ?? [], (fitted) =>
    matrixAt(fitted, system.points.mean, { priceScale, totalScale, pointName: "mean" }),
  );
});

const over = (value: (at: SlutskyAtPoint) => number) => percentileInterval(drawn.map(value));

describe("a matrix of a bootstrapped system", () => {
  it("has the percentile interval of every eigenvalue beside its standard error", () => {
    const { eigenvalues } = finding.at;
    expect(eigenvalues).toHaveLength(6);
    eigenvalues.forEach(({ interval }, r) => {
      const [low, high] = over((at) => at.eigenvalues[r].value);
      expect(interval?.[0]).toBeCloseTo(low, 12);
      expect(interval?.[1]).toBeCloseTo(high, 12);
    });
    expect(finding.at.checks.negativity.interval).toEqual(eigenvalues[0].interval);
    expect(slutskyFinding.parse(JSON.parse(JSON.stringify(finding)))).toEqual(finding);
  });

  it("and of every entry, in both forms, and of the elasticities", () => {
    const { intervals } = finding.at;
    expect(intervals?.draws).toBe(100);
    for (const [i, j] of [
      [0, 0],
      [2, 5],
      [6, 1],
    ]) {
      for (const form of ["share", "quantity", "compensated"] as const) {
        const [low, high] = over((at) => at[form][i][j]);
        expect(intervals![form].low[i][j] / low).toBeCloseTo(1, 10);
        expect(intervals![form].high[i][j] / high).toBeCloseTo(1, 10);
      }
    }
  });

  it("is said where the largest eigenvalue is judged", () => {
    const checks = { ...finding.at.checks, sample: undefined };
    const verdict = slutskyVerdicts({ at: { ...finding.at, checks }, tests: [] }).find(
      ({ law }) => law === "Negativity",
    );
    expect(verdict?.note).toMatch(/^largest \S+ \(\S+\), 95.% interval \S+ to \S+$/);
  });

  it("is sealed as numbers, without the draws", () => {
    const cell = { name: "x", kind: "data", source: "upload: weeks.csv\n" } as never;
    const about = { program: "p", title: "t", authors: undefined, note: "", sealedAt: new Date(0) };
    const sealed = sealedContent.parse(
      sealedContentOf(about, {
        matrix: { cell, finding },
        system: { cell, finding: system },
        data: { cell, finding: data.finding },
      }),
    );
    expect(sealed.slutsky.at.intervals).toEqual(finding.at.intervals);
    expect(sealed.slutsky.at.eigenvalues).toEqual(finding.at.eigenvalues);
    expect(JSON.stringify(sealed)).not.toMatch(/"draws":\[/);
  });
});

describe("draws", () => {
  it("where the system is not defined are left out, and few draws have no interval", () => {
    const { fitted, bootstrap, points } = system;
    const draws = bootstrap?.draws ?? [];
    const nowhere = fitted.theta.map(() => Number.NaN);
    const some = drawnIntervals(fitted, [...draws, nowhere], points.mean);
    expect(some).toEqual(drawnIntervals(fitted, draws, points.mean));
    expect(drawnIntervals(fitted, draws.slice(0, 39), points.mean)).toBeUndefined();
  });

  it("none, no intervals", () => {
    const plain = runSystem(specificationOf("system", "data: weeks\nform: la-aids\nimpose: [homogeneity]"), data);
    const matrix = runSlutsky(specificationOf("slutsky", "system: base"), plain, data);
    expect(matrix.at.intervals).toBeUndefined();
    expect(matrix.at.eigenvalues[0].interval).toBeUndefined();
  });
});
