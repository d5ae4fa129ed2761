import { describe, expect, it } from "vitest";
import { runSystem } from "../../../../server/engine/cells/index.ts";
import { advising } from "../../../../server/engine/estimation/advice.ts";
import { NotConverged } from "../../../../server/engine/estimation/failures.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { QUIET, type RunControl } from "../../../../server/engine/run.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

describe("the quadratic system on prices far from one, with α₀ far below every ln x", () => {
  it("gives up after 150 iterations, once, and says what to try", async () => {
    const data = await tunaWeeks("time: week\nnormalise: none");
    const specification = specificationOf(
      "system",
      "data: weeks\nform: quaids\nimpose: [homogeneity, symmetry]\nestimator: maximum likelihood",
    );
    const iterations: number[] = [];
    const progress: RunControl["progress"] = ({ iteration }) => {
      if (iteration !== undefined) iterations.push(iteration);
    };
    expect(() => runSystem(specification, data, { ...QUIET, progress })).toThrow(
      /^The estimation did not converge: after 150 iterations .* Prices and expenditure are not normalised: try normalise: mean in the data cell, or another alpha0 \(alpha0 is 0\)/,
    );
    // The long way would begin to count again from one.
    const straight = iterations.slice(iterations.findIndex((count) => count > 50));
    expect(Math.max(...straight)).toBeLessThanOrEqual(150);
    expect(straight).toEqual(straight.toSorted((a, b) => a - b));
  }, 60_000);
});

describe("what to try", () => {
  const quaids = { form: "quaids", alpha0: 2 } as const;
  const failing = () => {
    throw new NotConverged("It did not converge.", 900, true);
  };
  const normalised = (normalise: "mean" | "none") => ({ finding: { normalise } }) as never;

  it("is another alpha0 where prices are normalised already", () => {
    expect(() => advising(quaids, normalised("mean"), failing)).toThrow(
      "It did not converge. Another alpha0 may let it converge (alpha0 is 2): one a little below the lowest ln x in the sample.",
    );
  });

  it("is not said of other systems, nor of other refusals", () => {
    expect(() => advising({ ...quaids, form: "les" }, normalised("none"), failing)).toThrow(/^It did not converge\.$/);
    const other = () => {
      throw new Refusal("The moments are singular.");
    };
    expect(() => advising(quaids, normalised("none"), other)).toThrow(/^The moments are singular\.$/);
  });
});
