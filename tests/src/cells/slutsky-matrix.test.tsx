import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it } from "vitest";
import { formulaParts } from "../../../shared/economics/formula.ts";
import { printFixed } from "../../../shared/tables/numbers.ts";
import { formulaDecimals } from "../../../src/cells/slutsky/formula.ts";
import { MatrixReading } from "../../../src/cells/slutsky/matrix-reading.tsx";
import { sampleSlutsky } from "../../support/sample-findings.ts";

const finding = sampleSlutsky();
const { goods } = finding.fitted;
const name = (i: number, j: number) => new RegExp(`^${goods[i]}, price of ${goods[j]}:`);
const entry = (i: number, j: number) => screen.getByRole("gridcell", { name: name(i, j) });
const digits = (text: string | null) => Number((text ?? "").replaceAll("\u2212", "-").replaceAll(/\s/g, ""));

function open(form: "share" | "quantity" = "share") {
  render(<MatrixReading finding={sampleSlutsky(form)} form={form} sums />);
  return { user: userEvent.setup(), panel: screen.getByRole("region", { name: "Entry pointed at" }) };
}

describe("the matrix", () => {
  it("prints every entry with its sign and its standard error", () => {
    open();
    const { share, shareErrors } = finding.at;
    goods.forEach((_, i) => {
      goods.forEach((_, j) => {
        expect(entry(i, j)).toHaveAccessibleName(
          `${goods[i]}, price of ${goods[j]}: ${printFixed(share[i][j], 4)}, standard error ${printFixed(shareErrors[i][j], 4)}`,
        );
        expect(entry(i, j)).toHaveTextContent(printFixed(share[i][j], 4));
      });
    });
  });

  it("moves with the arrow keys, and the mirror follows", async () => {
    const { user, panel } = open();
    await user.tab();
    expect(entry(0, 1)).toHaveFocus();
    await user.keyboard("{ArrowRight}{ArrowRight}{ArrowDown}");
    expect(entry(1, 3)).toHaveFocus();
    expect(entry(1, 3)).toHaveAttribute("aria-selected", "true");
    expect(entry(3, 1)).toHaveAttribute("data-mirror", "true");
    expect(entry(1, 0)).not.toHaveAttribute("data-mirror");
    expect(panel).toHaveTextContent("Row dairy, column meat & fish");
    await user.keyboard("{Home}{ArrowUp}{ArrowUp}{ArrowLeft}");
    expect(entry(0, 0)).toHaveFocus();
    await user.keyboard("{Control>}{End}{/Control}");
    expect(entry(5, 5)).toHaveFocus();
    await user.keyboard("{ArrowUp}m");
    expect(entry(5, 4)).toHaveFocus();
  });

  it("is one stop of the tab key", async () => {
    const { user } = open();
    await user.tab();
    await user.keyboard("{ArrowDown}");
    expect(entry(1, 1)).toHaveFocus();
    await user.tab();
    expect(document.body).toHaveFocus();
  });

  it("reads out the entry pointed at: word, interval, mirror, elasticities, the other form", async () => {
    const { user, panel } = open();
    await user.hover(entry(2, 4));
    const { share, shareErrors, compensated, compensatedErrors, quantity } = finding.at;
    expect(within(panel).getByRole("heading", { name: "Net complements" })).toBeInTheDocument();
    const low = printFixed(share[2][4] - 1.959963984540054 * shareErrors[2][4], 4);
    expect(panel).toHaveTextContent(`95 % interval ${low} to `);
    expect(panel).toHaveTextContent(`Mirror, sweet drinks by produce${printFixed(share[4][2], 4)}`);
    expect(panel).toHaveTextContent("Difference from the mirror0");
    expect(panel).toHaveTextContent(
      `Compensated elasticity${printFixed(compensated[2][4], 3)} (${printFixed(compensatedErrors[2][4], 3)})`,
    );
    expect(panel).toHaveTextContent(`Its mirror${printFixed(compensated[4][2], 3)}`);
    expect(panel).toHaveTextContent(`Quantity form, units uploaded${printFixed(quantity[2][4], 4)}`);
  });

  it("says undecided when the interval covers nought, and nothing of substitutes for an own price", async () => {
    const { user, panel } = open();
    await user.hover(entry(0, 3));
    expect(within(panel).getByRole("heading", { name: "Undecided" })).toBeInTheDocument();
    await user.hover(entry(3, 3));
    expect(within(panel).getByRole("heading", { name: "Own price" })).toBeInTheDocument();
  });

  it("prints sums that are nought by law as 0, and none for a form whose rows differ in units", () => {
    open();
    const row = screen.getByRole("row", { name: /Column sum/ });
    expect(within(row).getAllByText("0")).toHaveLength(goods.length);
  });

  it("prints no sums in quantity form, and the steps of its own scale", () => {
    open("quantity");
    expect(screen.queryByText("Row sum")).not.toBeInTheDocument();
    expect(screen.getByRole("grid", { name: /quantity form in units uploaded/ })).toBeInTheDocument();
    const derived = screen.getByRole("region", { name: "Formula of the quantity form" });
    expect(derived).toHaveTextContent(`= 0.0238 × 184.60/(6.20 × 9.10) = ${printFixed(finding.at.quantity[0][1], 4)}`);
  });
});

describe("the formula of an entry", () => {
  it("has printed numbers that add up to the printed entry, everywhere in the matrix", async () => {
    const { user, panel } = open();
    for (let i = 0; i < goods.length; i++) {
      for (let j = 0; j < goods.length; j++) {
        await user.hover(entry(i, j));
        const formula = within(panel).getByRole("region", { name: "Formula" });
        const [, factored, added] = [...formula.children].map((line) => line.textContent ?? "");
        const shown = printFixed(finding.at.share[i][j], 4);
        const [outside, share, slope, other] = numbers(factored, i === j);
        expect(printFixed(outside + (share + slope) * other, 4)).toBe(shown);
        expect(added).toContain(`= ${shown}`);
      }
    }
  });

  it("takes more digits only where four would not add up", () => {
    const parts = formulaParts(finding.fitted, finding.point, 2, 4);
    expect(formulaDecimals(parts)).toBe(4);
    const awkward = {
      ...parts,
      priceSlope: 0.00004,
      incomeTerm: 0.00004,
      share: 0.5,
      totalSlope: -0.49992,
      otherShare: 0.5,
      value: 0.00008,
    };
    expect(formulaDecimals(awkward)).toBeGreaterThan(4);
  });

  it("gives the mirror's numbers beside its own", async () => {
    const { user, panel } = open();
    await user.hover(entry(2, 4));
    const mirror = within(panel).getByRole("region", { name: "Formula of the mirror" });
    expect(mirror).toHaveTextContent(printFixed(finding.at.priceSlopes[4][2], 4));
    expect(mirror).toHaveTextContent(`= ${printFixed(finding.at.share[4][2], 4)}`);
  });
});

/** "= a − w + (b − c) × d" as [a − w, b, −c, d]. */
function numbers(line: string, own: boolean): [number, number, number, number] {
  const match = /^= (\S+)(?: ([+\u2212]) (\S+))? \+ \((\S+) ([+\u2212]) (\S+)\) ×\s(\S+)$/.exec(line);
  expect(match, line).not.toBeNull();
  const [, first, ownSign, ownShare, share, sign, slope, other] = match!;
  expect(ownSign !== undefined).toBe(own);
  const signed = (mark: string | undefined, text: string | undefined) =>
    text === undefined ? 0 : (mark === "+" ? 1 : -1) * digits(text);
  return [digits(first) + signed(ownSign, ownShare), digits(share), signed(sign, slope), digits(other)];
}
