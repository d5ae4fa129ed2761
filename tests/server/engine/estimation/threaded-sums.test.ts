import { describe, expect, it } from "vitest";
import { reduceRows } from "../../../../server/engine/estimation/moments.ts";
import { momentsRequest, sourceOf } from "../../../../server/engine/estimation/request.ts";
import { Cancelled, QUIET, type RunControl } from "../../../../server/engine/run.ts";
import { startThreads } from "../../../../server/engine/threads/start-threads.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

// Four chunks of rows and some, and multiplications enough to be divided.
const { data } = simulateShares({
  form: "aids",
  goods: 6,
  rows: 70_001,
  random: seededRandom(8),
  noise: 0.02,
  impose: ["homogeneity", "symmetry"],
  demographics: 1,
  weighted: true,
});
const specification = systemOver(data, { form: "aids", impose: ["homogeneity", "symmetry"] });
const source = sourceOf(data, momentsRequest(specification, data));
const moments = (control: RunControl) => reduceRows(source, "rows", control, "summed");

describe("moments", () => {
  const alone = moments(QUIET);

  it.each([2, 3, 8])("are the same to the last bit on %d threads", (count) => {
    const threads = startThreads(count);
    for (let again = 0; again < 2; again++) {
      const found = moments({ ...QUIET, threads });
      expect(found.terms.values).toEqual(alone.terms.values);
      expect(found.responses.values).toEqual(alone.responses.values);
    }
  });

  it("stop when cancelled on several threads, as on one, and say how far they are", () => {
    for (const threads of [undefined, startThreads(2)]) {
      const heard: number[] = [];
      const control: RunControl = {
        progress: ({ fraction }) => void heard.push(fraction ?? 0),
        cancelled: () => Math.max(0, ...heard) > 0.2,
        ...(threads && { threads }),
      };
      expect(() => moments(control)).toThrow(Cancelled);
      expect(Math.max(...heard)).toBeLessThan(1);
    }
  });
});
