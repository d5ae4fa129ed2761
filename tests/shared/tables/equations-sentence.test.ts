import { describe, expect, it } from "vitest";
import { equationsNotes, equationsSentences } from "../../../shared/tables/equations-sentence.ts";

const REGULAR = { withoutSupernumerary: { rows: 0, weightedShare: 0, firstRows: [] }, atBound: [] };

describe("what the equations explain", () => {
  it("is nothing to say of the shares of every row", () => {
    expect(equationsNotes({ rows: 338 })).toEqual([]);
    expect(equationsSentences({ rows: 338 })).toEqual([]);
  });

  it("tells the periods that have none before them", () => {
    const lagged = { explains: "shares" as const, leftOut: 1, because: ["lagged shares" as const], gaps: 0 };
    expect(equationsNotes({ rows: 337, equations: lagged })).toEqual([
      "T is 337 of 338 rows used: the first period has no shares before it.",
    ]);
    const both = {
      ...lagged,
      explains: "changes of shares" as const,
      leftOut: 2,
      because: ["lagged shares" as const, "differences" as const],
    };
    expect(equationsNotes({ rows: 336, equations: both }).at(-1)).toBe(
      "T is 336 of 338 rows used: the first 2 periods in turn have no shares, or no change of shares, before them.",
    );
  });

  it("tells that likelihoods of expenditures and of changes are no likelihoods of shares", () => {
    const expenditures = { explains: "expenditures" as const, leftOut: 0, because: [], gaps: 0 };
    expect(equationsNotes({ rows: 338, equations: expenditures })).toEqual([
      "Errors stand on expenditures: the log-likelihood is one of expenditures and is not comparable with one of shares.",
    ]);
    const rotterdam = {
      explains: "contributions to volume" as const,
      leftOut: 1,
      because: ["differences" as const],
      gaps: 24,
    };
    expect(equationsNotes({ rows: 337, equations: rotterdam })).toEqual([
      "The equations explain each good's part in the change of volume from one period to the next, so their log-likelihood is not comparable with one of shares.",
      "No level of shares is predicted: elasticities stand at observed shares.",
      "T is 337 of 338 rows used: the first period has no change from a period before it.",
      "In 24 of 337 rows the period before is the last one in the data, further back than the others are.",
    ]);
  });
});

describe("where the linear expenditure system is not regular", () => {
  it("counts rows without supernumerary expenditure and names goods at their bounds", () => {
    const expenditure = {
      withoutSupernumerary: { rows: 3, weightedShare: 0.0125, firstRows: [17, 40, 41] },
      atBound: [{ good: "grains", estimate: -0.0213 }],
      frisch: { estimate: -2, standardError: 0.1 },
    };
    expect(equationsSentences({ rows: 338, expenditure })).toEqual([
      "In 3 of 338 rows (1.3 % by weight) committed expenditure takes all of the total, first in row 17: utility is not defined there.",
      "The marginal budget share of grains (−0.0213) is at or beyond its bound of 0 and 1.",
    ]);
  });

  it("says when nothing is left at the point of the checks", () => {
    expect(equationsSentences({ rows: 338, expenditure: REGULAR })).toEqual([
      "At the point of the checks nothing is left beyond committed expenditure.",
    ]);
  });
});
