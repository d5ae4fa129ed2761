import { describe, expect, it } from "vitest";
import * as Y from "yjs";
import { seededRandom } from "../../shared/numerics/random.ts";
import { addCell, listCells, moveCell, removeCell } from "../../src/sync/cells.ts";

/** Two people's documents of one study, with the same cells. */
function twoDocuments(names: readonly string[]): [Y.Doc, Y.Doc] {
  const [one, other] = [new Y.Doc(), new Y.Doc()];
  for (const name of names) addCell(one, { name, kind: "system", source: "" }, undefined);
  meet(one, other);
  return [one, other];
}

/** Each gets what the other has done meanwhile. */
function meet(one: Y.Doc, other: Y.Doc): void {
  const [ours, theirs] = [Y.encodeStateAsUpdate(one), Y.encodeStateAsUpdate(other)];
  Y.applyUpdate(one, theirs);
  Y.applyUpdate(other, ours);
}

const orderIn = (doc: Y.Doc) => listCells(doc).map(({ name }) => name);
const idIn = (doc: Y.Doc, name: string) => listCells(doc).find((cell) => cell.name === name)!.id;
const NAMES = ["survey", "base", "laws", "matrix", "linear"];

describe("two people put cells in another order at once", () => {
  it("and both orders hold where they move different cells", () => {
    const [one, other] = twoDocuments(NAMES);
    moveCell(one, idIn(one, "linear"), idIn(one, "survey"));
    moveCell(other, idIn(other, "laws"), idIn(other, "matrix"));
    meet(one, other);
    expect(orderIn(one)).toEqual(["survey", "linear", "base", "matrix", "laws"]);
    expect(orderIn(other)).toEqual(orderIn(one));
  });

  it("and one place holds, for both, where they move the same cell", () => {
    const [one, other] = twoDocuments(NAMES);
    moveCell(one, idIn(one, "matrix"), null);
    moveCell(other, idIn(other, "matrix"), idIn(other, "linear"));
    meet(one, other);
    expect(orderIn(one)).toEqual(orderIn(other));
    expect([0, 4]).toContain(orderIn(one).indexOf("matrix"));
    expect(orderIn(one).filter((name) => name !== "matrix")).toEqual(["survey", "base", "laws", "linear"]);
  });

  it("and cells put into one gap at once can be moved apart and between again", () => {
    const [one, other] = twoDocuments(NAMES);
    moveCell(one, idIn(one, "matrix"), idIn(one, "survey"));
    moveCell(other, idIn(other, "linear"), idIn(other, "survey"));
    meet(one, other);
    expect(orderIn(one)).toEqual(orderIn(other));
    expect(new Set(orderIn(one).slice(1, 3))).toEqual(new Set(["matrix", "linear"]));
    const [, second, third] = orderIn(one);
    moveCell(one, idIn(one, second), idIn(one, third));
    meet(one, other);
    expect(orderIn(one).indexOf(second)).toBeGreaterThan(orderIn(one).indexOf(third));
    expect(orderIn(other)).toEqual(orderIn(one));
  });

  it("and a cell removed by one stays removed though the other moves it", () => {
    const [one, other] = twoDocuments(NAMES);
    removeCell(one, idIn(one, "laws"));
    moveCell(other, idIn(other, "laws"), null);
    meet(one, other);
    expect(orderIn(one)).toEqual(["survey", "base", "matrix", "linear"]);
    expect(orderIn(other)).toEqual(orderIn(one));
  });

  it("over and over: every cell is there once, in one order for both", () => {
    for (let seed = 1; seed <= 40; seed++) {
      const random = seededRandom(seed);
      const pick = <T>(from: readonly T[]): T => from[random.integer(from.length)];
      const docs = twoDocuments(NAMES);
      for (let round = 0; round < 6; round++) {
        for (const doc of docs) {
          const cells = listCells(doc);
          const moved = pick(cells);
          const after = pick([null, ...cells.filter(({ id }) => id !== moved.id).map(({ id }) => id)]);
          moveCell(doc, moved.id, after);
        }
        if (random.uniform() < 0.6) meet(...docs);
      }
      meet(...docs);
      expect(orderIn(docs[0]).toSorted()).toEqual(NAMES.toSorted());
      expect(orderIn(docs[1])).toEqual(orderIn(docs[0]));
    }
  });
});
