import { describe, expect, test } from "vitest";
import { parseStudyFile } from "../../../shared/study/study-file.ts";
import { writeStudyFile } from "../../../shared/study/write-study-file.ts";

const SURVEY =
  "upload: purchases.csv\n# what is bought\ngoods:\n  meat & fish: {price: p1, expenditure: x1}\n  grains:\n    price: p2\n    expenditure: x2\n\ntotal: sum\n";
const BASE = "data: survey\nform: quaids   # quadratic\n";
const cells = [
  { name: "survey", kind: "data", source: SURVEY },
  { name: "base 2", kind: "system", source: BASE },
];

describe("a study file", () => {
  test("gives back title, lede and every source with its comments", () => {
    const file = parseStudyFile(writeStudyFile({ title: 'A levy: "sweet" drinks', lede: "Who pays? - nobody", cells }));
    expect(file.problems).toEqual([]);
    expect([file.title, file.lede]).toEqual(['A levy: "sweet" drinks', "Who pays? - nobody"]);
    expect(file.cells.map(({ name, kind, source }) => ({ name, kind, source }))).toEqual(cells);
  });

  test("stays readable around a cell that is not, whose words stand as comments", () => {
    const broken = { name: "broken", kind: "system", source: "form: [aids\nimpose: }\n" };
    const text = writeStudyFile({ title: "T", lede: "", cells: [broken, ...cells] });
    const file = parseStudyFile(text);
    expect(file.problems).toEqual([]);
    expect(file.cells.map(({ name }) => name)).toEqual(["broken", "survey", "base 2"]);
    expect(text).toContain("    # form: [aids\n    # impose: }\n");
  });

  test.each(["", "\n", "# nothing yet\n", "- a list\n", "{data: survey}\n", "--- \nform: aids\n"])(
    "takes the source %j without losing the cells after it",
    (source) => {
      const text = writeStudyFile({
        title: "T",
        lede: "",
        cells: [{ name: "first", kind: "system", source }, ...cells],
      });
      const file = parseStudyFile(text);
      expect(file.problems).toEqual([]);
      expect(file.cells.map(({ name }) => name)).toEqual(["first", "survey", "base 2"]);
      expect(file.cells[1].source).toBe(SURVEY);
    },
  );
});
