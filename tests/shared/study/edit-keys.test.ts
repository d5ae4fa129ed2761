import { describe, expect, it } from "vitest";
import { moveKey, renameKey } from "../../../shared/study/edit-keys.ts";

const LINES = `upload: a.csv # ours
goods:
  # the first
  grains: {price: p1, quantity: q1} # by weight
  sweet drinks:
    price: p2
    quantity: q2
  # the last
  other: {price: p3, quantity: q3}
keep: members > 1
`;
const BRACES =
  "goods: {a: {price: p1, quantity: q1}, b: {price: p2, quantity: q2}, c: {price: p3, quantity: q3}} # all\n";

describe("a key of a map", () => {
  it("is renamed where it stands, comments and order kept", () => {
    expect(renameKey(LINES, ["goods", "sweet drinks"], "soft: drinks")).toBe(
      LINES.replace("sweet drinks:", '"soft: drinks":'),
    );
    expect(renameKey(BRACES, ["goods", "b"], "milk")).toBe(BRACES.replace("b: {", "milk: {"));
    expect(renameKey(LINES, ["goods", "none"], "x")).toBe(LINES);
  });

  it("moves with its lines and the comments above them", () => {
    expect(moveKey(LINES, ["goods", "other"], 0)).toBe(`upload: a.csv # ours
goods:
  # the last
  other: {price: p3, quantity: q3}
  # the first
  grains: {price: p1, quantity: q1} # by weight
  sweet drinks:
    price: p2
    quantity: q2
keep: members > 1
`);
    expect(moveKey(moveKey(LINES, ["goods", "other"], 0), ["goods", "other"], 2)).toBe(LINES);
    expect(moveKey(LINES, ["goods", "grains"], 0)).toBe(LINES);
    expect(moveKey(LINES, ["goods", "grains"], 3)).toBe(LINES);
  });

  it("moves within braces, and at the end of a text without a line end", () => {
    expect(moveKey(BRACES, ["goods", "a"], 2)).toBe(
      "goods: {b: {price: p2, quantity: q2}, c: {price: p3, quantity: q3}, a: {price: p1, quantity: q1}} # all\n",
    );
    expect(moveKey("goods:\n  a: {price: p}\n  b: {price: q}", ["goods", "b"], 0)).toBe(
      "goods:\n  b: {price: q}\n  a: {price: p}",
    );
  });
});
