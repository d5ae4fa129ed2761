import { describe, expect, test } from "vitest";
import { curvatureFact, curvatureNotes, curvatureSentences } from "../../../shared/tables/curvature-words.ts";

const bent = {
  pointName: "row 76",
  asked: 6,
  rank: 5,
  binds: true,
  logLikelihoodWithout: 3398.58437,
  loss: 0.84685,
};

describe("what is said of curvature imposed at a point", () => {
  test("where it binds: the loss, the rank, and what the standard errors rest on", () => {
    expect(curvatureSentences({ curvature: bent })).toEqual([
      "Negativity is imposed at row 76, which lowers the log-likelihood by 0.85.",
    ]);
    expect(curvatureFact(bent)).toBe("row 76, rank 5 of the 6 asked for");
    expect(curvatureNotes({ curvature: bent })).toEqual([
      "Standard errors hold for a matrix of rank 5 at row 76. A further column would not raise the fit: the estimate lies at the bound.",
    ]);
  });

  test("where it does not: that nothing changed", () => {
    const idle = { ...bent, pointName: "base point", rank: 6, binds: false, loss: 0 };
    expect(curvatureSentences({ curvature: idle })).toEqual([
      "Negativity imposed at the base point changes nothing: the estimates satisfy it there.",
    ]);
    expect(curvatureFact(idle)).toBe("base point, not binding");
    expect(curvatureNotes({ curvature: idle })).toEqual([]);
  });

  test("where none is imposed: nothing", () => {
    expect([...curvatureSentences({}), ...curvatureNotes({})]).toEqual([]);
  });
});
