import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { SystemForm } from "../../../src/cells/system/form.tsx";
import { exampleUpload } from "../../support/example-upload.ts";

const DATA = `upload: purchases.csv
goods:
  grains: {price: p_grains, expenditure: e_grains}
  dairy: {price: p_dairy, expenditure: e_dairy}
cluster: village
time: week
`;
const columns = ["village", "week", "rooms", "members", "p_grains", "e_grains", "p_dairy", "e_dairy"];
const upload = exampleUpload(columns);
const survey: CellSource = { id: "survey", name: "survey", kind: "data", order: "a", source: DATA };

function Page({ written, readOnly }: { written: { source: string }; readOnly: boolean }) {
  const [source, setSource] = useState(written.source);
  const change = (next: string) => {
    written.source = next;
    setSource(next);
  };
  return (
    <SystemForm
      source={source}
      onChange={change}
      readOnly={readOnly}
      context={{ cells: [survey], uploads: [upload] }}
    />
  );
}

function open(initial: string, readOnly = false) {
  const written = { source: initial };
  render(<Page written={written} readOnly={readOnly} />);
  const specification = () => {
    const { specification: parsed, problems } = parseCell("system", written.source);
    if (!parsed) throw new Error(problems.map(({ sentence }) => sentence).join(" "));
    return parsed as unknown as Record<string, unknown>;
  };
  return { user: userEvent.setup(), written, specification };
}

const BASE = "data: survey # the only one\nform: aids\nimpose: [homogeneity, symmetry]\n";

describe("the form of a system cell", () => {
  it("writes standard errors by cluster and by bootstrap, and takes them away again", async () => {
    const { user, written, specification } = open(BASE);
    const errors = screen.getByRole("combobox", { name: "Standard errors" });
    await user.selectOptions(errors, "clustered");
    expect(specification()["standard errors"]).toEqual({ cluster: "village" });
    await user.selectOptions(errors, "by bootstrap");
    await user.selectOptions(screen.getByRole("combobox", { name: "Drawn again" }), "blocks");
    await user.type(screen.getByRole("textbox", { name: "Block, periods" }), "8{Enter}");
    expect(specification()["standard errors"]).toEqual({ bootstrap: "blocks", replicates: 500, seed: 1, block: 8 });
    await user.selectOptions(screen.getByRole("combobox", { name: "Drawn again" }), "clusters");
    expect(specification()["standard errors"]).toEqual({ bootstrap: "clusters", replicates: 500, seed: 1 });
    await user.selectOptions(errors, "conventional");
    expect(written.source).toBe(BASE);
  });

  it("writes season, trend, instruments, zeros and curvature under their keys", async () => {
    const { user, written, specification } = open(BASE);
    await user.click(screen.getByText("Over time"));
    await user.click(screen.getByRole("checkbox", { name: "a linear trend" }));
    await user.type(screen.getByRole("textbox", { name: "Season, periods" }), "52{Enter}");
    await user.type(screen.getByRole("textbox", { name: "Harmonics" }), "2{Enter}");
    expect(specification()).toMatchObject({ trend: true, season: { period: 52, harmonics: 2 } });
    await user.click(screen.getByText("Negativity imposed"));
    const imposed = screen.getByRole("combobox", { name: "Imposed at" });
    await user.selectOptions(imposed, "a row of the data");
    await user.clear(screen.getByRole("textbox", { name: "Row" }));
    await user.type(screen.getByRole("textbox", { name: "Row" }), "12{Enter}");
    expect(specification()).toMatchObject({ curvature: { at: { row: 12 } } });
    await user.click(screen.getByText("Endogenous expenditure and zeros"));
    const instruments = screen.getByRole("group", { name: "Instruments" });
    await user.click(within(instruments).getByRole("checkbox", { name: "rooms" }));
    expect(specification()).toMatchObject({ instruments: ["rooms"] });
    await user.click(within(instruments).getByRole("checkbox", { name: "rooms" }));
    await user.selectOptions(imposed, "no point");
    await user.selectOptions(screen.getByRole("combobox", { name: "Goods not bought" }), "in two steps");
    expect(specification()).toMatchObject({ zeros: "two-step" });
    await user.click(
      within(screen.getByRole("group", { name: "Whether, by" })).getByRole("checkbox", { name: "rooms" }),
    );
    expect(specification()).toMatchObject({ zeros: { "two-step": ["rooms"] } });
    expect(written.source.startsWith("data: survey # the only one\n")).toBe(true);
  });

  it("offers what the form alone has, and takes it away with the form", async () => {
    const { user, specification } = open("data: survey\nform: easi\n");
    const degree = screen.getByRole("textbox", { name: "Degree" });
    expect(degree).toHaveValue("3");
    await user.clear(degree);
    await user.type(degree, "2{Enter}");
    await user.click(screen.getByRole("checkbox", { name: "prices with expenditure" }));
    await user.selectOptions(screen.getByRole("combobox", { name: "Real expenditure" }), "approximate");
    expect(specification()).toMatchObject({
      degree: 2,
      interactions: ["prices with expenditure"],
      "real expenditure": "approximate",
    });
    await user.selectOptions(screen.getByRole("combobox", { name: "Form" }), "les");
    expect(specification()).not.toHaveProperty("degree");
    await user.selectOptions(screen.getByRole("combobox", { name: "Errors" }), "expenditures");
    expect(specification()).toMatchObject({ form: "les", errors: "expenditures" });
    await user.selectOptions(screen.getByRole("combobox", { name: "Form" }), "quaids");
    expect(specification()).not.toHaveProperty("errors");
    const alpha = screen.getByRole("textbox", { name: "α₀, held fixed" });
    await user.clear(alpha);
    await user.type(alpha, "0.5{Enter}");
    expect(specification()).toMatchObject({ form: "quaids", alpha0: 0.5 });
  });

  it("keeps a part open when its last key goes, and says what a folded one holds", async () => {
    const { user } = open(`${BASE}trend: true\n`);
    const part = screen.getByText("Over time").closest("details");
    expect(part).toHaveAttribute("open");
    await user.click(screen.getByRole("checkbox", { name: "a linear trend" }));
    expect(part).toHaveAttribute("open");
    await user.click(screen.getByRole("checkbox", { name: "a linear trend" }));
    await user.click(screen.getByText("Over time"));
    expect(part).not.toHaveAttribute("open");
    expect(screen.getByText(": trend")).toBeInTheDocument();
  });

  it("leaves out keys that say what holds anyway", async () => {
    const { user, written } = open("data: survey\nform: la-aids\nindex: stone\n");
    await user.selectOptions(screen.getByRole("combobox", { name: "Index" }), "Törnqvist");
    await user.selectOptions(screen.getByRole("combobox", { name: "Estimator" }), "least squares");
    await user.selectOptions(screen.getByRole("combobox", { name: "Estimator" }), "maximum likelihood");
    expect(written.source).toBe("data: survey\nform: la-aids\n");
  });

  it("shows a reader what is written, and nothing of what is not", () => {
    open(`${BASE}season: {period: 12}\n`, true);
    expect(screen.getByText("Over time")).toBeTruthy();
    expect(screen.queryByText("Negativity imposed")).toBeNull();
  });
});
