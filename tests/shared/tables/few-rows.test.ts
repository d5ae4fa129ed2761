import { describe, expect, it } from "vitest";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { fewRowsNotes } from "../../../shared/tables/few-rows.ts";

const goods = ["bread", "milk", "meat"];
const told = (rows: number, freeCoefficients: number, named = goods) =>
  fewRowsNotes({ rows, freeCoefficients, fitted: { goods: named } as SystemFinding["fitted"] });

describe("few rows for the coefficients of an equation", () => {
  it("are told below five for each, and not from five on", () => {
    expect(told(20, 8)).toEqual([]);
    expect(told(19, 8)).toEqual([
      "19 rows for 8 free coefficients in 2 equations: fewer than 5 for each coefficient of an equation. Standard errors and tests that rest on many rows may be too favourable; for tests of homogeneity this is known (Laitinen 1978).",
    ]);
  });

  it("are told of one equation, and of one row, as one", () => {
    expect(told(1, 4, ["bread", "milk"])[0]).toMatch(
      /^1 row for 4 free coefficients in 1 equation: .* of the equation/,
    );
  });

  it("count all n equations where goods that are not bought take two steps", () => {
    const zeros = {} as SystemFinding["zeros"];
    const fitted = { goods } as SystemFinding["fitted"];
    expect(fewRowsNotes({ rows: 19, freeCoefficients: 8, fitted })).toHaveLength(1);
    expect(fewRowsNotes({ rows: 19, freeCoefficients: 8, fitted, zeros })).toEqual([]);
  });
});
