import { expect, it } from "vitest";
import { sealedContentOf } from "../../../server/services/sealed-content.ts";
import { sampleData, sampleSlutsky, sampleSystem } from "../../support/sample-findings.ts";

it("counts in a referee copy the rows whose committed expenditure takes all, and names none", () => {
  const system = {
    ...sampleSystem(),
    expenditure: { withoutSupernumerary: { rows: 2, weightedShare: 0.5, firstRows: [700_001, 700_002] }, atBound: [] },
  };
  const cell = (name: string, kind: string) => ({ id: name, name, kind, source: "upload: a.csv\n" }) as never;
  const about = { program: "1", title: "t", authors: undefined, note: "", sealedAt: new Date(0) };
  const sealed = sealedContentOf(about, {
    matrix: { cell: cell("m", "slutsky"), finding: sampleSlutsky() },
    system: { cell: cell("s", "system"), finding: system },
    data: { cell: cell("d", "data"), finding: sampleData() },
  });
  expect(JSON.stringify(sealed)).not.toContain("700001,700002");
  expect(sealed.system.expenditure!.withoutSupernumerary).toEqual({ rows: 2, weightedShare: 0.5, firstRows: [] });
});
