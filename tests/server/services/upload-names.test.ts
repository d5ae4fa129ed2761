import { expect, test } from "vitest";
import { cellsReadingUpload, freeName, inMegabytes, plainName } from "../../../server/services/upload-names.ts";
import { LONGEST_SOURCE } from "../../../shared/study/document.ts";

const only = { name: "weeks.csv", version: 1 };
const reading = (cells: Parameters<typeof cellsReadingUpload>[0]) => cellsReadingUpload(cells, only, [only]);

test.each([
  ["weeks.csv", "weeks.csv"],
  ["C:\\survey\\weeks.csv", "weeks.csv"],
  ["../../etc/weeks.csv", "weeks.csv"],
  ["we\u0000eks\n.csv", "weeks.csv"],
  ["käufe 2024.csv", "käufe 2024.csv"],
  ["", "upload.csv"],
  ["folder/", "upload.csv"],
])("a file called %j is stored as %j", (given, plain) => {
  expect(plainName(given)).toBe(plain);
});

test.each([
  ["weeks.csv", [], "weeks.csv"],
  ["weeks.csv", ["weeks.csv"], "weeks (2).csv"],
  ["weeks.csv", ["weeks.csv", "weeks (2).csv"], "weeks (3).csv"],
  ["weeks", ["weeks"], "weeks (2)"],
  [".csv", [".csv"], ".csv (2)"],
])("%j beside %j becomes %j", (name, taken, free) => {
  expect(freeName(name, taken)).toBe(free);
});

test("a cell names an upload however far its writing has come", () => {
  const cell = (name: string, source: string, kind = "data") => ({ id: name, name, kind, order: "a", source });
  const cells = [
    cell("whole", "upload: weeks.csv\ngoods: {}"),
    cell("quoted", 'upload: "weeks.csv"'),
    cell("unfinished", "upload: weeks.csv\ngoods: {a: [1,"),
    cell("other", "upload: other.csv"),
    cell("said only", "# upload: weeks.csv"),
    cell("system", "upload: weeks.csv", "system"),
    cell("list", "- upload: weeks.csv"),
    cell("empty", ""),
  ];
  expect(reading(cells)).toEqual(["whole", "quoted", "unfinished"]);
});

test("a cell reads the latest version of an upload, unless it pins one", () => {
  const cell = (name: string, source: string) => ({ id: name, name, kind: "data", order: "a", source });
  const cells = [
    cell("latest", "upload: weeks.csv"),
    cell("pinned", "upload: weeks.csv\nversion: 1"),
    cell("both", "version: 2\nupload: weeks.csv"),
    cell("none of them", "upload: weeks.csv\nversion: 7"),
  ];
  const versions = [2, 1].map((version) => ({ name: "weeks.csv", version }));
  expect(versions.map((version) => cellsReadingUpload(cells, version, versions))).toEqual([
    ["latest", "both"],
    ["pinned"],
  ]);
});

test("of a source too long for a cell no more is read than a cell could have", () => {
  const cell = (source: string) => [{ id: "a", name: "a", kind: "data", order: "a", source }];
  const filler = `# ${"x".repeat(LONGEST_SOURCE)}\n`;
  expect(reading(cell(`upload: weeks.csv\n${filler}`))).toEqual(["a"]);
  expect(reading(cell(`${filler}upload: weeks.csv\n`))).toEqual([]);
});

test("sizes are told in megabytes", () => {
  expect([inMegabytes(100 * 1024 * 1024), inMegabytes(1.25 * 1024 * 1024)]).toEqual(["100 MB", "1.3 MB"]);
});
