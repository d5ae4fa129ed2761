import { estimateCell, textCell } from "./cells.ts";
import { DECIMALS } from "./numbers.ts";
import { type MatrixFinding, withArticle } from "./slutsky-matrix.ts";
import type { LabelledTable } from "./table.ts";

/** The n − 1 eigenvalues away from the null direction, largest first, with the direction each moves prices in. */
export function eigenvalueTable(finding: MatrixFinding): LabelledTable {
  return {
    name: "eigenvalues",
    title: `Eigenvalues of the Slutsky matrix, share form, symmetrised, at ${withArticle(finding.pointName)}`,
    corner: "Eigenvalue",
    columns: [{ label: "Direction of prices" }, { label: "Estimate" }],
    rows: finding.at.eigenvalues.map((eigenvalue, index) => ({
      label: String(index + 1),
      cells: [textCell(eigenvalue.direction), estimateCell(eigenvalue.value, eigenvalue.standardError, DECIMALS.entry)],
    })),
    notes: ["Estimate over (standard error). All prices together have eigenvalue 0 and are set aside."],
  };
}
