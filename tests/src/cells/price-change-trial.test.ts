import { describe, expect, it } from "vitest";
import type { PriceQuestion } from "../../../shared/schemas/price-change.ts";
import { atRest, EXPENDITURE, editsTo, withRate } from "../../../src/cells/price-change/rates.ts";
import { rulerScale } from "../../../src/cells/price-change/ruler-scale.ts";
import { createTrial } from "../../../src/cells/price-change/trial.ts";
import type { EconomicsWorker } from "../../../src/workers/client.ts";
import type { PricesAsked } from "../../../src/workers/protocol.ts";
import { tryPrices } from "../../../src/workers/try-prices.ts";
import { MEAT_AND_LEVY, samplePriceChange } from "../../support/sample-price-change.ts";

const finding = samplePriceChange();
const meatAt = (percent: number) => withRate(finding.question, finding.question, "meat & fish", percent);

/** A worker whose answers come when the test says so. */
function slow() {
  const asked: { question: PriceQuestion; answer: () => Promise<void>; refuse: (why: string) => Promise<void> }[] = [];
  let closed = 0;
  const worker = {
    ask: (_: string, ask: PricesAsked) =>
      new Promise((resolve, reject) => {
        asked.push({
          question: ask.question,
          answer: async () => resolve(tryPrices(ask)),
          refuse: async (why) => reject(new Error(why)),
        });
      }),
    close: () => {
      closed += 1;
    },
  } as unknown as EconomicsWorker;
  return { asked, start: () => worker, closed: () => closed };
}

describe("a trial", () => {
  it("asks the first question and the latest, and none between", async () => {
    const { asked, start } = slow();
    const trial = createTrial(finding, start);
    for (const percent of [41, 42, 43, 44]) trial.ask(meatAt(percent));
    expect(asked.map(({ question }) => question)).toEqual([meatAt(41)]);
    await asked[0].answer();
    expect(trial.state().shown.question).toEqual(meatAt(41));
    expect(trial.state().question).toEqual(meatAt(44));
    await asked[1].answer();
    expect(asked).toHaveLength(2);
    expect(trial.state().shown.question).toEqual(meatAt(44));
    expect(trial.state().shown).toMatchObject({ noIncidence: expect.stringContaining("not stored") });
    expect(trial.state().shown.incidence).toBeUndefined();
  });

  it("shows what is stored once the rulers are back, whatever answer is still to come", async () => {
    const { asked, start } = slow();
    const trial = createTrial(finding, start);
    trial.ask(meatAt(50));
    trial.ask(finding.question);
    await asked[0].answer();
    expect(trial.state()).toMatchObject({ isTried: false, shown: finding });
  });

  it("says why there is no answer, and goes on", async () => {
    const { asked, start } = slow();
    const trial = createTrial(finding, start);
    trial.ask(meatAt(50));
    await asked[0].refuse("prices stay positive");
    await Promise.resolve();
    expect(trial.state().refusal).toBe("prices stay positive");
    trial.ask(meatAt(45));
    await asked[1].answer();
    expect(trial.state().refusal).toBeUndefined();
  });

  it("keeps no worker when nobody looks any more", () => {
    const { start, closed } = slow();
    const trial = createTrial(finding, start);
    const leave = trial.subscribe(() => {});
    trial.ask(meatAt(50));
    leave();
    expect(closed()).toBe(1);
  });
});

describe("the rates", () => {
  it("go by each good's own rule, and back to nothing", () => {
    const rest = atRest(finding, withRate(MEAT_AND_LEVY, MEAT_AND_LEVY, "dairy", 5));
    expect(rest).toEqual({
      prices: { "meat & fish": { "per cent": 0 }, "sweet drinks": { "ad valorem": 0 } },
      expenditure: 0,
    });
  });

  it("write the keys that differ and no other", () => {
    const tried = withRate(MEAT_AND_LEVY, withRate(MEAT_AND_LEVY, meatAt(10), "dairy", -5), EXPENDITURE, 3);
    expect(editsTo(MEAT_AND_LEVY, tried)).toEqual([
      [["prices", "meat & fish", "per cent"], 10],
      [["prices", "dairy"], { "per cent": -5 }],
      [["expenditure"], 3],
    ]);
    expect(editsTo(MEAT_AND_LEVY, MEAT_AND_LEVY)).toEqual([]);
  });

  it("stand on rulers that reach further where a number lies further out", () => {
    const reach = (percent: number) => {
      const { min, max } = rulerScale(finding, meatAt(percent), "meat & fish");
      return [min, max];
    };
    expect([reach(40), reach(80), reach(-70)]).toEqual([
      [-50, 50],
      [-50, 100],
      [-95, 50],
    ]);
  });

  it("stand on a ruler of money where the rule is a price or a tax per unit", () => {
    const question: PriceQuestion = { prices: { dairy: { to: 9.1 }, grains: { specific: 0.31 } }, expenditure: 0 };
    const levied = samplePriceChange(question);
    expect(rulerScale(levied, question, "dairy")).toMatchObject({
      rest: 9.1,
      step: 0.1,
      kind: "price",
      isPercent: false,
    });
    expect(rulerScale(levied, question, "grains")).toMatchObject({
      rest: 0,
      step: 0.1,
      kind: "tax per unit",
      value: 0.31,
    });
  });
});
