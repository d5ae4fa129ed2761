import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { cellDifference, stateDifferences } from "../../../shared/study/cell-differences.ts";
import { sourceDifferences } from "../../../shared/study/source-differences.ts";

/** [-struck-] and {+new+} within a line. */
const told = (before: string, after: string) =>
  sourceDifferences(before, after).map((line) =>
    line.map(({ kind, text }) => (kind === "same" ? text : kind === "struck" ? `[-${text}-]` : `{+${text}+}`)).join(""),
  );

describe("the differences of two sources", () => {
  test("strike the old value and put the new one beside it", () => {
    expect(told("data: survey\nform: la-aids\nestimator: sur\n", "data: survey\nform: aids\nestimator: sur\n")).toEqual(
      ["data: survey", "form: [-la-aids-]{+aids+}", "estimator: sur"],
    );
  });

  test("tell lines apart that came, went and stayed", () => {
    expect(told("a: 1\nb: 2\nc: 3\n", "a: 1\nc: 3\nd: [x, y]\n")).toEqual([
      "a: 1",
      "[-b: 2-]",
      "c: 3",
      "{+d: [x, y]+}",
    ]);
    expect(told("impose: [homogeneity]", "impose: [homogeneity, symmetry]")).toEqual([
      "impose: [homogeneity{+, symmetry+}]",
    ]);
    expect(told("", "a: 1\n")).toEqual(["{+a: 1+}"]);
  });

  test("hold both texts whole, whatever they are", () => {
    const text = fc.array(fc.constantFrom("a: 1", "b: la-aids", "", "  # note here", "c: [x, y]"), { maxLength: 12 });
    fc.assert(
      fc.property(text, text, (old, fresh) => {
        const lines = sourceDifferences(old.join("\n"), fresh.join("\n"));
        const without = (kind: string) =>
          lines
            .filter((line) => line.length === 0 || line.some((piece) => piece.kind !== kind))
            .map((line) => line.flatMap((piece) => (piece.kind === kind ? [] : piece.text)).join(""))
            .filter((line) => line !== "");
        expect(without("new")).toEqual(old.filter((line) => line !== ""));
        expect(without("struck")).toEqual(fresh.filter((line) => line !== ""));
      }),
      { numRuns: 300, seed: 4 },
    );
  });
});

const cell = (about: object = {}) => ({
  id: "b",
  name: "base",
  kind: "system",
  order: "b",
  source: "form: la-aids\n",
  ...about,
});

describe("what was done to a cell", () => {
  test.each([
    [undefined, cell(), { whole: "added", moved: false }],
    [cell(), undefined, { whole: "removed", moved: false }],
    [cell(), cell({ source: "form: aids\n" }), { moved: false, source: "form changed from la-aids to aids" }],
    [cell(), cell({ source: "# now\nform: la-aids\n" }), { moved: false, source: "comments or layout changed" }],
    [cell(), cell({ name: "first", order: "c" }), { renamedFrom: "base", moved: true }],
    [
      cell({ kind: "text", source: "so it" }),
      cell({ kind: "text", source: "so it is" }),
      { moved: false, source: "longer by 1 word" },
    ],
    [cell(), cell(), undefined],
  ])("%#", (before, after, difference) => {
    expect(cellDifference(before, after)).toEqual(difference);
  });

  test("is told of every cell of two states, in the order of the later", () => {
    const [a, b, c] = [cell({ id: "a", order: "a" }), cell(), cell({ id: "c", order: "c" })];
    const states = stateDifferences([a, b], [c, { ...b, source: "form: les\n" }]);
    expect(states.map(({ cellId, difference }) => [cellId, difference.whole ?? difference.source])).toEqual([
      ["b", "form changed from la-aids to les"],
      ["c", "added"],
      ["a", "removed"],
    ]);
  });
});
