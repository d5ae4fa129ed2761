import { describe, expect, it } from "vitest";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { cellStatuses } from "../../../shared/study/states.ts";
import { latestUploads, uploadRead, versionChange, versionInWords } from "../../../shared/study/uploads.ts";

const columns = ["p1", "q1", "p2", "q2"].map((name) => ({ name, type: "number" as const }));
const version = (number: number) => ({
  name: "weeks.csv",
  version: number,
  sha256: `${number}`.repeat(64),
  columns,
  rows: 10,
});
const uploads = [version(1), version(3), version(2), { ...version(1), name: "other.csv" }];

describe("versions of an upload", () => {
  it("the latest is read unless one is named", () => {
    expect(uploadRead(uploads, { upload: "weeks.csv" })?.version).toBe(3);
    expect(uploadRead(uploads, { upload: "weeks.csv", version: 2 })?.version).toBe(2);
    expect(uploadRead(uploads, { upload: "weeks.csv", version: 9 })).toBeUndefined();
    expect(uploadRead(uploads, { upload: "none" })).toBeUndefined();
    // A file of the command line has no versions.
    expect(uploadRead([{ name: "weeks.csv" }], { upload: "weeks.csv", version: 2 })).toBeDefined();
    expect(latestUploads(uploads).map(({ name, version: number }) => `${name} ${number}`)).toEqual([
      "weeks.csv 3",
      "other.csv 1",
    ]);
    expect(versionInWords(uploads, uploads[1])).toBe("version 3 of weeks.csv");
    expect(versionInWords(uploads, uploads[3])).toBe("other.csv");
  });

  it("what one changed is told in words", () => {
    const before = { rows: 10, columns };
    expect(versionChange(before, { rows: 14, columns })).toBe("4 rows more, the same columns");
    const now = [
      ...columns.slice(1, 3),
      { name: "q2", type: "text" as const },
      { name: "age", type: "number" as const },
    ];
    expect(versionChange(before, { rows: 10, columns: now })).toBe(
      "as many rows; new column: age; gone: p1; now text: q2",
    );
  });
});

const cell = (name: string, kind: string, source: string) => ({ id: name, name, kind, order: name, source });
const source = (pin = "") =>
  `upload: weeks.csv\n${pin}goods: {a: {price: p1, quantity: q1}, b: {price: p2, quantity: q2}}\n`;
const cells = (pin?: string) => [cell("a", "data", source(pin)), cell("b", "system", "data: a\nform: aids\n")];
const prints = (pin: string | undefined, known: typeof uploads) =>
  fingerprintCells(resolveCells(cells(pin), known), known);

describe("a cell and the version it reads", () => {
  it("asks something else once the upload has a new one, unless it pins the old", () => {
    const [one, two] = [uploads.slice(0, 1), [version(1), version(2)]];
    expect(prints(undefined, two)).not.toEqual(prints(undefined, one));
    expect(prints("version: 1\n", two)).toEqual(prints(undefined, one));
    expect(prints("version: 2\n", two)).toEqual(prints(undefined, two));
  });

  it("is told of a version that is not there at its place, with the latest", () => {
    const [{ problems }] = resolveCells(cells("version: 7\n"), uploads);
    expect(problems).toMatchObject([
      {
        sentence: "weeks.csv has no version 7. It has the versions 1, 2 and 3.",
        key: ["version"],
        nearest: "3",
        place: { line: 2 },
      },
    ]);
  });

  it("is out of date for the upload that took another's place", () => {
    const resolved = resolveCells(cells(), uploads);
    const last = new Map(
      resolved.map(({ id, source: asked }) => [
        id,
        { fingerprint: "0".repeat(64), source: asked, at: "2032-01-01T00:00:00Z", tookMs: 1 },
      ]),
    );
    const none = new Map();
    const replaced = new Map(resolved.map(({ id }) => [id, "version 3 of weeks.csv"]));
    const parts = {
      cells: resolved,
      fingerprints: prints(undefined, uploads),
      found: new Set<string>(),
      running: none,
      failed: none,
      stopped: none,
      last,
      aboutMs: none,
    };
    const because = (changed: typeof replaced | undefined) =>
      cellStatuses({ ...parts, replaced: changed }).map((status) => status.because);
    expect(because(replaced)).toEqual([
      "upload replaced by version 3 of weeks.csv",
      "upload replaced by version 3 of weeks.csv",
    ]);
    expect(because(undefined)).toEqual(["its upload changed", "a changed"]);
  });
});
