import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { MadeTest, TestsFinding } from "../../../shared/schemas/tests.ts";
import { TestsForm } from "../../../src/cells/tests/form.tsx";
import { exampleFindings } from "../../support/findings.ts";
import { berndtWoodHomogeneity } from "../../support/made-tests.ts";
import { CELL_PARTS } from "../cell-parts.ts";

const { Band, Open, tables } = CELL_PARTS.tests;

const homogeneity: MadeTest = {
  ...berndtWoodHomogeneity,
  equations: [{ good: "capital", sum: 0.02, standardError: 0.0085, t: 2.361, freedom: 20, pValue: 0.0285 }],
};

function finding(more: Partial<TestsFinding> = {}): TestsFinding {
  const [, nothing] = exampleFindings().tests.tests;
  return { ...exampleFindings().tests, rows: 25, weighted: false, tests: [homogeneity, nothing], ...more };
}

const revealed = {
  rows: 338,
  pairs: 52,
  directPairs: 40,
  rowsInvolved: 31,
  index: 0.98714,
  cycle: [12, 40],
  periods: false,
  weighted: true,
};

describe("tests in their band", () => {
  it("say what is not rejected, never that it holds, beside each statistic", () => {
    render(<Band finding={finding()} />);
    expect(
      screen.getByText(/^The data do not reject homogeneity at 5 per cent; that is no proof of it\.$/),
    ).toBeVisible();
    const [, row] = within(screen.getByRole("table")).getAllByRole("row");
    expect(row).toHaveTextContent(/Homogeneity10\.430\.016F\(3, 18\) 3\.09, p 0\.053not rejected/);
    expect(row.querySelector("[data-shape='holds here']")).not.toBeNull();
    expect(screen.getByText(/The system names no demographics\./)).toBeInTheDocument();
    expect(screen.getByText(/Laitinen’s \(1978\) F is exact here/)).toBeInTheDocument();
  });

  it("lead with Wald where errors are clustered", () => {
    render(<Band finding={finding({ covariance: { cluster: "village" } })} />);
    expect(screen.getByRole("columnheader", { name: "Wald" })).toBeInTheDocument();
    expect(screen.getByText(/The data reject homogeneity/)).toBeInTheDocument();
    expect(screen.getByText(/clustered by village/)).toBeInTheDocument();
  });

  it("lead with Wald where no likelihood ratio could be made", () => {
    const absent = { absent: "Of this form hypotheses are tested by Wald." };
    const alone = { ...homogeneity, likelihoodRatio: absent, score: absent, corrected: absent, laitinen: absent };
    render(<Band finding={finding({ tests: [alone] })} />);
    expect(screen.getByRole("columnheader", { name: "Wald" })).toBeInTheDocument();
    expect(screen.getByRole("row", { name: /^Homogeneity/ })).toHaveTextContent(/12\.930\.005rejected/);
  });

  it("of data alone show revealed preference with its cautions", () => {
    render(<Band finding={finding({ tests: [], covariance: undefined, revealed })} />);
    expect(screen.getByText(/31 of 338 rows contradict one another/)).toBeInTheDocument();
    expect(screen.getByRole("row", { name: /efficiency index/ })).toHaveTextContent("0.9871");
    expect(screen.getByText(/no sequence of one consumer’s choices/)).toBeInTheDocument();
    expect(screen.getByText(/weights do not enter/)).toBeInTheDocument();
  });
});

describe("tests in full", () => {
  it("give every statistic, what it means and homogeneity by equation", () => {
    render(<Open finding={finding()} />);
    const statistics = screen.getByRole("group", { name: /Wald, likelihood ratio, score/ });
    expect(within(statistics).getByRole("row", { name: /^Homogeneity/ })).toHaveTextContent(
      /3\s*12\.86p 0\.00510\.38p 0\.0168\.49p 0\.0377\.68p 0\.05310\.29F\(3, 18\) 3\.09p 0\.053/,
    );
    expect(
      screen.getByText(/The plain likelihood ratio rejects: asymptotic tests reject too often/),
    ).toBeInTheDocument();
    const equations = screen.getByRole("group", { name: "Homogeneity of each share equation" });
    expect(within(equations).getByRole("row", { name: /Capital/ })).toHaveTextContent("2.36");
    expect(screen.getByText(/t on 20 degrees of freedom/)).toBeInTheDocument();
  });

  it("say why a statistic is missing", () => {
    const absent = { absent: "The moments are singular: α is not told apart." };
    const narrow = { ...homogeneity, wald: absent, likelihoodRatio: absent, corrected: absent, laitinen: absent };
    render(<Open finding={finding({ tests: [narrow] })} />);
    expect(screen.getByText(/^No Wald, LR, Corrected LR, exact test: The moments are singular/)).toBeInTheDocument();
    expect(screen.getByText("LM, p 0.037")).toBeInTheDocument();
  });

  it("say why revealed preference was not compared", () => {
    render(<Open finding={finding({ revealed: { absent: "the data have 4812 rows used, and at most 3000" } })} />);
    expect(screen.getByText(/4812 rows used, and at most 3000/)).toBeInTheDocument();
  });

  it("have a table to copy for each part", () => {
    expect(tables(finding({ revealed })).map(({ name }) => name)).toEqual([
      "tests",
      "homogeneity-by-equation",
      "revealed-preference",
    ]);
  });
});

function Form({ first }: { first: string }) {
  const [source, setSource] = useState(first);
  const cells = [
    { id: "1", name: "survey", kind: "data", order: "a", source: "" },
    { id: "2", name: "base", kind: "system", order: "b", source: "" },
  ];
  return (
    <>
      <TestsForm source={source} onChange={setSource} readOnly={false} context={{ cells, uploads: [] }} />
      <pre data-testid="source">{source}</pre>
    </>
  );
}

describe("the form", () => {
  const source = () => screen.getByTestId("source").textContent;

  it("writes what is tested and at which level, comments kept", async () => {
    const user = userEvent.setup();
    render(<Form first={"# the laws\nsystem: base\n"} />);
    await user.click(screen.getByRole("checkbox", { name: "symmetry" }));
    await user.click(screen.getByRole("checkbox", { name: "homogeneity" }));
    await user.clear(screen.getByRole("textbox", { name: "Level" }));
    await user.type(screen.getByRole("textbox", { name: "Level" }), "0.01{Enter}");
    expect(source()).toBe("# the laws\nsystem: base\nof: [homogeneity, symmetry]\nlevel: 0.01\n");
  });

  it("turns from a system to data alone and back", async () => {
    const user = userEvent.setup();
    render(<Form first={"system: base\nof: [homogeneity]\n"} />);
    await user.click(screen.getByRole("radio", { name: "choices alone, without a model" }));
    expect(source()).toBe("data: survey\n");
    expect(screen.queryByRole("checkbox")).not.toBeInTheDocument();
    await user.click(screen.getByRole("radio", { name: "a system’s restrictions" }));
    expect(source()).toBe("system: base\n");
  });
});
