import { expect, it } from "vitest";
import { runSystem } from "../../../../server/engine/cells/index.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

// Terms that move with θ, or that are products, are scored like the others: none of their errors is nought.
it.each(["aids", "quaids", "les", "easi\nreal expenditure: approximate\ndegree: 2"])(
  "estimates %s with robust standard errors of the size of conventional ones",
  async (form) => {
    const weeks = await tunaWeeks("normalise: mean");
    const errorsBy = (kind: string) =>
      runSystem(
        specificationOf(
          "system",
          `data: weeks\nform: ${form}\nimpose: [homogeneity, symmetry]\nstandard errors: ${kind}\n`,
        ),
        weeks,
      ).coefficients.map(({ standardError }) => standardError);
    const conventional = errorsBy("conventional");
    errorsBy("heteroskedastic").forEach((error, i) => {
      expect(error / conventional[i]).toBeGreaterThan(0.25);
      expect(error / conventional[i]).toBeLessThan(4);
    });
  },
);
