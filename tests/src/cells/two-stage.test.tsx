import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { sourceInALine } from "../../../src/app/workspace/cell-words.ts";
import { ElasticitiesForm } from "../../../src/cells/elasticities/form.tsx";
import { SystemForm } from "../../../src/cells/system/form.tsx";
import { sampleTwoStage } from "../../support/sample-two-stage.ts";
import { TREE_GOODS } from "../../support/utility-tree-csv.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const { Band, Open } = CELL_PARTS.elasticities;
const rowsOf = (table: HTMLElement) =>
  within(table)
    .getAllByRole("row")
    .slice(1)
    .map((row) => row.textContent);

describe("elasticities of two stages", () => {
  it("stand beside each other in the band, each under its label", () => {
    render(<Band finding={sampleTwoStage()} />);
    expect(screen.getByText(/^Unconditionally, by Carpentier and Guyomard \(2001\)/)).toBeInTheDocument();
    const table = screen.getByRole("group", {
      name: /^Elasticities conditional on food expenditure and unconditional/,
    });
    expect(rowsOf(table)[2]).toBe("Meat0.20001.400(0.010)0.700(0.010)−1.200(0.020)−0.600(0.030)necessity");
    expect(screen.getByText(/taken to move with the prices of its goods/)).toBeInTheDocument();
  });

  it("are set out unconditional first, and conditional under their label when asked", async () => {
    render(<Open finding={sampleTwoStage()} />);
    expect(screen.getByRole("heading", { name: "Unconditional, at the sample mean" })).toBeInTheDocument();
    expect(rowsOf(screen.getByRole("group", { name: "Unconditional elasticities at the sample mean" }))[2]).toMatch(
      /^Meat0\.08000\.700/,
    );
    await userEvent.click(screen.getByRole("button", { name: "Conditional" }));
    expect(
      screen.getByRole("heading", { name: "Conditional on food expenditure, at the sample mean" }),
    ).toBeInTheDocument();
    const own = screen.getByRole("group", { name: "Elasticities at the sample mean, conditional on food expenditure" });
    expect(rowsOf(own)[2]).toMatch(/^Meat0\.20001\.400/);
    expect(screen.getByText(/does to the good of the row, food expenditure held\./)).toBeInTheDocument();
  });

  it("show the group as a good of the broader system, and other prices", async () => {
    render(<Open finding={sampleTwoStage()} />);
    const group = screen.getByRole("group", { name: "Food as one good of the broader system" });
    expect(rowsOf(group)).toEqual(["Food0.40000.500(0.020)−0.600(0.030)−0.400(0.030)"]);
    const switches = screen.getByRole("group", { name: "Which elasticities to other prices" });
    await userEvent.click(within(switches).getByRole("button", { name: "Compensated" }));
    const others = screen.getByRole("group", {
      name: "Unconditional compensated elasticities with respect to other prices",
    });
    expect(rowsOf(others)[0]).toBe("Grains−0.075(0.030)0.100(0.030)");
  });
});

const cells: CellSource[] = (
  [
    ["plates", "data", `upload: tree.csv\n${TREE_GOODS.food}`],
    ["purse", "data", `upload: tree.csv\n${TREE_GOODS.budget}`],
    ["food", "system", "data: plates\nform: les\nconditional on: food\n"],
    ["budget", "system", "data: purse\nform: les\n"],
  ] as const
).map(([name, kind, source], i) => ({ id: name, name, kind, source, order: String.fromCharCode(97 + i) }));

function Form({ source: first, of: Of }: { source: string; of: typeof ElasticitiesForm }) {
  const [source, setSource] = useState(first);
  return (
    <>
      <Of source={source} onChange={setSource} context={{ cells, uploads: [] }} readOnly={false} />
      <pre data-testid="source">{source}</pre>
    </>
  );
}
const written = () => screen.getByTestId("source").textContent;

describe("the form", () => {
  it("takes a broader system with the group its own system is conditional on, and lets go of groups", async () => {
    render(<Form of={ElasticitiesForm} source={"system: food\ngroups: {of: quarter} # quarters\n"} />);
    await userEvent.selectOptions(screen.getByLabelText("Within"), "budget");
    expect(written()).toBe("system: food\nwithin: budget\nas: food\n");
    await userEvent.selectOptions(screen.getByLabelText("As its good"), "rent");
    await userEvent.click(screen.getByRole("radio", { name: /^Edgerton/ }));
    expect(written()).toBe("system: food\nwithin: budget\nas: rent\nunconditional: edgerton\n");
    await userEvent.selectOptions(screen.getByLabelText("Within"), "");
    expect(written()).toBe("system: food\n");
  });

  it("says of a system which group its total is of", async () => {
    render(<Form of={SystemForm} source={"data: purse\nform: les\n"} />);
    await userEvent.type(screen.getByLabelText("Conditional on"), "household goods{Enter}");
    expect(written()).toBe("data: purse\nform: les\nconditional on: household goods\n");
  });

  it("in one line where there is no room for the source", () => {
    expect(sourceInALine("elasticities", "system: food\nwithin: budget\nas: food\n")).toBe(
      "food as food within budget at mean",
    );
    expect(sourceInALine("system", "data: plates\nform: les\nconditional on: food\n")).toBe(
      "les on plates; conditional on food",
    );
  });
});
