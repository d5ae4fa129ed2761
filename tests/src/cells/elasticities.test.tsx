import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { ElasticitiesForm } from "../../../src/cells/elasticities/form.tsx";
import { sampleElasticities } from "../../support/sample-elasticities.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const { Band, Open } = CELL_PARTS.elasticities;
const rowsOf = (table: HTMLElement) =>
  within(table)
    .getAllByRole("row")
    .slice(1)
    .map((row) => row.textContent);

describe("elasticities at one point", () => {
  it("are a line for each good in the band, with the class as a word, and the five verdicts", () => {
    render(<Band finding={sampleElasticities(1)} />);
    expect(screen.getByText(/^At the sample mean, by 95.% intervals, meat is a luxury/)).toBeInTheDocument();
    expect(rowsOf(screen.getByRole("table"))).toEqual([
      expect.stringMatching(/^Grains0\.50000\.700\(0\.010\)−0\.500\(0\.020\)−0\.150\(0\.020\)necessity$/),
      expect.stringMatching(/^Dairy.*undecided$/),
      expect.stringMatching(/^Meat.*luxury$/),
    ]);
    expect(within(screen.getByRole("list", { name: /What theory says/ })).getAllByRole("listitem")).toHaveLength(5);
  });

  it("show intervals in place of standard errors when asked", async () => {
    render(<Open finding={sampleElasticities(1)} />);
    const goods = screen.getByRole("group", { name: "Elasticities at the sample mean" });
    expect(goods).not.toHaveTextContent("0.680 to 0.720");
    await userEvent.click(screen.getByRole("button", { name: "Intervals" }));
    expect(goods).toHaveTextContent("0.680 to 0.720");
    expect(goods).not.toHaveTextContent("(0.010)");
  });

  it("say in words which pairs are substitutes or complements, gross and net", async () => {
    render(<Open finding={sampleElasticities(1)} />);
    const gross = screen.getByRole("group", { name: /^Uncompensated price elasticities/ });
    expect(rowsOf(gross)[2]).toMatch(/^Meatsubstitutes 0\.300.*complements −0\.100/);
    await userEvent.click(screen.getAllByRole("button", { name: "Compensated" })[1]);
    const net = screen.getByRole("group", { name: /^Compensated price elasticities/ });
    expect(rowsOf(net)[0]).toMatch(/complements −0\.050/);
    const words = screen.getByRole("group", { name: "How the goods stand to each other" });
    expect(rowsOf(words)[0]).toBe("Grainsrisesdairymeat");
    expect(rowsOf(words)[1]).toBe("Dairyrisesgrains and meatnone beyond doubt");
  });
});

describe("elasticities of groups", () => {
  it("are compared by one elasticity at a time", async () => {
    render(<Band finding={sampleElasticities(3)} />);
    expect(rowsOf(screen.getByRole("table"))[0]).toMatch(/^Lowest third10080\.000\.700/);
    await userEvent.click(screen.getByRole("button", { name: "Own price" }));
    expect(rowsOf(screen.getByRole("table"))[0]).toMatch(/^Lowest third10080\.00−0\.500/);
  });

  it("are chosen by keyboard, and the one chosen is set out below", async () => {
    render(<Open finding={sampleElasticities(3)} />);
    expect(screen.getByRole("heading", { name: "In the lowest third of total expenditure" })).toBeInTheDocument();
    const user = userEvent.setup();
    screen.getByRole("radio", { name: "Lowest third" }).focus();
    await user.keyboard("{ArrowDown}");
    expect(screen.getByRole("radio", { name: "Second third" })).toBeChecked();
    expect(screen.getByRole("heading", { name: "In the second third of total expenditure" })).toBeInTheDocument();
    expect(screen.getByText(/filled: second third/)).toBeInTheDocument();
  });
});

const SYSTEM: CellSource = {
  id: "s",
  name: "base",
  kind: "system",
  order: "a",
  source: "data: survey\nform: la-aids\nindex: stone\n",
};

function Held({ start, onText }: { start: string; onText: (text: string) => void }) {
  const [source, setSource] = useState(start);
  return (
    <ElasticitiesForm
      source={source}
      readOnly={false}
      context={{ cells: [SYSTEM], uploads: [] }}
      onChange={(next) => {
        setSource(next);
        onText(next);
      }}
    />
  );
}

describe("the form of an elasticities cell", () => {
  const written = (start: string) => {
    const text = { now: start };
    render(<Held start={start} onText={(next) => (text.now = next)} />);
    return () => parseCell("elasticities", text.now);
  };

  it("turns from one point to groups and to all rows, and never writes two questions at once", async () => {
    const parsed = written("system: base\nat: mean\n# for the referees\n");
    await userEvent.click(screen.getByRole("radio", { name: "groups of rows" }));
    expect(parsed().specification).toMatchObject({ groups: { of: "total expenditure", quantiles: 5 }, over: "means" });
    await userEvent.click(screen.getByRole("radio", { name: /over the rows of each/ }));
    expect(parsed().specification).toMatchObject({ over: "rows", groups: { quantiles: 5 } });
    await userEvent.click(screen.getByRole("radio", { name: "all rows together" }));
    expect(parsed().written).toEqual({ system: "base", over: "rows" });
    await userEvent.click(screen.getByRole("radio", { name: "one point" }));
    expect(parsed().written).toEqual({ system: "base", at: "mean" });
  });

  it("offers to let the weights of Stone's index move only where the system has one", async () => {
    const parsed = written("system: base\n");
    await userEvent.click(screen.getByRole("radio", { name: /Green and Alston/ }));
    expect(parsed().written.index).toBe("exact");
    await userEvent.click(screen.getByRole("radio", { name: "observed means" }));
    expect(parsed().written.shares).toBe("observed");
  });

  it("has no such choice for another system", () => {
    written("system: other\n");
    expect(screen.queryByRole("radio", { name: /Green and Alston/ })).not.toBeInTheDocument();
  });
});
