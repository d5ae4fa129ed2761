import { render, screen } from "@testing-library/react";
import { expect, it } from "vitest";
import { sampleSystem } from "../../support/sample-findings.ts";
import { CELL_PARTS } from "../cell-parts.ts";

it("shows a system in differences without curves of shares, of which it predicts none", () => {
  const { Open } = CELL_PARTS.system;
  const sample = sampleSystem();
  const finding = {
    ...sample,
    rows: 99,
    equations: { explains: "contributions to volume" as const, leftOut: 1, because: ["differences" as const], gaps: 0 },
    engel: { logTotal: [], shares: sample.fitted.goods.map(() => []) },
  };
  const { unmount } = render(<Open finding={sample} />);
  expect(screen.getByText(/Share against ln/)).toBeInTheDocument();
  unmount();
  render(<Open finding={finding} />);
  expect(screen.queryByText(/Share against ln/)).not.toBeInTheDocument();
  expect(screen.getByText(/elasticities stand at observed shares/)).toBeInTheDocument();
  expect(screen.getByRole("group", { name: "Coefficients of the share equations" })).toBeInTheDocument();
});
