import MultivariateLinearRegression from "ml-regression-multivariate-linear";
import { accumulateMoments, estimateSystem, momentsRequest } from "../../server/engine/estimation/index.ts";
import { QUIET } from "../../server/engine/run.ts";
import { seededRandom } from "../../shared/numerics/random.ts";
import { systemSpecification } from "../../shared/schemas/system.ts";
import { logPriceIndex, priceIndexOf } from "../../shared/systems/price-indices.ts";
import { simulateShares } from "../support/simulated-shares.ts";
import { fastest, say } from "./timing.ts";

const ROWS = 100_000;
const GOODS = 12;

benchGeneralPurpose(GOODS);

/** Equation-by-equation least squares of LA-AIDS by a general-purpose package, on as many rows as it holds well. */
function benchGeneralPurpose(goods: number): void {
  const { data } = simulateShares({ form: "aids", goods, rows: ROWS, random: seededRandom(2), noise: 0.02 });
  const index = priceIndexOf("tornqvist", data.shares, data.logPrices);
  const logIndex = logPriceIndex(index, data.shares, data.logPrices);
  const rows = Array.from(data.logTotal.keys());
  const x = rows.map((t) => [...data.logPrices.map((column) => column[t]), data.logTotal[t] - logIndex[t]]);
  const y = rows.map((t) => data.shares.slice(0, -1).map((share) => share[t]));
  const general = fastest(3, () => new MultivariateLinearRegression(x, y, { intercept: true, statistics: false }));
  const specification = systemSpecification.parse({
    kind: "system",
    data: "rows",
    form: "la-aids",
    estimator: "least squares",
  });
  const ours = fastest(3, () => {
    const moments = accumulateMoments(data, momentsRequest(specification, data), QUIET);
    return estimateSystem(specification, data, moments, QUIET);
  });
  const theirs = general.result.weights;
  const difference = data.goods.slice(0, -1).reduce((most, _, i) => {
    const own = ours.result.coefficients.filter(({ block, good }) => block === "gamma" && good === data.goods[i]);
    return own.reduce((worst, { estimate }, j) => Math.max(worst, Math.abs(estimate - theirs[j][i])), most);
  }, 0);
  say({
    figure: "general-purpose least squares",
    package: "ml-regression-multivariate-linear",
    goods,
    rows: ROWS,
    ms: general.ms,
    processorMs: general.processorMs,
    oursWithStandardErrorsAndTestsMs: ours.ms,
    oursProcessorMs: ours.processorMs,
    largestDifference: difference,
  });
}
