import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { between, betweenCells, inOrder, spread } from "../../../shared/study/order.ts";
import { sortByReading } from "../../../shared/study/topology.ts";

describe("between", () => {
  it("finds a key in every gap, however often the same gap is halved", () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.nat(), fc.boolean()), { maxLength: 60 }), (moves) => {
        const keys = [between()];
        for (const [where] of moves) {
          const gap = where % (keys.length + 1);
          const key = between(keys[gap - 1], keys[gap]);
          keys.splice(gap, 0, key);
        }
        expect(keys.toSorted()).toEqual(keys);
        expect(new Set(keys).size).toBe(keys.length);
      }),
    );
  });

  it("stays short at the ends and goes on in the smallest gap", () => {
    let low = between();
    let high = between(low);
    for (let i = 0; i < 500; i++) {
      const key = between(low, high);
      expect(low < key && key < high).toBe(true);
      if (i % 2) low = key;
      else high = key;
    }
    let last = between();
    for (let i = 0; i < 100; i++) last = between(last);
    expect(last.length).toBeLessThan(30);
  });

  it("refuses bounds that are not in order", () => {
    expect(() => between("V", "A")).toThrow("order key V does not come before A");
    expect(() => between("V", "V")).toThrow(RangeError);
  });
});

describe("cells in order", () => {
  it("are parted by their ids when two people moved them into one gap", () => {
    const cells = [
      { id: "b", order: "V" },
      { id: "a", order: "V" },
      { id: "c", order: "A" },
    ];
    expect(inOrder(cells).map(({ id }) => id)).toEqual(["c", "a", "b"]);
    expect(betweenCells(cells[1], cells[0]) > "V").toBe(true);
  });

  it.each([0, 1, 3, 61, 62, 500])("spread gives %i ascending keys", (count) => {
    const keys = spread(count);
    expect(new Set(keys).size).toBe(count);
    expect(keys.toSorted()).toEqual(keys);
    keys.forEach((key, i) => {
      if (i > 0) expect(between(keys[i - 1], key) > keys[i - 1]).toBe(true);
    });
  });
});

describe("sortByReading", () => {
  const graph = (edges: Record<string, string[]>) => sortByReading(new Map(Object.entries(edges)));
  it("puts what is read first, and keeps the given order otherwise", () => {
    expect(graph({ m: ["b"], b: ["s"], x: [], s: [] }).order).toEqual(
      ["x", "s", "m", "b"].toSorted((p, q) => ["x", "s", "b", "m"].indexOf(p) - ["x", "s", "b", "m"].indexOf(q)),
    );
    expect(graph({ a: ["gone"] }).order).toEqual(["a"]);
  });
  it("names each cycle once and what hangs on it", () => {
    const { cycles, stuck, order } = graph({ a: ["b"], b: ["c"], c: ["a"], d: ["a"], e: [], f: ["f"] });
    expect(cycles).toEqual([["a", "b", "c"], ["f"]]);
    expect([...stuck]).toEqual(["a", "b", "c", "d", "f"]);
    expect(order).toEqual(["e"]);
  });
});
