import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { ascending, tenths, weightedQuantiles } from "../../../../server/engine/cells/weighted.ts";

const numbers = fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 1, maxLength: 40 });

describe("weightedQuantiles", () => {
  it("are values up to which at least the fraction of the weight lies, and no smaller value does", () => {
    fc.assert(
      fc.property(
        numbers,
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.infiniteStream(fc.integer({ min: 1, max: 9 })),
        (values, q, stream) => {
          const weights = Float64Array.from(values, () => stream.next().value as number);
          const [found] = weightedQuantiles(Float64Array.from(values), [q], weights);
          const total = weights.reduce((sum, weight) => sum + weight, 0);
          const upTo = (bound: (value: number) => boolean) =>
            values.reduce((sum, value, i) => sum + (bound(value) ? weights[i] : 0), 0);
          expect(upTo((value) => value <= found)).toBeGreaterThanOrEqual(q * total * (1 - 1e-9));
          expect(upTo((value) => value < found)).toBeLessThanOrEqual(q * total);
        },
      ),
    );
  });

  it("count a row of weight three as three rows", () => {
    const values = Float64Array.of(3, 1, 2);
    const fractions = [0, 0.2, 0.21, 0.5, 0.8, 0.81, 1];
    expect(weightedQuantiles(values, fractions, Float64Array.of(1, 1, 3))).toEqual(
      weightedQuantiles(Float64Array.of(3, 1, 2, 2, 2), fractions),
    );
  });
});

describe("tenths", () => {
  it("hold a tenth of equally weighted rows each, richest last", () => {
    const values = Float64Array.from({ length: 50 }, (_, i) => (i * 37) % 50);
    const tenth = tenths(values);
    expect([...tenth]).toEqual([...values].map((value) => Math.floor(value / 5)));
  });

  it("follow the order of values", () => {
    fc.assert(
      fc.property(numbers, (list) => {
        const values = Float64Array.from(list);
        const tenth = tenths(values);
        const sorted = [...ascending(values)].map((t) => tenth[t]);
        expect(sorted.toSorted((a, b) => a - b)).toEqual(sorted);
      }),
    );
  });
});
