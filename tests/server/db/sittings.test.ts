import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { type OpenDatabase, openDatabase } from "../../../server/db/client.ts";
import { lastEdits, noteEdits, sittingsOf } from "../../../server/db/queries/sittings.ts";
import { fillDatabase, STUDY } from "../../support/sync-server.ts";
import { temporaryFolder } from "../../support/temporary.ts";

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;

const START = Date.UTC(2031, 2, 4, 14, 0, 0);
const cell = (source: string) => ({ id: "base", name: "base", kind: "system", order: "a0", source });

/** Each edit: who, after how many seconds, the source before and after. */
function edit(userId: string | null, seconds: number, before: string | undefined, after: string | undefined) {
  noteEdits(
    open.db,
    STUDY,
    [
      {
        cellId: "base",
        ...(before !== undefined && { before: cell(before) }),
        ...(after !== undefined && { after: cell(after) }),
      },
    ],
    userId,
    new Date(START + seconds * 1000),
  );
}
const sittings = () =>
  sittingsOf(open.db, STUDY, { most: 100 }).map(({ people, before, next, startedAt, endedAt }) => ({
    people,
    before: before?.source,
    ...(next && { left: next.before?.source }),
    from: (startedAt.getTime() - START) / 1000,
    to: (endedAt.getTime() - START) / 1000,
  }));

beforeEach(() => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/history.sqlite`);
  fillDatabase(open);
});
afterEach(() => {
  open.close();
  folder.remove();
});

describe("sittings", () => {
  it("join what a person does in a cell without pausing for five minutes", () => {
    edit("ilse", 0, "a", "ab");
    edit("ilse", 299, "ab", "abc");
    edit("ilse", 599, "abc", "abcd");
    expect(sittings()).toEqual([
      { people: ["ilse"], before: "abc", from: 599, to: 599 },
      { people: ["ilse"], before: "a", left: "abc", from: 0, to: 299 },
    ]);
  });

  it("end after half an hour without a pause", () => {
    for (let minute = 0; minute <= 40; minute++) edit("ilse", 60 * minute, `${minute}`, `${minute + 1}`);
    expect(sittings().map(({ from, to }) => [from / 60, to / 60])).toEqual([
      [31, 40],
      [0, 30],
    ]);
  });

  it("part two people who edit one after the other, and join those who write in turns", () => {
    edit("ilse", 0, "", "i");
    edit("tomas", 20, "i", "it");
    edit("ilse", 100, "it", "iti");
    edit("tomas", 110, "iti", "itit");
    edit("ilse", 120, "itit", "ititi");
    edit("tomas", 130, "ititi", "ititit");
    expect(sittings()).toEqual([
      { people: ["tomas", "ilse"], before: "iti", from: 110, to: 130 },
      { people: ["ilse"], before: "it", left: "iti", from: 100, to: 100 },
      { people: ["tomas"], before: "i", left: "it", from: 20, to: 20 },
      { people: ["ilse"], before: "", left: "i", from: 0, to: 0 },
    ]);
  });

  it("begin anew where a cell is added or removed, so that what was removed can be looked at", () => {
    edit("ilse", 0, undefined, "x");
    edit("ilse", 1, "x", "xy");
    edit("ilse", 2, "xy", undefined);
    edit("ilse", 3, undefined, "xy");
    expect(sittings()).toEqual([
      { people: ["ilse"], before: undefined, from: 3, to: 3 },
      { people: ["ilse"], before: "xy", left: undefined, from: 2, to: 2 },
      { people: ["ilse"], before: undefined, left: "xy", from: 0, to: 1 },
    ]);
  });

  it("tell the program's own writes apart, and who wrote last", () => {
    edit(null, 0, undefined, "x");
    edit("ilse", 1, "x", "xy");
    expect(sittings().map(({ people }) => people)).toEqual([["ilse"], []]);
    expect(lastEdits(open.db, STUDY).get("base")).toEqual({ by: "ilse", at: new Date(START + 1000) });
  });

  it("are found by cell, by person and from a place on", () => {
    edit("ilse", 0, undefined, "x");
    edit("tomas", 9, "x", "xy");
    noteEdits(open.db, STUDY, [{ cellId: "other", after: cell("z") }], "tomas", new Date(START));
    const of = (which: object) => sittingsOf(open.db, STUDY, { most: 9, ...which }).map(({ cellId }) => cellId);
    expect(of({ cellId: "base" })).toEqual(["base", "base"]);
    expect(of({ userId: "tomas" })).toEqual(["other", "base"]);
    // No account's id is part of another's.
    expect(of({ userId: "toma" })).toEqual([]);
    const [newest] = sittingsOf(open.db, STUDY, { most: 1 });
    expect(of({ before: newest.id })).toEqual(["base", "base"]);
  });
});
