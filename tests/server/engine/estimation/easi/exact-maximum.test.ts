import { expect, it } from "vitest";
import { seededRandom } from "../../../../../shared/numerics/random.ts";
import { estimated } from "../../../../support/estimating.ts";
import { simulateEasi } from "../../../../support/simulated-easi.ts";

// Of years an intercept is all but a multiple of the slope: what is measured from elsewhere has the same error.
it("gives a demographic counted from nought and from 2000 years before the same standard errors", () => {
  const { data } = simulateEasi({
    goods: 3,
    rows: 200,
    random: seededRandom(12),
    noise: 0.02,
    easi: { degree: 2, interactions: [] },
    demographics: 1,
  });
  const [name, column] = [...data.numeric][0];
  const later = { ...data, numeric: new Map([[name, column.map((value) => value + 2000)]]) };
  const errorsOf = (rows: typeof data) =>
    estimated(rows, { form: "easi", degree: 2, impose: ["homogeneity", "symmetry"] })
      .coefficients.filter(({ block }) => block !== "constant")
      .map(({ standardError }) => standardError);
  const errors = errorsOf(data);
  errorsOf(later).forEach((error, at) => {
    expect(Math.abs(error / errors[at] - 1)).toBeLessThan(1e-6);
  });
});
