import { expect, it } from "vitest";
import { equationTests } from "../../../../server/engine/inference/equation-tests.ts";
import { laAids } from "../../../../shared/systems/la-aids.ts";

const goods = ["bread", "milk", "meat"];
const size = { goods: 3, demographics: 0, alpha0: 0 };
const layout = laAids.layout(size);
/** Each good's price terms vary alone, so that their sum does. */
const alone: number[][] = layout.map((_, a) => layout.map((_, b) => (a === b ? 0.01 : 0)));
const theta = layout.map((_, a) => 0.1 * a);

it("the sum of an equation's price terms stands over its standard error", () => {
  const tests = equationTests(laAids, size, goods, { theta, covariance: alone });
  expect(tests?.map(({ standardError }) => standardError)).toEqual(
    [0, 1, 2].map(() => expect.closeTo(Math.sqrt(0.03), 12)),
  );
});

it("a sum that does not vary, or by rounding alone, has no t value", () => {
  for (const rest of [0, 1e-17]) {
    // Of three terms the third is the other two taken off: their sum is fixed.
    const fixed = alone.map((row) => [...row]);
    for (const good of [0, 1, 2]) {
      const places = layout.flatMap((place, a) => (place.block === "gamma" && place.good === good ? [a] : []));
      places.forEach((a, i) => {
        places.forEach((b, j) => {
          fixed[a][b] = i === j ? 0.02 + rest : -0.01;
        });
      });
    }
    expect(equationTests(laAids, size, goods, { theta, covariance: fixed })).toBeUndefined();
  }
});
