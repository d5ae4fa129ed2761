import { fireEvent, render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { FigureFinding } from "../../../shared/schemas/figure.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { figureSentence } from "../../../shared/tables/figure-words.ts";
import { drawFigure } from "../../../src/cells/figure/drawings/index.ts";
import { FigureForm } from "../../../src/cells/figure/form.tsx";
import { chosenFigures, sampleDemand, sampleEngel } from "../../support/sample-figures.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const plotly = vi.hoisted(() => ({
  react: vi.fn(() => Promise.resolve()),
  purge: vi.fn(),
  downloadImage: vi.fn((..._: unknown[]) => Promise.resolve("")),
}));
vi.mock("plotly.js-dist-min", () => ({ default: plotly }));

let comeNear: (() => void) | undefined;
beforeEach(() => {
  comeNear = undefined;
  vi.stubGlobal(
    "IntersectionObserver",
    class {
      constructor(seen: (entries: { isIntersecting: boolean }[]) => void) {
        comeNear = () => seen([{ isIntersecting: true }]);
      }
      observe() {}
      disconnect() {}
    },
  );
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.clearAllMocks();
});

const { Band, Open, tables } = CELL_PARTS.figure;
/** The sentence as the page has it, thin spaces among its spaces. */
const asRead = (finding: FigureFinding) => figureSentence(finding).replace(/\s+/g, " ");
const named = (token: string) => token;
const drawnOn = (finding: FigureFinding, narrow = false) => drawFigure(finding, named, { narrow, height: 400 });

describe("a figure in its band", () => {
  it("says what it shows and what theory says before anything is drawn, and has its numbers below", () => {
    const finding = sampleEngel();
    render(<Band finding={finding} />);
    expect(screen.getByText(asRead(finding))).toBeInTheDocument();
    expect(within(screen.getByRole("list", { name: /What theory says/ })).getAllByRole("listitem")).toHaveLength(5);
    const rows = within(screen.getByRole("table", { hidden: true })).getAllByRole("row", { hidden: true });
    expect(rows).toHaveLength(1 + 5);
    expect(plotly.react).not.toHaveBeenCalled();
  });

  it("is drawn when it comes near the window, and its sentence stands for it where it is not seen", async () => {
    const finding = sampleDemand();
    render(<Band finding={finding} />);
    expect(screen.getByRole("img")).toHaveAccessibleName(expect.stringContaining(asRead(finding)));
    comeNear?.();
    await waitFor(() => expect(plotly.react).toHaveBeenCalled());
  });

  it("is downloaded in the light palette on white, as large as a page of paper", async () => {
    document.documentElement.dataset.theme = "dark";
    document.head.insertAdjacentHTML(
      "beforeend",
      '<style>[data-theme="light"]{--ink:#1d1b20}[data-theme="dark"]{--ink:#ece6da}</style>',
    );
    render(<Open finding={sampleEngel()} />);
    comeNear?.();
    const word = await screen.findByRole("button", { name: "SVG" });
    await waitFor(() => expect(word).toBeEnabled());
    fireEvent.click(word);
    const [picture, options] = plotly.downloadImage.mock.lastCall as unknown as [
      { layout: { paper_bgcolor: string; hoverlabel: { bordercolor: string }; width: number } },
      object,
    ];
    expect(picture.layout.paper_bgcolor).toBe("white");
    expect(picture.layout.hoverlabel.bordercolor).toBe("#1d1b20");
    expect(picture.layout.width).toBe(960);
    expect(options).toMatchObject({ format: "svg", filename: "figure-engel-curves", width: 960, height: 560 });
    delete document.documentElement.dataset.theme;
  });
});

describe("what is drawn", () => {
  it("are the numbers found, each good's line with its interval below it and its name at its end", () => {
    const finding = sampleEngel();
    const { drawn } = finding;
    if (drawn.show !== "engel curves") throw new Error("not the curves");
    const { data, layout } = drawnOn(finding);
    const [first, second] = data.slice(2) as { x: number[]; y: number[] }[];
    expect(first).toMatchObject({ x: drawn.totals, y: drawn.curves[0].values });
    expect(second.y).toEqual(drawn.curves[1].values);
    expect((data[0] as { y: number[] }).y).toEqual([...drawn.curves[0].low, ...drawn.curves[0].high.toReversed()]);
    expect(layout.annotations?.map(({ text }) => text)).toEqual(["Predicted share", "Grains", "Meat &amp; fish"]);
  });

  it("tells the demand curves apart without colour, and marks where they meet", () => {
    const { data, layout } = drawnOn(sampleDemand());
    const lines = data.filter((one) => (one as { name?: string }).name) as { line: { dash?: string } }[];
    expect(lines.map(({ line }) => line.dash)).toEqual([undefined, "6px,4px"]);
    expect(data.at(-1)).toMatchObject({ mode: "markers" });
    expect(layout.annotations?.map(({ text }) => text)).toEqual(
      expect.arrayContaining(["uncompensated", "compensated"]),
    );
  });

  it.each(chosenFigures().map((finding) => [finding.drawn.show, finding] as const))(
    "of %s fits its place, wide or narrow, and stands beside a sentence and a table of every number",
    (_, finding) => {
      for (const narrow of [false, true]) {
        const { data, layout } = drawnOn(finding, narrow);
        expect(data.length).toBeGreaterThan(0);
        expect(JSON.stringify({ data, layout })).not.toMatch(/null|NaN/);
      }
      render(<Open finding={finding} />);
      expect(screen.getByText(asRead(finding))).toBeInTheDocument();
      const [table] = tables(finding);
      expect(new Set(table.rows.map(({ label }) => label)).size).toBe(table.rows.length);
      expect(new Set(table.columns.map(({ label }) => label)).size).toBe(table.columns.length);
      for (const { cells } of table.rows) expect(cells).toHaveLength(table.columns.length);
    },
  );

  it("says what of a law breaks, what is left out, and to read losses with care", () => {
    const [, , eigenvalue, incidence] = chosenFigures();
    expect(figureSentence(eigenvalue)).toBe(
      "Negativity breaks at expenditures above 2.50, with prices at the sample mean: the largest eigenvalue reaches 0.0100. The system is not defined at 1 of 4 points.",
    );
    render(<Open finding={incidence} />);
    expect(screen.getByRole("region", { name: "Read with care" })).toHaveTextContent(/no substitute/);
    expect(figureSentence(incidence)).toMatch(/^The lowest half of total expenditure loses most, 3\.0.% of its/);
  });
});

describe("its form", () => {
  const DATA = "upload: p.csv\ngoods:\n  grains: {price: pg, quantity: qg}\n  dairy: {price: pd, quantity: qd}\n";
  const cells = [
    { id: "d", name: "survey", kind: "data", order: "a", source: DATA },
    { id: "s", name: "base", kind: "system", order: "b", source: "data: survey\nform: aids\n" },
  ];
  function shown(source: string) {
    const onChange = vi.fn<(next: string) => void>();
    render(<FigureForm source={source} onChange={onChange} readOnly={false} context={{ cells, uploads: [] }} />);
    return () => onChange.mock.lastCall?.[0] ?? "";
  }

  it("turns to data, and out go the keys that mean nothing to it", async () => {
    const written = shown("# kept\nsystem: base\nshow: engel curves\nat: mean\n");
    await userEvent.click(screen.getByRole("radio", { name: "observed shares by group of rows" }));
    expect(written()).toContain("# kept");
    expect(parseCell("figure", written()).written).toEqual({ data: "survey", show: "shares by group" });
  });

  it("asks for the one good of a demand curve", async () => {
    const written = shown("system: base\nshow: demand curve\n");
    await userEvent.selectOptions(screen.getByRole("combobox", { name: "Good" }), "dairy");
    const { problems, written: keys } = parseCell("figure", written());
    expect(problems).toEqual([]);
    expect(keys).toEqual({ system: "base", show: "demand curve", goods: ["dairy"] });
  });

  it("asks elasticities of groups in the place of a point", async () => {
    const written = shown("system: base\nshow: elasticities\nat: mean\n");
    await userEvent.click(screen.getByRole("radio", { name: "groups of rows" }));
    expect(parseCell("figure", written()).problems).toEqual([]);
    expect(written()).not.toContain("at:");
  });
});
