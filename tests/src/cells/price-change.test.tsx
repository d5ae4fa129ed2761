import { render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { PriceRulers } from "../../../src/cells/price-change/controls.tsx";
import { AnsweringWorker } from "../../support/answering-worker.ts";
import { sampleFitted } from "../../support/sample-findings.ts";
import { samplePriceChange } from "../../support/sample-price-change.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const { Band, Open } = CELL_PARTS["price change"];
const SOURCE = `system: base
# what the ministry asks
prices:
  meat & fish: {per cent: 40}   # world price
  sweet drinks: {ad valorem: 25}
`;
const slider = (name: string) => screen.getByRole("slider", { name });
/** Of the finding: what is copied has a word of its own. */
const status = () => screen.getAllByRole("status")[0];
const rowsOf = (table: HTMLElement) =>
  within(table)
    .getAllByRole("row")
    .slice(1)
    .map((row) => row.textContent);

beforeEach(() => vi.stubGlobal("Worker", AnsweringWorker));
afterEach(() => vi.unstubAllGlobals());

interface PageProps {
  readonly finding: PriceChangeFinding;
  readonly readOnly: boolean;
  readonly written: { source: string };
}

/** As an opened cell is: rulers on the left page, the finding on the right. */
function Page({ finding, readOnly, written }: PageProps) {
  const [source, setSource] = useState(written.source);
  const onChange = (next: string) => {
    written.source = next;
    setSource(next);
  };
  const form = { source, onChange, readOnly, context: { cells: [], uploads: [] } };
  return (
    <>
      <PriceRulers finding={finding} form={form} />
      <Open finding={finding} form={form} />
    </>
  );
}

function open(finding: PriceChangeFinding, readOnly = false) {
  const written = { source: SOURCE };
  render(<Page finding={finding} readOnly={readOnly} written={written} />);
  return { user: userEvent.setup(), written };
}

describe("a price change in its band", () => {
  it("says it in a sentence, with the cautions first and the five verdicts at the new prices", () => {
    render(<Band finding={samplePriceChange()} />);
    expect(
      screen.getByText(/^With meat & fish 40\.0.% dearer and a 25\.0.% tax on sweet drinks, 17\.69 \(/),
    ).toBeVisible();
    const care = screen.getByRole("region", { name: "Read with care" });
    expect(care).toHaveTextContent("no substitute for the responsible office’s own assessment");
    expect(care).toHaveTextContent("The new price of meat & fish, 43.40, is above every price in the sample");
    expect(within(screen.getByRole("list", { name: /new prices/ })).getAllByRole("listitem")).toHaveLength(5);
  });
});

describe("a price change in full", () => {
  it("parts the change of every good into substitution and income, by the compensation asked for", async () => {
    const { user } = open(samplePriceChange());
    const table = () => screen.getByRole("table", { name: "What is bought, and how it changes" });
    const hicks = rowsOf(table());
    expect(hicks[3]).toMatch(/^Meat & fish1\.31\d+−0\.2\d+\(.*−0\.1\d+\(.*−0\.3\d+\(/);
    await user.click(screen.getByRole("button", { name: "Slutsky" }));
    expect(rowsOf(table())[3]).not.toBe(hicks[3]);
    await user.click(screen.getByRole("button", { name: "Small changes" }));
    expect(within(table()).queryByRole("columnheader", { name: "Both" })).toBeNull();
  });

  it("draws one price change and has its numbers beneath", async () => {
    const { user } = open(samplePriceChange());
    const picture = screen.getByRole("img", { name: /^Meat & fish against everything else/ });
    expect(picture).toHaveAccessibleName(/from 31\.00 to 43\.40\. Keeping the utility before costs 14\.60 more/);
    const numbers = () => screen.getByRole("group", { name: /against everything else, units uploaded/, hidden: true });
    expect(rowsOf(numbers()).map((row) => /^[A-Z][a-z]+/.exec(row ?? "")?.[0])).toEqual([
      "Before",
      "Compensated",
      "After",
    ]);
    await user.selectOptions(screen.getByRole("combobox", { name: "Good of the picture" }), "Dairy");
    expect(screen.getByRole("img", { name: /The price of dairy stays at 9\.10/ })).toBeInTheDocument();
  });

  it("says who bears it, marks groups of few rows by a word, and names rows", () => {
    open(samplePriceChange());
    const table = screen.getByRole("table", { name: "Who bears it" });
    expect(rowsOf(table)[0]).toMatch(/^Lowest half12few rows/);
    expect(rowsOf(table)[2]).toMatch(/^All rows9121 left out/);
    expect(rowsOf(screen.getByRole("group", { name: /^Rows without an answer/ }))).toEqual([
      "1241.00in none of the means: utility has ended",
      "90793.00dairy −0.0100, bought after",
    ]);
  });

  it("has no welfare and no curves where the system has no cost function, and says so", () => {
    const { kind: _, ...finding } = samplePriceChange(undefined, sampleFitted(["homogeneity"]));
    open({ kind: "price change", ...finding });
    expect(screen.getByText(/^No indifference curves: symmetry is not imposed/)).toBeVisible();
    expect(screen.queryByRole("button", { name: "Hicks" })).toBeNull();
    expect(screen.getByRole("region", { name: "Read with care" })).toHaveTextContent("No exact welfare: Symmetry");
  });
});

describe("the rulers", () => {
  it("try a price from the keyboard, and say that it is not stored", async () => {
    const { user } = open(samplePriceChange());
    expect(slider("Meat & fish")).toHaveAttribute("aria-valuetext", "+40\u2009%");
    slider("Meat & fish").focus();
    await user.keyboard("{Shift>}{ArrowLeft}{/Shift}{ArrowLeft}");
    expect(slider("Meat & fish")).toHaveAttribute("aria-valuetext", "+34\u2009%");
    await screen.findByText(/^With meat & fish 34\.0.% dearer/);
    expect(status()).toHaveTextContent("Trying out, not stored");
    expect(screen.queryByRole("table", { name: "Who bears it" })).toBeNull();
    await user.click(screen.getByRole("button", { name: "Back to what is stored" }));
    expect(screen.getByText(/^With meat & fish 40\.0.% dearer/)).toBeVisible();
    expect(status()).toHaveTextContent("What is shown is the stored finding.");
  });

  it("take a number in the field beside them", async () => {
    const { user } = open(samplePriceChange());
    const field = screen.getByRole("textbox", { name: "Total expenditure, per cent, as a number" });
    await user.clear(field);
    await user.type(field, "−10{Enter}");
    await screen.findByText(/total expenditure 10\.0.% lower/);
    expect(slider("Total expenditure")).toHaveAttribute("aria-valuetext", "−10\u2009%");
  });

  it("show the very answer that would be stored", async () => {
    const { user } = open(samplePriceChange());
    await user.click(screen.getByRole("button", { name: "All prices to no change" }));
    await screen.findByText(/^No price changes: there is nothing to bear/);
    slider("Dairy").focus();
    await user.keyboard("{ArrowRight}");
    const prices = {
      "meat & fish": { "per cent": 0 },
      "sweet drinks": { "ad valorem": 0 },
      dairy: { "per cent": 1 },
    };
    const stored = samplePriceChange({ prices, expenditure: 0 }).at.welfare?.compensating;
    await screen.findByText(`Compensating variation ${stored?.value.toFixed(2)}`, { exact: false });
  });

  it("write what was tried into the cell, and leave comments and other keys alone", async () => {
    const { user, written } = open(samplePriceChange());
    slider("Meat & fish").focus();
    await user.keyboard("{ArrowRight}");
    slider("Dairy").focus();
    await user.keyboard("{Shift>}{ArrowLeft}{/Shift}");
    await user.click(screen.getByRole("button", { name: "Keep this price change" }));
    expect(written.source).toBe(
      SOURCE.replace("per cent: 40", "per cent: 41").replace("25}\n", "25}\n  dairy: {per cent: -5}\n"),
    );
    expect(parseCell("price change", written.source).problems).toEqual([]);
  });

  it("can be tried by a reader, who is offered nothing to keep it with", async () => {
    const { user, written } = open(samplePriceChange(), true);
    slider("Dairy").focus();
    await user.keyboard("{ArrowRight}");
    await waitFor(() => expect(status()).toHaveTextContent("Trying out, not stored"));
    expect(screen.getByText(/Whoever reads may try; owners and coauthors keep/)).toBeVisible();
    expect(screen.queryByRole("button", { name: "Keep this price change" })).toBeNull();
    expect(written.source).toBe(SOURCE);
  });

  it("stand above the finding where there is no source page", () => {
    render(<Open finding={samplePriceChange()} />);
    expect(slider("Grains")).toBeInTheDocument();
  });
});
