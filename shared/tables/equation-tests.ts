import type { MadeTest, TestsFinding } from "../schemas/tests.ts";
import { estimateCell, numberCell } from "./cells.ts";
import { DECIMALS, printProbability } from "./numbers.ts";
import type { LabelledTable } from "./table.ts";

export function equationsOf({ tests }: Pick<TestsFinding, "tests">): NonNullable<MadeTest["equations"]> {
  return tests.flatMap((test) => ("equations" in test && test.equations) || []);
}

/** Homogeneity equation by equation. */
export function equationTestsTable(finding: TestsFinding): LabelledTable {
  const equations = equationsOf(finding);
  const freedom = equations[0]?.freedom;
  return {
    name: "homogeneity-by-equation",
    title: "Homogeneity of each share equation",
    corner: "Share equation",
    columns: [{ label: "Sum of price terms" }, { label: "t" }, { label: "p" }],
    rows: equations.map(({ good, sum, standardError, t, pValue }) => ({
      label: good,
      cells: [
        estimateCell(sum, standardError, DECIMALS.coefficient),
        numberCell(t, "fit"),
        { kind: "number", value: pValue, printed: printProbability(pValue) },
      ],
    })),
    notes: [
      freedom === undefined
        ? "t against the normal distribution."
        : `t on ${freedom} degrees of freedom, the rows less the coefficients of an equation.`,
    ],
  };
}
