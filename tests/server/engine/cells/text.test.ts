import { describe, expect, it } from "vitest";
import { runText } from "../../../../server/engine/cells/text.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { textFinding } from "../../../../shared/schemas/text.ts";
import { sampleData, sampleSystem } from "../../../support/sample-findings.ts";

const cells = new Map([
  ["base", { finding: sampleSystem(), fingerprint: "b".repeat(64) }],
  ["survey", { finding: sampleData() }],
]);
const run = (text: string) => runText({ kind: "text", text }, cells);

describe("a text on the command line", () => {
  it("has its numbers in their places, each with the fingerprint it is from", () => {
    const found = textFinding.parse(run("η is {base: eta, meat & fish, alone} over {survey: goods} goods."));
    expect(found.resolved).toBe("η is 1.318 over 6 goods.");
    expect(found.quotations.map(({ fingerprint }) => fingerprint)).toEqual(["b".repeat(64), undefined]);
  });

  it("is refused with every number that no finding holds", () => {
    try {
      run("{base: lambda, grains} and {base: exogeneity p}");
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(Refusal);
      expect((error as Refusal).problems.map(({ sentence }) => sentence)).toEqual([
        "{base: lambda, grains} has no number. The form aids has no λ.",
        "{base: exogeneity p} has no number. Total expenditure has no instruments.",
      ]);
    }
  });
});
