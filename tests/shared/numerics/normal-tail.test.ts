import { expect, test } from "vitest";
import {
  inverseMillsRatio,
  logNormalProbability,
  normalDensity,
  normalProbability,
} from "../../../shared/numerics/normal-tail.ts";

/** z, ln Φ, φ/Φ, Φ: pnorm(z, log.p = TRUE), exp(dnorm(z, log = TRUE) − pnorm(z, log.p = TRUE)), pnorm(z) of R 4.2.2. */
const REFERENCE = [
  [-38.5, -745.69527029041103, 38.52593909685114, 0],
  [-30, -454.32124395634321, 30.033259667434663, 4.9067139271481872e-198],
  [-20, -203.91715537109727, 20.049753068527725, 2.7536241186062337e-89],
  [-10, -53.23128515051247, 10.098093233962491, 7.6198530241605269e-24],
  [-5.5, -17.77937635262526, 5.6714103138972938, 1.8989562465887721e-8],
  [-3.0001, -6.6080545360230527, 3.2831915991691076, 0.0013494549132607172],
  [-3, -6.6077262215103492, 3.2830986549304342, 0.0013498980316300946],
  [-2.9999, -6.6073979162920544, 3.2830057110064694, 0.001350341282954925],
  [-1.5, -2.7059444008238898, 1.9386771666225433, 0.066807201268858071],
  [-0.3, -0.96210281816885079, 0.99816596885848352, 0.38208857781104733],
  [0, -Math.LN2, 0.79788456080286529, 0.5],
  [0.2, -0.54600435372277423, 0.67507317979029202, 0.57925970943910299],
  [1, -0.17275377902344988, 0.28759997093917838, 0.84134474606854293],
  [2.5, -0.0062290254858600024, 0.017637825486916725, 0.99379033467422384],
  [6, -9.8658764552437559e-10, 6.0758828558176746e-9, 0.9999999990134123],
  [8.5, -9.4795348222033192e-18, 8.1662356316695403e-17, 1],
  [20, -2.7536241186062337e-89, 5.5209483621597167e-88, 1],
];

test.each(REFERENCE)("the tail at %f", (z, log, mills, probability) => {
  // exp() of the reference's own logarithms multiplies their rounding by up to 745.
  expect(Math.abs(logNormalProbability(z) / log - 1)).toBeLessThan(1e-13);
  expect(Math.abs(inverseMillsRatio(z) / mills - 1)).toBeLessThan(1e-13);
  // z/√2 is rounded before its square is an exponent: 450 × 2.2e-16 at most here.
  if (probability > 0) expect(Math.abs(normalProbability(z) / probability - 1)).toBeLessThan(2e-13);
});

test("stays finite where the probability itself is no longer a number above zero", () => {
  expect(logNormalProbability(-200)).toBeCloseTo(-20006.217, 2);
  expect(inverseMillsRatio(-200)).toBeCloseTo(200.005, 4);
  expect(inverseMillsRatio(60)).toBe(0);
  expect(logNormalProbability(60)).toBeCloseTo(0, 300);
});

test("the inverse Mills ratio is the derivative of the logarithm, on both sides of where the formula changes", () => {
  for (const z of [-12, -3.0005, -2.9995, -0.7, 1.3, 4]) {
    const step = 1e-5;
    const slope = (logNormalProbability(z + step) - logNormalProbability(z - step)) / (2 * step);
    expect(Math.abs(slope - inverseMillsRatio(z))).toBeLessThan(1e-7 * (1 + Math.abs(z)));
  }
  expect(normalDensity(0)).toBeCloseTo(0.3989422804014327, 15);
});
