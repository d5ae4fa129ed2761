import { describe, expect, it } from "vitest";
import { progressInWords } from "../../../src/features/estimation/progress-words.ts";

describe("how far an estimation is", () => {
  it("names iterations of a fit, also while one of them reads the rows", () => {
    const now = { step: "iterating", iteration: 7, gradient: 0.02, fraction: 0.4, elapsedMs: 14_000, aboutMs: 20_000 };
    expect(progressInWords(now)).toBe("iteration 7, gradient 0.020; 0:14 of about 0:20");
  });

  it("counts replicates against how many there will be", () => {
    const now = { step: "estimating replicates", iteration: 77, fraction: 77 / 500, elapsedMs: 36_000 };
    expect(progressInWords(now)).toBe("estimating replicates, 77 of 500; 0:36");
  });

  it("says how much of a step is done where nothing is counted", () => {
    expect(progressInWords({ step: "forming scores", fraction: 0.256, elapsedMs: 900 })).toBe(
      "forming scores, 25\u2009%; 0:00",
    );
  });
});
