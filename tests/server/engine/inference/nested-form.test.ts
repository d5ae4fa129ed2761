import { describe, expect, it } from "vitest";
import { expand } from "../../../../server/engine/estimation/coefficient-form.ts";
import { columnOf, crossProduct, dot } from "../../../../server/engine/estimation/columns.ts";
import { nestedForm, withoutCoefficients } from "../../../../server/engine/inference/nested-form.ts";
import { waldTest } from "../../../../server/engine/inference/wald-test.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import { SYSTEMS } from "../../../../shared/systems/index.ts";

const size = { goods: 5, demographics: 2, alpha0: 0 };
const { aids } = SYSTEMS;
const wide = aids.free(size, []);
const narrow = aids.free(size, ["homogeneity", "symmetry"]);

describe("a form within a wider one", () => {
  const { origin, normals } = nestedForm(wide, narrow);

  it("restricts as many directions as it has fewer free coefficients", () => {
    expect(normals.columns).toBe(wide.places.length - narrow.places.length);
    const products = crossProduct(normals, normals);
    products.values.forEach((value, k) => {
      expect(value).toBeCloseTo(k % (normals.columns + 1) === 0 ? 1 : 0, 12);
    });
  });

  it("is where the restricted directions vanish", () => {
    const random = seededRandom(31);
    const theta = expand(
      narrow,
      narrow.places.map(() => random.normal()),
    );
    const away = Float64Array.from(wide.places, (place, f) => theta[place] - origin[f]);
    for (let q = 0; q < normals.columns; q++) expect(dot(columnOf(normals, q), away)).toBeCloseTo(0, 12);
  });

  it("gives a Wald statistic that is the squared length of what is restricted, whatever the basis", () => {
    const random = seededRandom(32);
    const free = wide.places.map(() => random.normal());
    const identity = wide.places.map((_, a) => wide.places.map((__, b) => (a === b ? 1 : 0)));
    const test = waldTest(free, identity, { origin, normals });
    const away = Float64Array.from(free, (value, f) => value - origin[f]);
    let length = 0;
    for (let q = 0; q < normals.columns; q++) length += dot(columnOf(normals, q), away) ** 2;
    expect("statistic" in test && test.statistic).toBeCloseTo(length, 10);
  });

  it("has no Wald statistic where the covariance is of too low a rank, and says so with both numbers", () => {
    const few = wide.places.map((_, a) => wide.places.map((__, b) => Number(a < 3 && b < 3 && a === b)));
    const test = waldTest(
      wide.places.map(() => 1),
      few,
      { origin, normals },
    );
    expect("absent" in test && test.absent).toMatch(new RegExp(`rank \\d+ where the ${normals.columns} restrictions`));
  });
});

describe("coefficients left out", () => {
  const layout = aids.layout(size);
  const demographic = new Set(layout.flatMap(({ block }, a) => (block === "demographic" ? [a] : [])));

  it("vanish for every good", () => {
    const without = withoutCoefficients(narrow, demographic);
    expect(narrow.places.length - without.places.length).toBe((size.goods - 1) * size.demographics);
    const theta = expand(
      without,
      without.places.map(() => 1),
    );
    for (const a of demographic) expect(theta[a]).toBe(0);
  });

  it("are refused where adding-up ties them to one that stays", () => {
    expect(() => withoutCoefficients(narrow, new Set([size.goods - 1]))).toThrow(RangeError);
  });
});
