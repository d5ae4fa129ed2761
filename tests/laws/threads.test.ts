import { expect, it } from "vitest";
import { estimateSystem } from "../../server/engine/estimation/estimate.ts";
import { reduceRows } from "../../server/engine/estimation/moments.ts";
import { momentsRequest, sourceOf } from "../../server/engine/estimation/request.ts";
import { QUIET, type RunControl } from "../../server/engine/run.ts";
import { startThreads } from "../../server/engine/threads/start-threads.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { SYSTEMS } from "../../shared/systems/index.ts";
import { SYSTEM_NAMES, type SystemName } from "../../shared/systems/names.ts";
import { systemOver } from "../support/estimating.ts";
import { simulateShares } from "../support/simulated-shares.ts";

/** Every number of a finding is the same to the last bit however many threads computed it, in every registered system. */
const ROWS = 17_000;
const sampleFrom = (form: "aids" | "les") => {
  const { data } = simulateShares({
    form,
    goods: 3,
    rows: ROWS,
    random: seededRandom(15),
    noise: 0.02,
    weighted: true,
  });
  return { ...data, time: Float64Array.from({ length: ROWS }, (_, t) => t) };
};
const ofAids = sampleFrom("aids");
const ofLes = sampleFrom("les");

function estimateOn(control: RunControl, form: SystemName) {
  const data = form === "les" ? ofLes : ofAids;
  const impose = SYSTEMS[form].heldByForm.length > 0 ? [] : ["homogeneity", "symmetry"];
  const specification = systemOver(data, { form, impose, ...(form === "easi" && { degree: 1 }) });
  const request = momentsRequest(specification, data);
  return estimateSystem(specification, data, reduceRows(sourceOf(data, request), request.key, control), control);
}

// Two chunks of rows are worth dividing here, however few multiplications they take.
const threads = startThreads(3, 0);

it.each(SYSTEM_NAMES)("%s by one thread and by three", (form) => {
  expect(estimateOn({ ...QUIET, threads }, form)).toEqual(estimateOn(QUIET, form));
});
