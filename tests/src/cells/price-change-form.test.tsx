import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { PriceChangeForm } from "../../../src/cells/price-change/form.tsx";
import { exampleUpload } from "../../support/example-upload.ts";

const DATA = `upload: purchases.csv
goods:
  grains: {price: p_grains, expenditure: e_grains}
  dairy: {price: p_dairy, expenditure: e_dairy}
`;
const LEVY = `system: base
# passed on in full, says the industry
prices:
  dairy: {ad valorem: 25}   # from May
`;
const upload = exampleUpload(["members", "p_grains", "e_grains", "p_dairy", "e_dairy"]);
const cell = (name: string, kind: string, source: string): CellSource => ({
  id: name,
  name,
  kind,
  order: name,
  source,
});
const cells = [cell("survey", "data", DATA), cell("base", "system", "data: survey\nform: aids\n")];

interface PageProps {
  readonly written: { source: string };
  readonly readOnly: boolean;
}

function Page({ written, readOnly }: PageProps) {
  const [source, setSource] = useState(written.source);
  const onChange = (next: string) => {
    written.source = next;
    setSource(next);
  };
  return (
    <PriceChangeForm source={source} onChange={onChange} readOnly={readOnly} context={{ cells, uploads: [upload] }} />
  );
}

function open(source = LEVY, readOnly = false) {
  const written = { source };
  render(<Page written={written} readOnly={readOnly} />);
  return { user: userEvent.setup(), written };
}
const combobox = (name: string) => screen.getByRole("combobox", { name });
const problems = (source: string) => parseCell("price change", source).problems;

describe("the form of a price change", () => {
  it("offers every good of the data, and writes how a price changes beside the comments", async () => {
    const { user, written } = open();
    await user.selectOptions(combobox("Grains"), "per cent");
    expect(written.source).toBe(LEVY.replace("# from May\n", "# from May\n  grains: {per cent: 0}\n"));
    await user.click(screen.getByRole("checkbox", { name: "A tax" }));
    expect(written.source).toContain("grains: {per cent: 0, tax: true}");
    expect(problems(written.source)).toEqual([]);
    await user.selectOptions(combobox("Grains"), "");
    expect(written.source).toBe(LEVY);
  });

  it("writes what is passed on of a tax, and takes it away with the tax", async () => {
    const { user, written } = open("system: base\nprices:\n  dairy: {per cent: 10, tax: true}\n");
    const passed = screen.getByRole("textbox", { name: "Passed on" });
    await user.clear(passed);
    await user.type(passed, "0.8{Enter}");
    expect(written.source).toContain("dairy: {per cent: 10, tax: true, pass-through: 0.8}");
    await user.click(screen.getByRole("checkbox", { name: "A tax" }));
    expect(written.source).toContain("dairy: {per cent: 10}");
    expect(screen.queryByRole("textbox", { name: "Passed on" })).toBeNull();
  });

  it("asks who bears it, in fifths of money unless said otherwise, by needs that are counted", async () => {
    const { user, written } = open();
    await user.selectOptions(combobox("Groups by"), "expenditure per equivalent adult");
    expect(written.source).toBe(`${LEVY}groups: {of: expenditure per equivalent adult, quantiles: 5}\n`);
    expect(problems(written.source)).toMatchObject([{ sentence: expect.stringContaining("needs equivalence scale") }]);
    await user.selectOptions(combobox("Equivalent adults"), "square root of members");
    expect(written.source).toContain("equivalence scale: {square root of: members}\n");
    expect(problems(written.source)).toEqual([]);
    await user.selectOptions(combobox("Equivalent adults"), "members");
    expect(written.source).toContain("equivalence scale: members\n");
    await user.selectOptions(combobox("Equivalent adults"), "");
    await user.selectOptions(combobox("Groups by"), "");
    expect(written.source).toBe(LEVY);
  });

  it("shows a reader the words and nothing to change them with", () => {
    open(LEVY, true);
    expect(screen.queryByRole("combobox")).toBeNull();
    expect(screen.getByText("tax in per cent of what the seller gets")).toBeVisible();
  });
});
