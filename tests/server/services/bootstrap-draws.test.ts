import { describe, expect, it } from "vitest";
import { presentFinding } from "../../../server/presenters/findings.ts";
import { sealedContentOf } from "../../../server/services/sealed-content.ts";
import { systemFinding } from "../../../shared/schemas/system.ts";
import { exampleFindings } from "../../support/findings.ts";

/** Recognisable wherever it turns up. */
const DRAWN = 0.123456789;
const { data, system: plain, slutsky } = exampleFindings();
const system = systemFinding.parse({
  ...plain,
  standardErrors: "bootstrap",
  bootstrap: {
    of: "rows",
    replicates: 20,
    failed: 0,
    seed: 1,
    intervals: plain.coefficients.map(() => [0, 1]),
    draws: Array.from({ length: 20 }, () => plain.fitted.theta.map(() => DRAWN)),
  },
});

describe("the draws of a bootstrap stay with the program", () => {
  it("are kept with the stored finding", () => expect(JSON.stringify(system)).toContain(String(DRAWN)));

  it("do not go to a browser, while their intervals and covariance do", () => {
    const { finding } = presentFinding({ finding: system, foundAt: 0, tookMs: 1 } as never);
    expect(JSON.stringify(finding)).not.toContain(String(DRAWN));
    const { draws: _, ...rest } = system.bootstrap!;
    expect(finding).toEqual({ ...system, bootstrap: rest });
    expect(systemFinding.parse(finding)).toEqual(finding);
  });

  it("do not go into a referee copy", () => {
    const cell = (name: string, kind: string) => ({ id: name, name, kind, source: "upload: a.csv\n" }) as never;
    const about = { program: "1", title: "t", authors: undefined, note: "", sealedAt: new Date(0) };
    const sealed = sealedContentOf(about, {
      matrix: { cell: cell("m", "slutsky"), finding: slutsky },
      system: { cell: cell("s", "system"), finding: system },
      data: { cell: cell("d", "data"), finding: data },
    });
    expect(JSON.stringify(sealed)).not.toContain(String(DRAWN));
    expect(sealed.system.bootstrap).toMatchObject({ of: "rows", replicates: 20, seed: 1 });
  });
});
