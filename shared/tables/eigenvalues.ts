import { EMPTY, estimateCell, textCell } from "./cells.ts";
import { conditionally } from "./conditional.ts";
import { DECIMALS, printFixed, THIN_SPACE } from "./numbers.ts";
import { type MatrixFinding, withArticle } from "./slutsky-matrix.ts";
import type { LabelledTable, TableCell } from "./table.ts";

/** The n − 1 eigenvalues away from the null direction, largest first, with the direction each moves prices in. */
export function eigenvalueTable(finding: MatrixFinding): LabelledTable {
  const hasIntervals = finding.at.eigenvalues.some(({ interval }) => interval !== undefined);
  return {
    name: "eigenvalues",
    title: `Eigenvalues of the Slutsky matrix, share form, symmetrised, at ${withArticle(finding.pointName)}${conditionally(finding)}`,
    corner: "Eigenvalue",
    columns: [
      { label: "Direction of prices" },
      { label: "Estimate" },
      ...(hasIntervals ? [{ label: PERCENTILE_INTERVAL }] : []),
    ],
    rows: finding.at.eigenvalues.map((eigenvalue, index) => ({
      label: String(index + 1),
      cells: [
        textCell(eigenvalue.direction),
        estimateCell(eigenvalue.value, eigenvalue.standardError, DECIMALS.entry),
        ...(hasIntervals ? [intervalCell(eigenvalue.interval)] : []),
      ],
    })),
    notes: ["Estimate over (standard error). All prices together have eigenvalue 0 and are set aside."],
  };
}

const PERCENTILE_INTERVAL = `95${THIN_SPACE}% interval, percentiles of the bootstrap`;

function intervalCell(interval: readonly [number, number] | undefined): TableCell {
  if (interval === undefined) return EMPTY;
  return textCell(`${printFixed(interval[0], DECIMALS.entry)} to ${printFixed(interval[1], DECIMALS.entry)}`);
}
