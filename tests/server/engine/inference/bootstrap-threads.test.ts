import { describe, expect, it } from "vitest";
import { estimateSystem } from "../../../../server/engine/estimation/estimate.ts";
import { reduceRows } from "../../../../server/engine/estimation/moments.ts";
import { momentsRequest, sourceOf } from "../../../../server/engine/estimation/request.ts";
import { Cancelled, QUIET, type RunControl } from "../../../../server/engine/run.ts";
import { startThreads } from "../../../../server/engine/threads/start-threads.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

const IMPOSE = ["homogeneity", "symmetry"] as const;
const { data: plain } = simulateShares({
  form: "aids",
  goods: 3,
  rows: 120,
  random: seededRandom(9),
  noise: 0.02,
  impose: IMPOSE,
});
const village = plain.logTotal.map((_, t) => t % 20);
const data = { ...plain, numeric: new Map([...plain.numeric, ["village", village]]) };

function draws(bootstrap: object, control: RunControl) {
  const errors = { replicates: 60, ...bootstrap };
  const specification = systemOver(data, { form: "aids", demographics: [], impose: IMPOSE, "standard errors": errors });
  const request = momentsRequest(specification, data);
  const moments = reduceRows(sourceOf(data, request), request.key, QUIET);
  return estimateSystem(specification, data, moments, control).bootstrap?.draws;
}

describe("a bootstrap on threads", () => {
  const two = { ...QUIET, threads: startThreads(2) };

  it.each([{ bootstrap: "rows" }, { bootstrap: "clusters", cluster: "village" }, { bootstrap: "residuals" }])(
    "$bootstrap: the same bits on two threads as on one",
    (bootstrap) => {
      const alone = draws(bootstrap, QUIET);
      expect(alone).toHaveLength(60);
      for (let again = 0; again < 2; again++) expect(draws(bootstrap, two)).toEqual(alone);
    },
  );

  it("tells the replicate it has come to, and stops at the next when cancelled", () => {
    const heard: number[] = [];
    let told = 0;
    const control: RunControl = {
      progress: ({ step, iteration, fraction }) => {
        if (step !== "estimating replicates") return;
        told++;
        heard.push(iteration!);
        expect(fraction).toBeCloseTo(iteration! / 60, 12);
      },
      cancelled: () => told >= 5,
    };
    expect(() => draws({ bootstrap: "rows" }, control)).toThrow(Cancelled);
    expect(heard).toEqual([1, 2, 3, 4, 5]);
  });
});
