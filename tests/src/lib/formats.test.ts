import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { agoInWords, dateInWords, durationInWords, fullMoment, momentInWords } from "../../../src/lib/dates.ts";
import { chooseFormats, formatChoice, writeCount, writeNumber, writePercent } from "../../../src/lib/formats.ts";

const now = new Date(2031, 2, 12, 14, 30); // a Wednesday
const speaks = (language: string) => vi.spyOn(navigator, "language", "get").mockReturnValue(language);

beforeEach(() => {
  Object.defineProperty(navigator, "language", { get: () => "en-GB", configurable: true });
});
afterEach(() => {
  vi.restoreAllMocks();
  chooseFormats("");
});

describe("dates and numbers of the interface", () => {
  it.each([
    ["en-US", "March 5", "December 31, 2030", "Tuesday 2:08 PM", "February 18, 12:05 AM", "March 9, 2032 at 9:05 AM"],
    ["de-DE", "5 March", "31 December 2030", "Tuesday 14:08", "18 February, 0:05", "9 March 2032 at 9:05"],
    // The year first is no order of English words.
    ["ja-JP", "5 March", "31 December 2030", "Tuesday 14:08", "18 February, 0:05", "9 March 2032 at 9:05"],
  ])("in %s put day, month and clock in the order of the place, in English words", (language, ...words) => {
    speaks(language);
    expect([
      dateInWords(new Date(2031, 2, 5), now),
      dateInWords(new Date(2030, 11, 31), now),
      momentInWords(new Date(2031, 2, 11, 14, 8), now),
      momentInWords(new Date(2031, 1, 18, 0, 5), now),
      fullMoment(new Date(2032, 2, 9, 9, 5)),
    ]).toEqual(words);
  });

  it.each([
    ["en-US", "4,938 rows", "1 column", "123.4", "−1,234,567", "1.6 s", "99\u2009%"],
    // No point between thousands: beside decimal points it would be read as one.
    ["de-DE", "4\u202f938 rows", "1 column", "123,4", "−1\u202f234\u202f567", "1,6 s", "99\u2009%"],
    ["en-IN", "4,938 rows", "1 column", "123.4", "−12,34,567", "1.6 s", "99\u2009%"],
    ["ar-EG", "4,938 rows", "1 column", "123.4", "−1,234,567", "1.6 s", "99\u2009%"],
  ])("in %s write digits with the signs of the place", (language, ...words) => {
    speaks(language);
    expect([
      writeCount(4938, "row"),
      writeCount(1, "column"),
      writeNumber(123.4, 1),
      writeNumber(-1_234_567),
      durationInWords(1600),
      writePercent(0.999),
    ]).toEqual(words.map((one) => (language === "ar-EG" ? expect.stringMatching(latin(one)) : one)));
  });

  it("follow what was chosen on this machine, until the browser is followed again", () => {
    speaks("en-US");
    chooseFormats("de-DE");
    expect([formatChoice(), localStorage.getItem("tangency-formats")]).toEqual(["de-DE", "de-DE"]);
    expect(agoInWords(new Date(2031, 2, 12, 13, 5), now)).toBe("at 13:05");
    chooseFormats("");
    expect(localStorage.getItem("tangency-formats")).toBeNull();
    expect(agoInWords(new Date(2031, 2, 12, 13, 5), now)).toBe("at 1:05 PM");
  });

  it("are the British where a browser names no locale there is", () => {
    speaks("no locale at all");
    expect([writeNumber(4938.5, 1), dateInWords(new Date(2031, 2, 5), now)]).toEqual(["4,938.5", "5 March"]);
  });
});

/** Whatever stands between its digits: digits that everyone reads. */
function latin(text: string): RegExp {
  return new RegExp(`^\\D*${text.replace(/[^\d\w ]/g, "").replace(/(\d)/g, "$1\\D*")}`);
}
