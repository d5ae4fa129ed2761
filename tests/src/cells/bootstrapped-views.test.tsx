import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it } from "vitest";
import { printFixed } from "../../../shared/tables/numbers.ts";
import { Recomputed } from "../../../src/features/referee-copy/recomputed.tsx";
import { verifyCopy } from "../../../src/workers/verify-copy.ts";
import { sampleCopy, sampleSlutsky, sampleSystem } from "../../support/sample-findings.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const plain = sampleSlutsky();
/** Intervals no normal distribution gives: from the estimate itself to one above it. */
const above = (matrix: readonly (readonly number[])[]) => ({
  low: matrix.map((row) => [...row]),
  high: matrix.map((row) => row.map((entry) => entry + 1)),
});
const { share, quantity, compensated, eigenvalues } = plain.at;
const matrix = {
  ...plain,
  at: {
    ...plain.at,
    eigenvalues: eigenvalues.map((one): typeof one => ({ ...one, interval: [one.value, one.value + 1] })),
    intervals: { draws: 480, share: above(share), quantity: above(quantity), compensated: above(compensated) },
  },
};

describe("a matrix of a bootstrapped system", () => {
  const { Open, Band } = CELL_PARTS.slutsky;

  it("reads an entry with the percentiles of the draws, which decide its word", () => {
    render(<Open finding={matrix} />);
    const panel = screen.getByRole("region", { name: "Entry pointed at" });
    const entry = share[0][1];
    expect(panel).toHaveTextContent(
      `interval ${printFixed(entry, 4)} to ${printFixed(entry + 1, 4)}, percentiles of 480 draws`,
    );
    expect(panel).toHaveTextContent(entry > 0 ? "Net substitutes" : "Undecided");
  });

  it("lists the intervals beside the eigenvalues", () => {
    render(<Band finding={matrix} />);
    const list = screen.getByRole("table", { name: /^Eigenvalues, 95.% percentile intervals$/ });
    const [{ value }] = eigenvalues;
    expect(within(list).getAllByRole("row")[0]).toHaveTextContent(
      `${printFixed(value, 4)} to ${printFixed(value + 1, 4)}`,
    );
  });
});

describe("coefficients of a bootstrapped system", () => {
  const { Band } = CELL_PARTS.system;
  const system = sampleSystem();
  const intervals = system.coefficients.map(({ estimate }): [number, number] => [estimate - 0.5, estimate + 0.25]);
  const bootstrap = { of: "rows", replicates: 480, failed: 0, seed: 1, intervals } as const;
  const bootstrapped = { ...system, standardErrors: "bootstrap", bootstrap } as never;

  it("stand over their standard errors or, switched, over their intervals", async () => {
    render(<Band finding={bootstrapped} />);
    const table = screen.getByRole("table", { name: /Coefficients of the share equations/ });
    const [{ estimate }] = system.coefficients;
    const ends = `${printFixed(estimate - 0.5, 4)} to ${printFixed(estimate + 0.25, 4)}`;
    expect(table).not.toHaveTextContent(ends);
    await userEvent.click(screen.getByRole("button", { name: /^95.% intervals$/ }));
    expect(table).toHaveTextContent(ends);
    expect(table).toHaveAccessibleName(/over 95.% interval$/);
    await userEvent.click(screen.getByRole("button", { name: "Standard errors" }));
    expect(table).not.toHaveTextContent(ends);
  });

  it("have no switch without a bootstrap", () => {
    render(<Band finding={system} />);
    expect(screen.queryByRole("button", { name: /intervals$/ })).not.toBeInTheDocument();
  });
});

describe("rows where the system is not defined", () => {
  const reason = "no utility near it costs that much while cost rises with utility";
  const undefinedRows = { rows: 3, weightedShare: 3 / 900, reason };
  const row = { row: 7, total: 12, goods: [], notDefined: reason, breaks: [] };
  const finding = {
    ...plain,
    sample: { ...plain.sample!, undefined: undefinedRows },
    at: {
      ...plain.at,
      checks: { ...plain.at.checks, sample: { ...plain.at.checks.sample!, undefined: undefinedRows } },
    },
    brokenRows: [row, ...plain.brokenRows],
  };

  it("are listed with the reason, counted beside the histogram, and said at the head", () => {
    render(<CELL_PARTS.slutsky.Open finding={finding} />);
    const broken = screen.getByRole("group", { name: "Rows where a law breaks" });
    expect(within(broken).getAllByRole("row")[1]).toHaveTextContent(`not defined: ${reason}`);
    expect(screen.getByText(/The system is not defined in 3 of 900 rows\./)).toBeInTheDocument();
    expect(screen.getByRole("img", { name: /Histogram .* 3 not defined$/ })).toBeInTheDocument();
  });
});

describe("a referee's copy", () => {
  it("says that intervals of a bootstrap cannot be computed again", () => {
    const copy = sampleCopy();
    const content = { ...copy.content, slutsky: { ...copy.content.slutsky, at: matrix.at } };
    const verification = verifyCopy({ ...copy, content }, () => 0);
    render(<Recomputed result={{ state: "done", verification }} content={content} onAgain={() => undefined} />);
    expect(screen.getByRole("status")).toHaveTextContent("rest on draws that are not sealed");
  });
});
