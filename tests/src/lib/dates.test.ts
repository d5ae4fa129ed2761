import { describe, expect, it } from "vitest";
import { aboutInWords, agoInWords, durationInWords, elapsedClock, whenInWords } from "../../../src/lib/dates.ts";

const now = new Date(2031, 2, 12, 14, 30); // a Wednesday

describe("times in words", () => {
  it.each([
    [new Date(2031, 2, 12, 9, 5), "9:05"],
    [new Date(2031, 2, 11, 23, 59), "Tuesday"],
    [new Date(2031, 2, 6, 8, 0), "Thursday"],
    [new Date(2031, 2, 5, 8, 0), "5 March"],
    [new Date(2030, 11, 31, 8, 0), "31 December 2030"],
  ])("says a clock time today, a weekday this week, a date after", (then, words) => {
    expect(whenInWords(then, now)).toBe(words);
  });

  it.each([
    [new Date(2031, 2, 12, 14, 29, 50), "just now"],
    [new Date(2031, 2, 12, 14, 29), "a minute ago"],
    [new Date(2031, 2, 12, 14, 5), "25 minutes ago"],
    [new Date(2031, 2, 12, 9, 0), "at 9:00"],
    [new Date(2031, 2, 11, 9, 0), "yesterday"],
    [new Date(2031, 2, 8, 9, 0), "on Saturday"],
    [new Date(2031, 1, 18, 9, 0), "18 February"],
  ])("says how long ago a change was", (then, words) => {
    expect(agoInWords(then, now)).toBe(words);
  });

  it("says how long something took, and about how long it will", () => {
    expect([38, 240, 1600, 20_000, 200_000].map(durationInWords)).toEqual(["38 ms", "0.2 s", "1.6 s", "20 s", "3 min"]);
    expect([400, 4_400, 21_000, 200_000].map(aboutInWords)).toEqual([
      "less than a second",
      "about 4 s",
      "about 20 s",
      "about 3 min",
    ]);
    expect(elapsedClock(74_900)).toBe("1:14");
  });
});
