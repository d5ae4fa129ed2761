import { expect, it } from "vitest";
import { columnOf } from "../../../../server/engine/estimation/columns.ts";
import { meatOfScores } from "../../../../server/engine/inference/meat.ts";

it("sums outer products of scores, and takes no score that is not a number for nothing", () => {
  const meat = meatOfScores([Float64Array.of(1, 2), Float64Array.of(3, -1)], 2);
  expect([...columnOf(meat, 0), ...columnOf(meat, 1)]).toEqual([10, -1, -1, 5]);
  expect(() => meatOfScores([Float64Array.of(1, Number.NaN)], 2)).toThrow(/not a finite number/);
});
