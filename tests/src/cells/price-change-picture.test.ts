import { describe, expect, it } from "vitest";
import { mostChanged, onePrice } from "../../../shared/economics/price-change/one-price.ts";
import type { PriceQuestion } from "../../../shared/schemas/price-change.ts";
import { pictureWords } from "../../../src/cells/price-change/picture/picture-words.ts";
import { sampleFitted } from "../../support/sample-findings.ts";
import { samplePriceChange } from "../../support/sample-price-change.ts";

const GOOD = "meat & fish";
const at = 3;
const question = (percent: number): PriceQuestion => ({ prices: { [GOOD]: { "per cent": percent } }, expenditure: 0 });

describe.each([40, -30])("a price that changes by %i per cent, alone", (percent) => {
  const finding = samplePriceChange(question(percent));
  const { quantities, welfare, totalBefore, pricesBefore, pricesAfter } = finding.at;

  it("has the bundles and the compensation that the finding has", () => {
    const one = onePrice(finding, GOOD, "hicks");
    const close = (found: number | undefined, expected: number | undefined) => expect(found).toBeCloseTo(expected!, 10);
    close(one.bundles.before.quantity, quantities.before.values[at]);
    close(one.bundles.compensated?.quantity, quantities.hicks?.values[at]);
    close(one.bundles.after?.quantity, quantities.after?.values[at]);
    close(one.compensation, welfare?.compensating.value);
    const slutsky = onePrice(finding, GOOD, "slutsky");
    close(slutsky.bundles.compensated?.quantity, quantities.slutsky?.values[at]);
    close(slutsky.compensation, (pricesAfter[at] - pricesBefore[at]) * quantities.before.values[at]);
  });

  it("has every bundle on its budget", () => {
    for (const by of ["hicks", "slutsky"] as const) {
      const { bundles, budgets } = onePrice(finding, GOOD, by);
      for (const which of ["before", "compensated", "after"] as const) {
        const [{ quantity, rest }, { price, total }] = [bundles[which]!, budgets[which]!];
        expect(rest + price * quantity).toBeCloseTo(total, 9);
      }
    }
    const { bundles, budgets } = onePrice(finding, GOOD, "slutsky");
    expect(bundles.before.rest + budgets.compensated!.price * bundles.before.quantity).toBeCloseTo(
      budgets.compensated!.total,
      9,
    );
  });

  it("has curves that touch their budgets at the bundles and lie beyond them everywhere else", () => {
    const { curves, budgets, bundles } = onePrice(finding, GOOD, "hicks");
    const touches = [
      [curves!.before, budgets.before, bundles.before],
      [curves!.before, budgets.compensated!, bundles.compensated!],
      [curves!.after, budgets.after, bundles.after!],
    ] as const;
    for (const [{ spots }, { price, total }, bundle] of touches) {
      expect(spots.length).toBeGreaterThan(100);
      const costs = spots.map(({ quantity, rest }) => rest + price * quantity);
      const least = Math.min(...costs);
      expect(Math.abs(least - total)).toBeLessThan(1e-9 * totalBefore);
      expect(spots[costs.indexOf(least)].quantity).toBeCloseTo(bundle.quantity, 9);
    }
  });
});

describe("where there is no cost function", () => {
  const finding = samplePriceChange(question(40), sampleFitted(["homogeneity"]));

  it("draws no curve and says why, and Slutsky's compensation is still there", () => {
    const one = onePrice(finding, GOOD, "slutsky");
    expect(one.curves).toBeUndefined();
    expect(one.bundles.compensated).toBeDefined();
    expect(pictureWords(one, { isCut: true, curveEnds: false }, "slutsky").notes[1]).toMatch(
      /^No indifference curves: symmetry is not imposed: .* Budgets and bundles alone are drawn\.$/,
    );
    expect(onePrice(finding, GOOD, "hicks").bundles.compensated).toBeUndefined();
  });
});

it("is of the good whose price changes most", () => {
  expect(mostChanged(samplePriceChange())).toBe(GOOD);
  expect(
    mostChanged(
      samplePriceChange({ prices: { dairy: { "per cent": -30 }, grains: { "per cent": 35 } }, expenditure: 0 }),
    ),
  ).toBe("dairy");
});
