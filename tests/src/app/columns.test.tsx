import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it } from "vitest";
import { ColumnList } from "../../../src/app/workspace/column-list.tsx";
import { demographicsOn, usesOfColumns } from "../../../src/app/workspace/column-uses.ts";
import { studyCells, upload } from "../study-sources.ts";

const [{ source }] = studyCells();
const entries = () =>
  within(screen.getByRole("region", { name: "Columns, in the order of the file" })).getAllByRole("listitem");

describe("the columns of an upload", () => {
  it("stand in the order of the file with what each is used for", () => {
    const members = { ...upload.columns[4], histogram: [1, 0, 5], minimum: 1, maximum: 14, mean: 3.04159 };
    render(<ColumnList upload={{ ...upload, columns: [...upload.columns.slice(0, 4), members] }} source={source} />);
    expect(entries().map(({ textContent }) => textContent)).toEqual([
      "p_grainsprice of grains",
      "e_grainsexpenditure on grains",
      "p_dairyprice of dairy",
      "e_dairyexpenditure on dairy",
      "memberskeep",
    ]);
    expect(screen.getByRole("img", { name: "from 1 to 14, mean 3.042" })).toBeInTheDocument();
  });

  it("are folded away where they are many and nothing uses them", async () => {
    const many = Array.from({ length: 30 }, (_, place) => ({ ...upload.columns[0], name: `spare${place}` }));
    render(<ColumnList upload={{ ...upload, columns: [...many, ...upload.columns] }} source={source} />);
    expect(screen.getByText("5 of 35 used")).toBeInTheDocument();
    expect(entries()).toHaveLength(29);
    await userEvent.click(screen.getByRole("button", { name: "6 more, not used" }));
    expect(entries()).toHaveLength(35);
  });

  it("are demographics where a system on the cell says so", () => {
    const [, base] = studyCells();
    const cells = [
      { ...base, source: `${base.source}demographics: [members]\n` },
      { ...base, source: "data: other\ndemographics: [p_grains]\n" },
    ];
    expect(demographicsOn("survey", cells)).toEqual(["members"]);
    expect(usesOfColumns(source, ["members"], ["members"]).get("members")).toBe("keep and demographic");
  });

  it("are found in expressions by their whole name only", () => {
    const uses = usesOfColumns("derive: {log_size: log(members)}\nkeep: members_old > 1 and members <= 12\n", [
      "members",
      "member",
      "members_old",
    ]);
    expect([...uses]).toEqual([
      ["members", "log_size and keep"],
      ["members_old", "keep"],
    ]);
  });
});
