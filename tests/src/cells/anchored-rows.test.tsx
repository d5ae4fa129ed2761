import { render, screen } from "@testing-library/react";
import type { ReactNode } from "react";
import { describe, expect, it } from "vitest";
import { anchor as anchorSchema } from "../../../shared/schemas/remarks.ts";
import type { TestsFinding } from "../../../shared/schemas/tests.ts";
import { ElasticitiesBand } from "../../../src/cells/elasticities/band.tsx";
import { ElasticitiesOpen } from "../../../src/cells/elasticities/view.tsx";
import { TestsBand } from "../../../src/cells/tests/band.tsx";
import { TestsOpen } from "../../../src/cells/tests/view.tsx";
import { AnchorProvider } from "../../../src/components/anchor-mark.tsx";
import { placesOf } from "../../../src/features/remarks/places.ts";
import { exampleFindings } from "../../support/findings.ts";
import { berndtWoodHomogeneity } from "../../support/made-tests.ts";
import { sampleElasticities } from "../../support/sample-elasticities.ts";

const letter = { id: "r1", letter: "a", label: "Remark a by Tomás Adeyemi" };

function sampleTests(): TestsFinding {
  const equations = [{ good: "capital", sum: 0.02, standardError: 0.0085, t: 2.361, freedom: 20, pValue: 0.0285 }];
  const symmetry = { ...berndtWoodHomogeneity, hypothesis: "symmetry" as const, given: ["homogeneity" as const] };
  const pairs = { pairs: 52, directPairs: 40, rowsInvolved: 31, cycle: [12, 40] };
  const revealed = { rows: 338, ...pairs, index: 0.98714, periods: false, weighted: true };
  return { ...exampleFindings().tests, tests: [{ ...berndtWoodHomogeneity, equations }, symmetry], revealed };
}

/** The rows that can be spoken of in what is drawn; a remark on one has its letter there and nowhere else. */
function rowsOf(drawn: ReactNode, about: string): string[] {
  const { container } = render(
    <AnchorProvider value={{ at: new Map([[about, [letter]]]), follow: () => {} }}>{drawn}</AnchorProvider>,
  );
  const marks = [...container.querySelectorAll("[data-anchor]")].map((mark) => mark.getAttribute("data-anchor") ?? "");
  expect(marks.filter((mark, place) => marks.indexOf(mark) !== place)).toEqual([]);
  for (const mark of marks) expect(anchorSchema.safeParse(mark).success, mark).toBe(true);
  const head = screen.getByRole("link", { name: "Remark a by Tomás Adeyemi" }).closest("th");
  expect(head).toHaveAttribute("scope", "row");
  const places = placesOf(container, { id: "c", name: "c", kind: "tests", source: "" });
  return places.filter((place) => place.startsWith("row "));
}

describe("rows that can be spoken of", () => {
  it("are each hypothesis of tests, in the study and opened alike", () => {
    const finding = sampleTests();
    const band = rowsOf(<TestsBand finding={finding} />, "row Homogeneity");
    expect(band).toEqual(expect.arrayContaining(["row Homogeneity", "row Symmetry given homogeneity"]));
  });

  it("are in opened tests every table's", () => {
    const rows = rowsOf(<TestsOpen finding={sampleTests()} />, "row Afriat’s efficiency index");
    expect(rows).toEqual(
      expect.arrayContaining(["row Homogeneity", "row Capital, homogeneity", "row Rows that contradict another"]),
    );
  });

  it("are the goods of elasticities at one point, opened in every table", () => {
    expect(rowsOf(<ElasticitiesBand finding={sampleElasticities(1)} />, "row Meat")).toEqual([
      "row Grains",
      "row Dairy",
      "row Meat",
    ]);
  });

  it("are opened those of every table of the one group", () => {
    expect(rowsOf(<ElasticitiesOpen finding={sampleElasticities(1)} />, "row Meat, uncompensated")).toEqual(
      ["", ", uncompensated", ", among the goods"].flatMap((table) =>
        ["Grains", "Dairy", "Meat"].map((good) => `row ${good}${table}`),
      ),
    );
  });

  it("are the groups where there are several, and opened the goods of the one chosen", () => {
    const finding = sampleElasticities(3);
    const groups = ["row Lowest third", "row Second third", "row Highest third"];
    expect(rowsOf(<ElasticitiesBand finding={finding} />, "row Lowest third")).toEqual(groups);
  });

  it("are opened by group and by good of the group set out", () => {
    const rows = rowsOf(<ElasticitiesOpen finding={sampleElasticities(3)} />, "row Dairy, lowest third");
    expect(rows.slice(0, 4)).toEqual([
      "row Lowest third",
      "row Second third",
      "row Highest third",
      "row Grains, lowest third",
    ]);
  });
});
