import { describe, expect, it } from "vitest";
import type { CellStatus } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { standingsTold } from "../../../src/app/workspace/told.ts";

const source = (id: string, name: string, kind: string, text: string): CellSource => ({
  id,
  name,
  kind,
  order: id,
  source: text,
});
const CELLS = [
  source("a", "survey", "data", "upload: survey.csv\n"),
  source("b", "base", "system", "data: survey\nform: aids\n"),
  source("c", "matrix", "slutsky", "system: base\n"),
];
const READS: Readonly<Record<string, string[]>> = { a: [], b: ["survey"], c: ["base"] };
const print = (id: string) => id.repeat(64);

const told = (changes: Readonly<Record<string, Partial<CellStatus>>> = {}) => ({
  studyId: "s",
  cells: CELLS.map(({ id, name, kind, source: text }) => ({
    cellId: id,
    name,
    kind: kind as CellStatus["kind"],
    state: "current" as const,
    reads: READS[id],
    fingerprint: print(id),
    last: { fingerprint: print(id), source: text, at: "2031-03-12T13:52:00.000Z", tookMs: 40 },
    problems: [],
    ...changes[id],
  })),
});

const shown = (cells: readonly CellSource[], status = told()) =>
  Object.fromEntries(
    standingsTold(cells, status).map(({ cell, fingerprint, isUnread }) => [
      cell.name,
      isUnread ? "unread" : fingerprint,
    ]),
  );
const with_ = (id: string, change: Partial<CellSource>) =>
  CELLS.map((cell) => (cell.id === id ? { ...cell, ...change } : cell));

describe("before any text is read here", () => {
  it("a finding stands where the text is the very one it was found under, all the way up", () => {
    expect(shown(CELLS)).toEqual({ survey: print("a"), base: print("b"), matrix: print("c") });
    const [survey, base] = standingsTold(CELLS, told());
    expect([survey.readBy, base.readBy, base.reads]).toEqual([["base"], ["matrix"], ["survey"]]);
  });

  it("no finding stands under a text that differs, nor under anything that reads it", () => {
    expect(shown(with_("b", { source: "data: survey\nform: les\n" }))).toEqual({
      survey: print("a"),
      base: "unread",
      matrix: "unread",
    });
    expect(shown(with_("a", { source: "upload: other.csv\n" }))).toMatchObject({ base: "unread", matrix: "unread" });
  });

  it("nor where a cell goes by another name, is of another kind, or is gone", () => {
    expect(shown(with_("a", { name: "purchases" }))).toMatchObject({ purchases: "unread", base: "unread" });
    expect(shown(with_("b", { kind: "tests" }))).toMatchObject({ base: "unread", matrix: "unread" });
    expect(shown(CELLS.filter(({ id }) => id !== "a"))).toEqual({ base: "unread", matrix: "unread" });
  });

  it("nor where the last finding is not the one that answers, though its state is told", () => {
    const stale = told({ b: { state: "out of date", because: "survey changed" }, c: { state: "draft" } });
    expect(shown(CELLS, stale)).toEqual({ survey: print("a"), base: undefined, matrix: undefined });
    const other = { fingerprint: print("d"), source: CELLS[1].source, at: "2031-03-12T13:52:00.000Z", tookMs: 1 };
    expect(shown(CELLS, told({ b: { last: other } }))).toMatchObject({ base: "unread", matrix: "unread" });
  });

  it("what the server has not heard of, or found fault with, waits to be read", () => {
    expect(shown([...CELLS, source("d", "more", "system", "data: survey\n")])).toMatchObject({ more: "unread" });
    const faulty = told({ b: { state: "failed", problems: [{ sentence: "form names no form." }] } });
    expect(shown(CELLS, faulty)).toMatchObject({ base: "unread", matrix: "unread" });
    expect(new Set(Object.values(shown(CELLS, { studyId: "s", cells: [] })))).toEqual(new Set(["unread"]));
  });
});
