import { expect, test } from "vitest";
import { cellsNamingUpload, freeName, inMegabytes, plainName } from "../../../server/services/upload-names.ts";
import { LONGEST_SOURCE } from "../../../shared/study/document.ts";

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
  expect(cellsNamingUpload(cells, "weeks.csv")).toEqual(["whole", "quoted", "unfinished"]);
});

test("of a source too long for a cell no more is read than a cell could have", () => {
  const cell = (source: string) => [{ id: "a", name: "a", kind: "data", order: "a", source }];
  const filler = `# ${"x".repeat(LONGEST_SOURCE)}\n`;
  expect(cellsNamingUpload(cell(`upload: weeks.csv\n${filler}`), "weeks.csv")).toEqual(["a"]);
  expect(cellsNamingUpload(cell(`${filler}upload: weeks.csv\n`), "weeks.csv")).toEqual([]);
});

test("sizes are told in megabytes", () => {
  expect([inMegabytes(100 * 1024 * 1024), inMegabytes(1.25 * 1024 * 1024)]).toEqual(["100 MB", "1.3 MB"]);
});
