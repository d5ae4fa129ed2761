import { describe, expect, it } from "vitest";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellStatus } from "../../../shared/schemas/status.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { freshName, freshSource, nameOfCopy, sourceInALine } from "../../../src/app/workspace/cell-words.ts";
import { nameFault } from "../../../src/app/workspace/name-fault.ts";
import { mended } from "../../../src/app/workspace/problem-list.tsx";
import { standingsOf } from "../../../src/app/workspace/reading.ts";
import { sourcesAfterRenaming } from "../../../src/app/workspace/rename.ts";
import { type Standing, waitingToBeAsked } from "../../../src/app/workspace/standing.ts";
import { stateDetail } from "../../../src/app/workspace/state-line.tsx";
import { studyCells, upload } from "../study-sources.ts";

const resolved = (cells: readonly CellSource[]) => resolveCells(cells, [upload]);
const fingerprints = (cells: readonly CellSource[]) => fingerprintCells(resolved(cells), [upload]);

/** What the server says of cells whose findings all stand. */
function allCurrent(cells: readonly CellSource[]): CellStatus[] {
  const found = fingerprints(cells);
  return resolved(cells).map(({ id, name, kind, reads, source }) => ({
    cellId: id,
    name,
    kind,
    reads,
    state: "current" as const,
    fingerprint: found.get(id)!,
    last: { fingerprint: found.get(id)!, source, at: "2031-03-12T13:52:00.000Z", tookMs: 1600 },
    problems: [],
  }));
}

/** Standings of the cells as they are here, of which the server knows them as they were. */
function standings(here: readonly CellSource[], told = allCurrent(studyCells())): Record<string, Standing> {
  const all = standingsOf(here, resolved(here), fingerprints(here), { studyId: "s", cells: told });
  return Object.fromEntries(all.map((standing) => [standing.cell.name, standing]));
}

const change = (id: string, source: string) =>
  studyCells().map((cell) => (cell.id === id ? { ...cell, source } : cell));

describe("where a cell stands", () => {
  it("is as the server says while the document is as the server knows it", () => {
    const { survey, base, matrix } = standings(studyCells());
    expect([survey, base, matrix].map(({ state }) => state)).toEqual(["current", "current", "current"]);
    expect(base.fingerprint).toBe(fingerprints(studyCells()).get("b"));
    expect(survey.readBy).toEqual(["base"]);
  });

  it("is out of date as soon as the question changes here, for the cell and all that read it", () => {
    const { survey, base, matrix } = standings(change("b", "data: survey\nform: les\n"));
    expect(survey.state).toBe("current");
    expect(base).toMatchObject({
      state: "out of date",
      because: expect.stringContaining("form changed from aids to les"),
    });
    expect(matrix).toMatchObject({ state: "out of date", because: "base changed" });
    expect([base.fingerprint, matrix.fingerprint]).toEqual([undefined, undefined]);
  });

  it("stays current when only the wording changes: a comment, the order of keys, a name", () => {
    const reworded = "# as in the paper\nform: aids\nimpose: [symmetry, homogeneity]\ndata: survey\n";
    expect(standings(change("b", reworded)).base.state).toBe("current");
    const renamed = studyCells().map((cell) =>
      cell.id === "b"
        ? { ...cell, name: "exact" }
        : cell.id === "m"
          ? { ...cell, source: "system: exact\nat: {x: quantile 0.9}\n" }
          : cell,
    );
    expect(standings(renamed).matrix.state).toBe("current");
  });

  it("is failed while the text here cannot be read, whatever the server still says", () => {
    const { base, matrix } = standings(change("b", "data: survey\nform: aidz\n"));
    expect(base).toMatchObject({ state: "failed", problems: [{ nearest: "aids" }] });
    expect(base.fingerprint).toBeUndefined();
    expect(matrix.fingerprint).toBeUndefined();
    expect(mended(base.cell.source, base.problems[0])).toBe("data: survey\nform: aids\n");
  });

  it("is a draft without a file, and a draft before the server has heard of it", () => {
    const empty = { id: "x", name: "more", kind: "data", order: "z", source: "" };
    const fresh = { id: "y", name: "second", kind: "system", order: "zz", source: "data: survey\nform: les\n" };
    const all = standings([...studyCells(), empty, fresh]);
    expect(all.more).toMatchObject({ state: "draft", because: "waits for a file", problems: [] });
    expect(all.second.state).toBe("draft");
  });

  it("counts what waits to be asked, and about how long it will take", () => {
    const told = allCurrent(studyCells()).map((one) =>
      one.name === "base" ? { ...one, state: "out of date" as const, because: "form changed", aboutMs: 21_000 } : one,
    );
    const all = standings(studyCells(), told);
    expect(waitingToBeAsked(Object.values(all))).toMatchObject({ count: 1, aboutMs: 21_000 });
    expect(stateDetail(all.base)).toBe("form changed");
    expect(stateDetail({ ...all.base, state: "draft", because: undefined })).toBe("never estimated; about 20 s");
  });
});

describe("words and names of cells", () => {
  it("calls a copy by the next number that is free, within the longest name there may be", () => {
    const cells = ["base", "base 2", "x 9"].map((name) => ({ name }));
    expect(["base", "base 2", "x 9", "matrix"].map((name) => nameOfCopy(name, cells))).toEqual([
      "base 3",
      "base 3",
      "x 10",
      "matrix 2",
    ]);
    expect(nameOfCopy("a".repeat(60), [])).toBe(`${"a".repeat(58)} 2`);
  });

  it("puts a source into one line", () => {
    const [survey, base, matrix] = studyCells();
    expect(sourceInALine(survey.kind, survey.source)).toBe("purchases-2031.csv, 2 goods, members <= 12");
    expect(sourceInALine(base.kind, base.source)).toBe("aids on survey; homogeneity, symmetry");
    expect(sourceInALine(matrix.kind, matrix.source)).toBe("base at x: quantile 0.9; share form");
  });

  it("asks the plainest question of the last cell it can read, under a free name", () => {
    expect(freshName("slutsky", studyCells())).toBe("matrix 2");
    expect(freshSource("slutsky", studyCells(), [])).toBe("system: base\nat: base point\nform: share\n");
    const other: Upload = { ...upload, name: "other.csv" };
    expect(freshSource("data", studyCells(), [upload, other])).toContain("upload: other.csv");
    expect(freshSource("data", studyCells(), [upload])).toBe("");
    // The newest version says which columns there are, wherever it stands in the list.
    const [p, e] = ["p_bread", "e_bread"].map((name) => ({ ...upload.columns[0], name }));
    const versions = [
      { ...other, id: "2", version: 2, columns: [p, e] },
      { ...other, id: "1", version: 1, columns: upload.columns },
    ];
    expect(freshSource("data", studyCells(), versions)).toMatch(/^upload: other\.csv\n.*bread: \{price: p_bread/s);
    expect(freshSource("data", studyCells(), versions)).not.toContain("grains");
  });

  it("renames a cell in the sources that read it, and leaves the rest of their text alone", () => {
    const cells = change("m", "system: base # the one in the paper\nat: mean\n");
    const changed = sourcesAfterRenaming("base", "exact aids", cells);
    expect([...changed]).toEqual([["m", "system: exact aids # the one in the paper\nat: mean\n"]]);
    expect(nameFault("survey", cells[1], cells)).toBe("Another cell is called survey already.");
    expect(nameFault("2nd", cells[1], cells)).toMatch(/begins with a letter/);
    expect(nameFault("exact aids", cells[1], cells)).toBeUndefined();
  });
});
