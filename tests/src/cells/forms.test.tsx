import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { DataForm } from "../../../src/cells/data/form.tsx";
import { SlutskyForm } from "../../../src/cells/slutsky/form.tsx";
import { SystemForm } from "../../../src/cells/system/form.tsx";
import type { FormProps } from "../../../src/cells/types.ts";
import { exampleUpload } from "../../support/example-upload.ts";

const DATA = `upload: purchases.csv # the survey of 2031
goods:
  # staples first
  grains: {price: p_grains, expenditure: e_grains}
  dairy: {price: p_dairy, quantity: q_dairy}
weight: survey_weight
# large households are too few
keep: members <= 12
`;
const SYSTEM = `data: survey # the only one
form: la-aids
index: stone
# theory first
impose: [homogeneity]
demographics: [members]
`;
const MATRIX = `system: base
# the referees ask about the top
at: {x: quantile 0.9}
form: share
`;
const names = [
  "village",
  "survey_weight",
  "members",
  "p_grains",
  "e_grains",
  "q_grains",
  "p_dairy",
  "e_dairy",
  "q_dairy",
];
const upload = exampleUpload(names);
const cell = (name: string, kind: string, source: string): CellSource => ({
  id: name,
  name,
  kind,
  order: name,
  source,
});
const cells = [cell("survey", "data", DATA), cell("base", "system", SYSTEM), cell("matrix", "slutsky", MATRIX)];

function open(Form: (props: FormProps) => React.ReactNode, initial: string, readOnly = false) {
  const written = { source: initial };
  function Page() {
    const [source, setSource] = useState(initial);
    written.source = source;
    return <Form source={source} onChange={setSource} readOnly={readOnly} context={{ cells, uploads: [upload] }} />;
  }
  render(<Page />);
  return { user: userEvent.setup(), written };
}
const specification = (kind: string, source: string) => parseCell(kind, source).specification;

describe("the form of a data cell", () => {
  it("writes a role into the text and leaves comments and order alone", async () => {
    const { user, written } = open(DataForm, DATA);
    const cluster = screen.getByRole("combobox", { name: "Cluster" });
    await user.click(cluster);
    await user.click(await screen.findByRole("option", { name: /^village/ }));
    expect(written.source).toBe(`${DATA}cluster: village\n`);
    await user.click(cluster);
    await user.click(await screen.findByRole("option", { name: "none" }));
    expect(written.source).toBe(DATA);
  });

  it("writes words when the field is left or Enter pressed, and gives them up with Escape", async () => {
    const { user, written } = open(DataForm, DATA);
    const keep = screen.getByRole("textbox", { name: "Keep" });
    await user.clear(keep);
    await user.type(keep, "members <= 10");
    expect(written.source).toBe(DATA);
    await user.keyboard("{Escape}");
    expect(keep).toHaveValue("members <= 12");
    await user.clear(keep);
    await user.type(keep, "members <= 10{Enter}");
    expect(written.source).toBe(DATA.replace("members <= 12", "members <= 10"));
  });

  it("offers numeric columns only where numbers are needed", async () => {
    const { user } = open(DataForm, DATA);
    await user.click(screen.getByRole("combobox", { name: "Weight" }));
    expect(await screen.findByRole("option", { name: /^members/ })).toBeInTheDocument();
    expect(screen.queryByRole("option", { name: /^village/ })).not.toBeInTheDocument();
    await user.click(screen.getByRole("combobox", { name: "Cluster" }));
    expect(await screen.findByRole("option", { name: /^village text, 50 values/ })).toBeInTheDocument();
  });

  it("lets the third column of a good give way to the one chosen", async () => {
    const { user, written } = open(DataForm, DATA);
    await user.click(screen.getByText(/two, by/));
    const quantity = screen.getByRole("combobox", { name: "Quantity of grains" });
    expect(quantity).toHaveAttribute("placeholder", "expenditure ÷ price");
    await user.type(quantity, "q_gr{Enter}");
    expect(specification("data", written.source)).toMatchObject({
      goods: { grains: { price: "p_grains", quantity: "q_grains" }, dairy: { price: "p_dairy", quantity: "q_dairy" } },
    });
    expect(written.source).toContain("# staples first");
  });

  it("adds and removes goods, and refuses a name that is there", async () => {
    const { user, written } = open(DataForm, DATA);
    await user.click(screen.getByText(/two, by/));
    const adder = screen.getByRole("textbox", { name: "Name of a good to add" });
    await user.type(adder, "dairy{Enter}");
    expect(screen.getByText("There is a good called dairy already.")).toBeInTheDocument();
    await user.type(adder, "sweet drinks{Enter}");
    expect(written.source).toContain("sweet drinks: {}");
    await user.click(screen.getByRole("button", { name: "Remove sweet drinks" }));
    expect(written.source).toBe(DATA);
  });

  it("derives a column and forgets it again", async () => {
    const { user, written } = open(DataForm, DATA);
    await user.type(screen.getByRole("textbox", { name: "Name of a column to derive" }), "log_size");
    await user.type(screen.getByRole("textbox", { name: "Expression of log_size" }), "log(members){Enter}");
    expect(specification("data", written.source)).toMatchObject({ derive: { log_size: "log(members)" } });
    await user.clear(screen.getByRole("textbox", { name: "Expression of log_size" }));
    await user.keyboard("{Enter}");
    expect(written.source).toBe(DATA);
  });

  it("takes the goods that the columns' names suggest", async () => {
    const { user, written } = open(DataForm, "upload: purchases.csv\n");
    await user.click(screen.getByRole("button", { name: "Take them over" }));
    expect(specification("data", written.source)).toMatchObject({
      goods: { grains: { price: "p_grains", expenditure: "e_grains" } },
    });
  });

  it("keeps a column that is not there in sight, and says so", () => {
    open(DataForm, DATA.replace("survey_weight", "survey_wait"));
    expect(screen.getByRole("combobox", { name: "Weight" })).toHaveValue("survey_wait, not known here");
  });

  it("says that a text which cannot be read must be mended as text", () => {
    open(DataForm, "upload: [");
    expect(screen.getByText(/Mend it under Text/)).toBeInTheDocument();
  });

  it("shows a reader words instead of controls", () => {
    open(DataForm, DATA, true);
    expect(screen.queryByRole("combobox")).not.toBeInTheDocument();
    expect(screen.queryByRole("textbox")).not.toBeInTheDocument();
    expect(screen.getByText("survey_weight")).toBeInTheDocument();
  });
});

describe("the form of a system cell", () => {
  it("lets the index go with la-aids, in one change", async () => {
    const { user, written } = open(SystemForm, SYSTEM);
    expect(screen.getByRole("combobox", { name: "Index" })).toHaveValue("stone");
    await user.selectOptions(screen.getByRole("combobox", { name: "Form" }), "aids");
    expect(written.source).toBe(SYSTEM.replace("la-aids", "aids").replace("index: stone\n", ""));
    expect(screen.queryByRole("combobox", { name: "Index" })).not.toBeInTheDocument();
  });

  it("imposes restrictions in their own order", async () => {
    const { user, written } = open(SystemForm, SYSTEM);
    await user.click(screen.getByRole("checkbox", { name: "symmetry" }));
    expect(specification("system", written.source)).toMatchObject({ impose: ["homogeneity", "symmetry"] });
    expect(written.source).toContain("# theory first");
    await user.click(screen.getByRole("checkbox", { name: "homogeneity" }));
    expect(parseCell("system", written.source).problems[0].sentence).toContain("symmetry is imposed given homogeneity");
  });

  it("leaves no restriction to choose where the form holds them by itself", async () => {
    const { user, written } = open(SystemForm, "data: survey\nform: aids\n");
    await user.selectOptions(screen.getByRole("combobox", { name: "Form" }), "les");
    expect(screen.getByText("homogeneity and symmetry hold by the form itself")).toBeInTheDocument();
    expect(screen.queryByRole("checkbox", { name: "homogeneity" })).not.toBeInTheDocument();
    expect(written.source).toBe("data: survey\nform: les\n");
  });

  it("offers as demographics what is neither price nor purchase nor weight", () => {
    open(SystemForm, SYSTEM);
    const group = screen.getByRole("group", { name: "Demographics" });
    expect(within(group).getByRole("checkbox", { name: "members" })).toBeChecked();
    expect(within(group).queryByRole("checkbox", { name: "p_grains" })).not.toBeInTheDocument();
    expect(within(group).queryByRole("checkbox", { name: "survey_weight" })).not.toBeInTheDocument();
  });

  it("offers the data cell's goods as the equation to drop", () => {
    open(SystemForm, SYSTEM);
    const dropped = screen.getByRole("combobox", { name: "Dropped" });
    expect(
      within(dropped)
        .getAllByRole("option")
        .map((option) => option.textContent),
    ).toEqual(["the last good", "grains", "dairy"]);
  });
});

describe("the form of a slutsky cell", () => {
  it("shows the point written and writes another", async () => {
    const { user, written } = open(SlutskyForm, MATRIX);
    expect(screen.getByRole("radio", { name: "a quantile of expenditure" })).toBeChecked();
    const quantile = screen.getByRole("textbox", { name: "Quantile" });
    await user.clear(quantile);
    await user.type(quantile, "0.75{Enter}");
    expect(written.source).toBe(MATRIX.replace("0.9", "0.75"));
    await user.click(screen.getByRole("radio", { name: "the sample mean" }));
    expect(written.source).toBe(MATRIX.replace("{x: quantile 0.9}", "mean"));
    await user.click(screen.getByRole("radio", { name: "a row of the data" }));
    expect(specification("slutsky", written.source)).toMatchObject({ at: { row: 1 } });
  });

  it("asks for every good's price at a point of one's own", async () => {
    const { user, written } = open(SlutskyForm, MATRIX);
    await user.click(screen.getByRole("radio", { name: "prices and expenditure of your own" }));
    const price = screen.getByRole("textbox", { name: "Price, dairy" });
    await user.clear(price);
    await user.type(price, "9.1{Enter}");
    expect(specification("slutsky", written.source)).toMatchObject({ at: { prices: { grains: 1, dairy: 9.1 }, x: 1 } });
  });

  it("writes the form of the entries", async () => {
    const { user, written } = open(SlutskyForm, MATRIX);
    await user.click(screen.getByRole("radio", { name: "quantity form" }));
    expect(written.source).toBe(MATRIX.replace("form: share", "form: quantity"));
  });
});
