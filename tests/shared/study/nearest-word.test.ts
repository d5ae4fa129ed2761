import { describe, expect, it } from "vitest";
import { editDistance, nearestWord } from "../../../shared/study/nearest-word.ts";

describe("editDistance", () => {
  it.each([
    ["", "", 0],
    ["aid", "aids", 1],
    ["urbn", "urban", 1],
    ["from", "form", 1],
    ["kitten", "sitting", 3],
    ["", "abc", 3],
    ["ca", "abc", 3],
  ])("%s to %s is %i", (left, right, distance) => {
    expect(editDistance(left, right)).toBe(distance);
    expect(editDistance(right, left)).toBe(distance);
  });
});

describe("nearestWord", () => {
  const forms = ["la-aids", "aids", "les"];
  it.each([
    ["aid", "aids"],
    ["AIDS", "aids"],
    ["laaids", "la-aids"],
    ["la_aids", "la-aids"],
    ["lse", "les"],
    ["translog", undefined],
    ["", undefined],
    ["x", undefined],
  ])("offers for %s %s", (word, nearest) => {
    expect(nearestWord(word, forms)).toBe(nearest);
  });

  it("offers the one word that begins as written", () => {
    expect(nearestWord("maximum", ["least squares", "maximum likelihood"])).toBe("maximum likelihood");
    expect(nearestWord("price", ["price_grain", "price_dairy"])).toBeUndefined();
  });

  it("takes the first of two as near", () => {
    expect(nearestWord("p3", ["p1", "p2"])).toBe("p1");
  });
});
