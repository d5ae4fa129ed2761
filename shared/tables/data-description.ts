import type { DataFinding } from "../schemas/data.ts";
import { numberCell, percentCell } from "./cells.ts";
import { countedRows } from "./phrases.ts";
import type { LabelledTable } from "./table.ts";

/** Shares and prices of every good over the rows used. */
export function dataDescriptionTable(finding: DataFinding): LabelledTable {
  const weighted = finding.weighted ? "weighted" : "not weighted";
  return {
    name: "data-description",
    title: `Shares and prices over ${countedRows(finding.accounting.used)} used, ${weighted}`,
    corner: "Good",
    columns: [
      { label: "Mean share" },
      { label: "Std. dev. of share" },
      { label: "Bought none" },
      { label: "Mean price", unit: "units uploaded" },
      { label: "Std. dev. ln p" },
    ],
    rows: finding.goods.map((good) => ({
      label: good.name,
      cells: [
        numberCell(good.meanShare, "share"),
        numberCell(good.shareDeviation, "share"),
        percentCell(good.boughtNone),
        numberCell(good.meanPrice, "money"),
        numberCell(good.logPriceDeviation, "deviation"),
      ],
    })),
    notes: ["Prices in the units uploaded."],
  };
}
