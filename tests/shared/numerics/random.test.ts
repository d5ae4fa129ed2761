import { expect, test } from "vitest";
import { seededRandom, splitmix64, xoshiro128 } from "../../../shared/numerics/random.ts";

test("xoshiro128** from the state 1, 2, 3, 4 is the sequence of its definition", () => {
  const next = xoshiro128(1, 2, 3, 4);
  const sequence = [
    11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597, 4258142804,
  ];
  expect(sequence.map(next)).toEqual(sequence);
});

test("splitmix64 from 1234567 is the sequence of its definition", () => {
  const next = splitmix64(1234567n);
  expect([next(), next()]).toEqual([6457827717110365317n, 3203168211198807973n]);
});

test("a seed repeats bit for bit; another seed or stream does not", () => {
  const draw = (seed: number, stream?: number) => {
    const random = seededRandom(seed, stream);
    return [random.uniform(), random.normal(), random.integer(1000), random.normal()];
  };
  expect(draw(7)).toEqual(draw(7));
  expect(draw(7, 3)).toEqual(draw(7, 3));
  expect(draw(8)).not.toEqual(draw(7));
  expect(draw(7, 3)).not.toEqual(draw(7));
});

test("moments of uniform and normal, within five standard errors of 200,000 draws", () => {
  const random = seededRandom(42);
  const draws = 200_000;
  const mean = (of: () => number) => Array.from({ length: draws }, of).reduce((sum, x) => sum + x, 0) / draws;
  const within = (of: () => number, expected: number, deviation: number) =>
    expect(Math.abs(mean(of) - expected)).toBeLessThan((5 * deviation) / Math.sqrt(draws));
  within(random.uniform, 0.5, Math.sqrt(1 / 12));
  within(() => random.uniform() ** 2, 1 / 3, Math.sqrt(4 / 45));
  within(random.normal, 0, 1);
  within(() => random.normal() ** 2, 1, Math.SQRT2);
  within(() => random.normal() ** 4, 3, Math.sqrt(96));
  within(() => random.normal() * random.normal(), 0, 1);
});

test("integers fill their range evenly: χ² of ten cells below its 99.9 % point", () => {
  const random = seededRandom(3);
  const counts = new Array<number>(10).fill(0);
  for (let draw = 0; draw < 100_000; draw++) counts[random.integer(10)]++;
  const statistic = counts.reduce((sum, count) => sum + (count - 10_000) ** 2 / 10_000, 0);
  expect(statistic).toBeLessThan(27.88);
  expect(() => random.integer(0)).toThrow("cannot draw an integer below 0");
  expect(() => seededRandom(0.5)).toThrow("a seed and a stream are integers, not 0.5 and 0");
});
