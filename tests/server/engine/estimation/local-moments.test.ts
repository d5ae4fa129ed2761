import { Matrix, pseudoInverse } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { runSystem } from "../../../../server/engine/cells/system.ts";
import { accumulateSums, momentMatrix } from "../../../../server/engine/estimation/accumulate-sums.ts";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../../../server/engine/estimation/index.ts";
import { locatable, sourceAt } from "../../../../server/engine/estimation/local-moments.ts";
import { planReduction } from "../../../../server/engine/estimation/moments.ts";
import { planTiles } from "../../../../server/engine/estimation/monomial-plan.ts";
import { termBlock } from "../../../../server/engine/estimation/term-block.ts";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET, type RunControl } from "../../../../server/engine/run.ts";
import { seededRandom } from "../../../../shared/numerics/random.ts";
import type { RestrictionName } from "../../../../shared/systems/names.ts";
import { quaids } from "../../../../shared/systems/quaids.ts";
import { thetaOf } from "../../../laws/random-systems.ts";
import { estimated, largestDifference, systemOver } from "../../../support/estimating.ts";
import { simulateShares } from "../../../support/simulated-shares.ts";

const BOTH: RestrictionName[] = ["homogeneity", "symmetry"];
const shape = { goods: 4, rows: 240, noise: 0.02, impose: BOTH };
const { data, theta, size } = simulateShares({
  ...shape,
  form: "quaids",
  random: seededRandom(12),
  demographics: 1,
  weighted: true,
});
const specification = systemOver(data, { form: "quaids", impose: BOTH });

/** Σ_t h_t e'e over all goods, from the system's own evaluator. */
function sumOfSquares(at: readonly number[]): number {
  const evaluator = quaids.evaluator(at, size);
  const z = [...data.numeric.values()];
  let sum = 0;
  for (let t = 0; t < data.rows; t++) {
    const row = (columns: readonly Float64Array[]) => columns.map((column) => column[t]);
    evaluator.at(row(data.logPrices), data.logTotal[t], row(z));
    data.shares.forEach((share, i) => {
      sum += data.weights![t] * (share[t] - evaluator.shares[i]) ** 2;
    });
  }
  return sum;
}

describe("terms that move with the coefficients", () => {
  it("are multiplied with each other once a monomial, products of three and all", () => {
    const source = sourceAt(data, momentsRequest(specification, data), quaids.moments, size, theta);
    const { whitening, whitened } = planReduction(source, QUIET);
    expect(whitened.some((term) => term.length === 3)).toBe(true);
    const plan = planTiles(whitened);
    const range = { from: 0, to: data.rows };
    const matrix = momentMatrix(
      plan,
      accumulateSums(source, whitening, whitened, plan, range, QUIET, () => 0),
    ).values;
    const { block, fill } = termBlock(source, whitening, whitened);
    fill(0, data.rows);
    const column = (term: number) => block.subarray((term * block.length) / whitened.length).subarray(0, data.rows);
    const width = whitened.length;
    for (let i = 0; i < width; i++) {
      for (let j = i; j < width; j++) {
        const product = column(i).reduce((sum, value, t) => sum + value * column(j)[t], 0);
        const scale = Math.sqrt(matrix[i * width + i] * matrix[j * width + j]);
        expect(Math.abs(matrix[j * width + i] - product)).toBeLessThan(1e-13 * scale);
      }
    }
    expect(plan.tiles * 16).toBeLessThan((width * (width + 1)) / 2);
  });

  it("least squares is lowest where it says, in every free direction", () => {
    const { fitted } = estimated(data, { form: "quaids", impose: BOTH, estimator: "least squares" });
    const free = quaids.free(size, BOTH);
    const phi = free.places.map((place) => fitted.theta[place]);
    const least = sumOfSquares(fitted.theta);
    phi.forEach((_, f) => {
      const at = (step: number) =>
        sumOfSquares(
          thetaOf(
            free,
            phi.map((value, other) => (other === f ? value + step : value)),
          ),
        );
      const [above, below] = [at(1e-4) - least, at(-1e-4) - least];
      expect(Math.min(above, below)).toBeGreaterThan(0);
      // At a minimum the two sides rise alike, but for third derivatives.
      expect(Math.abs(above - below)).toBeLessThan(1e-3 * (above + below));
    });
  });

  it("Durbin and Watson's d is that of the residuals", () => {
    const dated = { ...data, time: Float64Array.from({ length: data.rows }, (_, t) => t) };
    const { durbinWatson, fitted } = estimated(dated, { form: "quaids", impose: BOTH });
    const evaluator = quaids.evaluator(fitted.theta, size);
    const residuals = data.shares.map((share) => share.slice());
    for (let t = 0; t < data.rows; t++) {
      const row = (columns: readonly Float64Array[]) => columns.map((column) => column[t]);
      evaluator.at(row(data.logPrices), data.logTotal[t], row([...data.numeric.values()]));
      residuals.forEach((column, i) => {
        column[t] -= evaluator.shares[i];
      });
    }
    residuals.forEach((e, i) => {
      const changes = e.slice(1).reduce((sum, value, t) => sum + (value - e[t]) ** 2, 0);
      const squares = e.reduce((sum, value) => sum + value * value, 0);
      expect(durbinWatson![i]).toBeCloseTo(changes / squares, 10);
    });
  });
});

describe("while it iterates", () => {
  const request = momentsRequest(specification, data);
  const nearby = accumulateMoments(data, request, QUIET);
  /** Anew: fits are kept with their moments. */
  const moments = () => locatable(nearby, data, request, quaids.moments, size, "summed");

  it("says in which iteration a pass is, and the likelihood so far", () => {
    const said: Parameters<RunControl["progress"]>[0][] = [];
    estimateSystem(specification, data, moments(), { ...QUIET, progress: (now) => said.push(now) });
    const inside = said.filter(({ step, iteration }) => step === "iterating" && iteration !== undefined);
    expect(inside.some(({ logLikelihood }) => Number.isFinite(logLikelihood))).toBe(true);
    // Of the passes themselves, every one after the first iteration knows where it stands.
    expect(inside.some(({ fraction, logLikelihood }) => fraction !== undefined && logLikelihood !== undefined)).toBe(
      true,
    );
    expect(said.every(({ step }) => step === "iterating")).toBe(true);
  });

  it("stops within a pass when cancelled", () => {
    let asked = 0;
    const count: RunControl = { ...QUIET, cancelled: () => ++asked < 0 };
    estimateSystem(specification, data, moments(), count);
    for (const after of [Math.floor(asked / 3), Math.floor(asked / 2), asked - 1]) {
      let left = after;
      const control: RunControl = { ...QUIET, cancelled: () => left-- <= 0 };
      expect(() => estimateSystem(specification, data, moments(), control)).toThrow(Cancelled);
    }
  });
});

it("says that a fixed α₀ makes units matter, where prices are not normalised", () => {
  const at = (normalise: "mean" | "none") =>
    runSystem(specification, { ...data, finding: { ...data.finding, normalise } }).unitsMatterBy;
  expect(at("mean")).toBeUndefined();
  expect(at("none")).toBe("a fixed α₀");
});

describe("robust standard errors", () => {
  it("are the sandwich of scores formed row by row from the evaluator's own derivatives", () => {
    const { fitted, residualCovariance } = estimated(data, {
      form: "quaids",
      impose: BOTH,
      "standard errors": "heteroskedastic",
    });
    const conventional = estimated(data, { form: "quaids", impose: BOTH });
    const free = quaids.free(size, BOTH);
    const inverse = pseudoInverse(new Matrix(residualCovariance));
    const information = Matrix.zeros(free.places.length, free.places.length);
    const meat = information.clone();
    for (let t = 0; t < data.rows; t++) {
      const row = (columns: readonly Float64Array[]) => columns.map((column) => column[t]);
      const prices = row(data.logPrices).map(Math.exp);
      const point = { prices, total: Math.exp(data.logTotal[t]), demographics: row([...data.numeric.values()]) };
      const slopes = new Matrix(quaids.slopeDerivatives(fitted.theta, size, point).shares).mmul(
        new Matrix(free.matrix),
      );
      const { shares } = quaids.slopes(fitted.theta, size, point);
      const error = Matrix.columnVector(data.shares.map((share, i) => share[t] - shares[i]));
      const weighted = slopes.transpose().mmul(inverse).mul(data.weights![t]);
      const score = weighted.mmul(error);
      meat.add(score.mmul(score.transpose()));
      information.add(weighted.mmul(slopes));
    }
    const half = new Matrix(free.matrix).mmul(pseudoInverse(information));
    const expected = half
      .mmul(meat)
      .mmul(half.transpose())
      .mul(data.rows / (data.rows - 1));
    const plain = new Matrix(free.matrix).mmul(pseudoInverse(information)).mmul(new Matrix(free.matrix).transpose());
    expect(largestDifference(conventional.fitted.covariance.flat(), plain.to1DArray())).toBeLessThan(1e-9);
    expect(largestDifference(fitted.covariance.flat(), expected.to1DArray())).toBeLessThan(1e-9);
    const scale = Math.max(...expected.to1DArray());
    fitted.covariance.flat().forEach((value, k) => {
      expect(Math.abs(value - expected.to1DArray()[k])).toBeLessThan(1e-7 * scale);
    });
  });
});

describe("quadratic terms that the data do not ask for", () => {
  it("are estimated as nothing within their errors, and the test of them does not reject", () => {
    const plain = simulateShares({ ...shape, rows: 2000, form: "aids", random: seededRandom(5) });
    const finding = estimated(plain.data, { form: "quaids", impose: BOTH });
    const test = finding.tests.find(({ restriction }) => restriction === "quadratic terms zero")!;
    expect(test.degreesOfFreedom).toBe(3);
    expect(test.pValue).toBeGreaterThan(0.01);
    for (const { block, estimate, standardError } of finding.coefficients) {
      if (block === "lambda") expect(Math.abs(estimate)).toBeLessThan(3 * standardError);
    }
    const narrow = estimated(plain.data, { form: "aids", impose: BOTH });
    expect(test.statistic).toBeCloseTo(2 * (finding.logLikelihood - narrow.logLikelihood), 7);
  });

  it("of a few rows fitted too well are a refusal in words, never numbers", () => {
    const few = simulateShares({ ...shape, goods: 3, rows: 8, noise: 0.1, form: "quaids", random: seededRandom(3) });
    const estimate = () => estimated(few.data, { form: "quaids", impose: BOTH });
    expect(estimate).toThrow(Refusal);
    expect(estimate).toThrow(/The residual covariance is singular: the residuals of .* \(8 rows, 2 equations\)/);
  });
});

it("the size of a quadratic system names its rows and coefficients where there are too few", () => {
  const few = simulateShares({ ...shape, rows: 7, form: "quaids", random: seededRandom(3) });
  expect(() => estimated(few.data, { form: "quaids", impose: BOTH })).toThrow(/7 rows used; 15 free coefficients/);
});
