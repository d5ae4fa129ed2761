import { spawnSync } from "node:child_process";
import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, describe, expect, it } from "vitest";
import type { ReplicatedCell, Replication } from "../../../server/bin/replication.ts";
import { isReplicated, replicationInWords } from "../../../server/bin/replication-words.ts";
import { compareFindings, digitsOfAgreement } from "../../../server/bundle/compare-findings.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const SCRIPT = fileURLToPath(new URL("../../../server/bin/replicate.mjs", import.meta.url));
const folder = temporaryFolder();
afterAll(() => folder.remove());

function replicate(...words: string[]) {
  const env = { ...process.env, INIT_CWD: folder.path };
  return spawnSync(process.execPath, [SCRIPT, ...words], { encoding: "utf8", env });
}

describe("the command", () => {
  it("called without a bundle, or with what is none, says so and ends with 2", () => {
    const none = replicate();
    expect([none.status, none.stdout]).toEqual([2, ""]);
    expect(none.stderr).toContain("One bundle is needed, and none is named.");
    writeFileSync(join(folder.path, "words.zip"), "these are words");
    const words = replicate("words.zip");
    expect([words.status, words.stdout]).toEqual([2, ""]);
    expect(words.stderr).toContain("The bundle is cut short");
    expect(replicate("nothing.zip").stderr).toMatch(/nothing\.zip cannot be read \(ENOENT\)/);
  });
});

describe("two numbers", () => {
  it.each([
    [1, 1, Number.POSITIVE_INFINITY],
    [1e-17, -3e-15, Number.POSITIVE_INFINITY],
    [1, 1 + 1e-9, 9],
    [2_000_000, 2_000_001, 6.3],
    [0.001, -0.001, 0],
    [0.5, 0.25, 0.3],
  ])("%d and %d agree to %d digits", (one, other, digits) => {
    expect(digitsOfAgreement(one, other)).toBeCloseTo(digits, 1);
    expect(digitsOfAgreement(other, one)).toBe(digitsOfAgreement(one, other));
  });
});

describe("a finding beside the same found anew", () => {
  const bundled = { kind: "system", numbers: [1, 2, 3], convergence: { iterations: 4 }, note: "a", only: null };

  it("is compared in all that the bundle has, but for the way the iteration went", () => {
    const found = { ...bundled, numbers: [1, 2 + 1e-10, 3], convergence: { iterations: 9 }, brokenRows: [1] };
    const { numbers, same, worst, apartCount, unlikeCount } = compareFindings(bundled, found);
    expect([numbers, same, apartCount, unlikeCount]).toEqual([3, 2, 0, 0]);
    expect(worst).toMatchObject({ at: "numbers.1", bundled: 2 });
  });

  it("tells numbers that differ, lists of other lengths and words that are others or missing", () => {
    const { apart, unlike } = compareFindings(bundled, { kind: "system", numbers: [1, 2], note: "b" });
    expect(apart).toEqual([]);
    expect(unlike).toEqual([
      "numbers has 3 members in the bundle and 2 found anew",
      'note is "a" in the bundle and "b" found anew',
      "only is null in the bundle and absent found anew",
    ]);
    expect(compareFindings({ a: [1, 5] }, { a: [1.1, 4] })).toMatchObject({
      apartCount: 2,
      apart: [{ at: "a.1" }, { at: "a.0" }],
    });
    expect(compareFindings({ a: 1 }, { a: "1" }).unlike).toEqual(['a is 1 in the bundle and "1" found anew']);
  });
});

describe("a replication in words", () => {
  const compared = { numbers: 3, same: 3, apart: [], apartCount: 0, unlike: [], unlikeCount: 0 };
  const replication = (cell: Partial<ReplicatedCell>, sha256 = "a"): Replication => ({
    bundle: { study: "Tuna", program: "Tangency 1", madeAt: "2031-01-02T00:00:00.000Z", leftOut: [] },
    data: [{ file: "data/tuna.csv", standing: "given", sha256, expected: "a" }],
    cells: [{ name: "base\u001b[31m", kind: "system", from: "data", compared, ...cell }],
    complaints: [],
  });

  it("says what agrees, and never what a terminal would obey", () => {
    const words = replicationInWords(replication({}), "Tangency 2");
    expect(words).toContain("Tuna: made 2031-01-02 by Tangency 1, replicated by Tangency 2\n");
    expect(words).toMatch(/Everything agrees\.\n$/);
    expect(words).not.toContain("\u001b");
    expect(isReplicated(replication({}))).toBe(true);
  });

  it.each<[string, Partial<ReplicatedCell>, string?]>([
    ["1 of 1 cells differs; the rest agrees.", { compared: { ...compared, apartCount: 1 } }],
    ["1 of 1 cells differs; the rest agrees.", { compared: { ...compared, unlikeCount: 1 } }],
    [
      "1 could not be checked; the rest agrees.",
      { from: undefined, compared: undefined, because: "Its data are not here." },
    ],
    ["What was compared agrees, and not from the very files the findings were made from.", {}, "b"],
  ])("%s", (outcome, cell, sha256) => {
    expect(replicationInWords(replication(cell, sha256), "now").trimEnd().split("\n").at(-1)).toBe(outcome);
    expect(isReplicated(replication(cell, sha256))).toBe(false);
  });
});
