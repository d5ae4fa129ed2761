import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it } from "vitest";
import { printCount, printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { sampleData, sampleFitted, sampleSlutsky, sampleSystem } from "../../support/sample-findings.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const verdicts = () =>
  within(screen.getByRole("list", { name: /What theory says/ }))
    .getAllByRole("listitem")
    .map((item) => item.textContent);

describe("a slutsky cell", () => {
  const { Band, Open, Aside } = CELL_PARTS.slutsky;
  const finding = sampleSlutsky();

  it("says in its band what the matrix is, at which point, and where it breaks", () => {
    render(<Band finding={finding} />);
    expect(
      screen.getByText(/^The matrix is symmetric and negative semidefinite at the base point\./),
    ).toBeInTheDocument();
    expect(screen.getByRole("table", { name: /Slutsky matrix, share form, at the base point/ })).toBeInTheDocument();
    expect(screen.getByRole("table", { name: "Eigenvalues" })).toHaveTextContent("all prices");
    expect(verdicts()).toHaveLength(5);
  });

  it("has the five verdicts in their order, each with a word and a number", () => {
    render(<Open finding={finding} />);
    const breaks = finding.sample?.breaks ?? 0;
    expect(verdicts()).toEqual([
      expect.stringMatching(/^Adding-upholdslargest column sum/),
      "HomogeneityimposedLR 6.2 on 5, p 0.286",
      "SymmetryimposedLR 18.1 on 10, p 0.053",
      `Negativityat base pointbreaks in ${breaks} rows, ${printPercent(breaks / 900)}`,
      expect.stringMatching(/^Monotonicity/),
    ]);
  });

  it("does not state negativity without homogeneity, and says why", () => {
    const free = sampleFitted([]);
    const without = sampleSlutsky("share", { ...free, imposed: ["homogeneity"] });
    const unstated = {
      ...without,
      at: {
        ...without.at,
        eigenvalues: [],
        checks: {
          ...without.at.checks,
          homogeneity: { size: 0.1, holds: false, status: "free" as const },
          negativity: { stated: false },
        },
      },
      sample: undefined,
    };
    render(<Open finding={unstated} />);
    expect(verdicts()[3]).toBe("Negativitynot statedneeds homogeneity");
    expect(screen.getByText(/indefinite by construction/)).toBeInTheDocument();
    expect(screen.queryByText("By tenth of expenditure")).not.toBeInTheDocument();
  });

  it("names the rows where negativity breaks, worst first, the rest one press away", async () => {
    render(<Open finding={finding} />);
    const table = screen.getByRole("group", { name: "Rows where a law breaks" });
    const rows = () => within(table).getAllByRole("row").slice(1);
    expect(rows()).toHaveLength(5);
    const [worst] = finding.brokenRows;
    expect(rows()[0]).toHaveTextContent(printCount(worst.row));
    expect(rows()[0]).toHaveTextContent(printFixed(worst.largestEigenvalue ?? 0, 4));
    await userEvent.click(screen.getByRole("button", { name: `All ${finding.brokenRows.length} rows` }));
    expect(rows()).toHaveLength(finding.brokenRows.length);
  });

  it("has the numbers of every figure as a table", async () => {
    render(<Open finding={finding} />);
    await userEvent.click(screen.getByText(/^of share of rows where negativity holds/i));
    const numbers = screen.getByRole("group", { name: /Share of rows where negativity holds, by tenth/ });
    const cells = within(numbers)
      .getAllByRole("row")
      .slice(1)
      .map((row) => row.textContent);
    expect(cells).toEqual(finding.sample?.byTenth.map((share, index) => `${index + 1}${printPercent(share)}`));
  });

  it("tells on its source page how each check is made", () => {
    if (!Aside) throw new Error("a slutsky cell explains its checks");
    render(<Aside finding={finding} />);
    expect(screen.getByText(/No eigenvalue is positive/)).toBeInTheDocument();
    expect(screen.getByText(/Tolerance/)).toHaveTextContent("Tolerance 1 × 10\u22128.");
  });
});

describe("a system cell", () => {
  const { Band, Open, tables } = CELL_PARTS.system;
  const finding = sampleSystem();

  it("shows coefficients with price terms folded, and unfolds them", async () => {
    render(<Band finding={finding} />);
    const coefficients = screen.getByRole("group", { name: "Coefficients of the share equations" });
    expect(within(coefficients).queryByRole("rowheader", { name: /ln p, grains/ })).not.toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "Price terms Γ, 6 × 6" }));
    const row = within(coefficients).getByRole("row", { name: /ln p, grains/ });
    const gamma = finding.coefficients.find(({ block }) => block === "gamma");
    expect(row).toHaveTextContent(
      `${printFixed(gamma?.estimate ?? 0, 4)}(${printFixed(gamma?.standardError ?? 0, 4)})`,
    );
  });

  it("gives tests, fit and expenditure elasticities when opened", () => {
    render(<Open finding={finding} />);
    expect(screen.getByRole("row", { name: /^Symmetry given homogeneity 18\.1 10 0\.053/ })).toHaveTextContent(
      "not rejected at 5 per cent",
    );
    const eta = finding.expenditureElasticities[3];
    expect(screen.getByRole("row", { name: /^Meat & fish 1\.318/ })).toHaveTextContent(
      `${printFixed(eta.estimate, 3)}(${printFixed(eta.standardError, 3)})`,
    );
    expect(screen.getByText("Condition number").nextSibling).toHaveTextContent("5,400");
  });

  it("offers its coefficients to be copied first", () => {
    expect(tables(finding)[0].name).toBe("coefficients");
  });
});

describe("a data cell", () => {
  const { Band, Open } = CELL_PARTS.data;
  const finding = sampleData();

  it("says how many rows are used and describes every good", () => {
    render(<Band finding={finding} />);
    expect(screen.getByText(/^900 of 923 rows are used\./)).toBeInTheDocument();
    expect(
      screen.getByRole("row", { name: /^Sweet drinks 0\.0641 0\.0337 3\.2\s% 4\.80 0\.201$/ }),
    ).toBeInTheDocument();
    expect(screen.getByText(/Shares sum to 1\./)).toBeInTheDocument();
  });

  it("accounts for every row and says where the rows left out stand", () => {
    render(<Open finding={finding} />);
    const account = screen.getByRole("table", { name: /Row accounting/ });
    expect(within(account).getByRole("row", { name: /Rows uploaded .* 923/ })).toBeInTheDocument();
    expect(
      within(account).getByRole("row", { name: /a price missing rows 500, 501, 502 and 5 more/ }),
    ).toHaveTextContent("\u22128");
    expect(within(account).getByRole("row", { name: /Rows used 900/ })).toBeInTheDocument();
  });
});
