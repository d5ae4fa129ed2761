import { useState } from "react";
import type { SlutskyFinding } from "../../../shared/schemas/slutsky.ts";
import { listWords } from "../../../shared/study/words.ts";
import { DECIMALS, printCount, printFixed } from "../../../shared/tables/numbers.ts";
import { Table } from "../../components/table.tsx";

type BrokenRow = SlutskyFinding["brokenRows"][number];
const FIRST = 5;

function also(row: BrokenRow): string {
  if (row.notDefined !== undefined) return `not defined: ${row.notDefined}`;
  if (!row.breaks.includes("monotonicity")) return "";
  const which = (row.lowestShare ?? 0) < 0 ? "a share below 0" : "a share above 1";
  return row.breaks.includes("negativity") ? `monotonicity breaks, ${which}` : `monotonicity only, ${which}`;
}

function eigenvalueOf({ largestEigenvalue, notDefined }: BrokenRow): string {
  if (largestEigenvalue !== undefined) return printFixed(largestEigenvalue, DECIMALS.entry);
  return notDefined === undefined ? "not stated" : "";
}

function sharesOf({ lowestShare, highestShare }: BrokenRow): string {
  if (lowestShare === undefined || highestShare === undefined) return "none";
  return `${printFixed(lowestShare, 3)}, ${printFixed(highestShare, 3)}`;
}

/** The rows of the upload where the system is not defined or a law breaks, worst first. */
export function BrokenRows({ rows, total }: { rows: readonly BrokenRow[]; total: number }) {
  const [all, setAll] = useState(false);
  const shown = all ? rows : rows.slice(0, FIRST);
  const more = rows.length > FIRST;
  // Said of all rows, shown or not, so that no column comes or goes with the switch.
  const hasAlso = rows.some((row) => also(row) !== "");
  return (
    <>
      <div className="flex items-baseline justify-between gap-4">
        <h2 className="type-section">Where it breaks</h2>
        {more && (
          <button type="button" aria-expanded={all} onClick={() => setAll(!all)} className="word type-small">
            {all ? `First ${FIRST} rows` : `All ${printCount(rows.length)} rows`}
          </button>
        )}
      </div>
      <Table
        className="mt-1"
        caption="Rows where a law breaks"
        heads={[
          { key: "row", content: "Row of the upload" },
          { key: "total", content: "Expenditure, units uploaded" },
          { key: "eigenvalue", content: "Largest eigenvalue" },
          { key: "goods", content: "Goods that break it", align: "left" },
          { key: "shares", content: "Lowest and highest share" },
          ...(hasAlso ? [{ key: "also", content: "Also", align: "left" } as const] : []),
        ]}
        lines={shown.map((row) => ({
          key: String(row.row),
          head: printCount(row.row),
          cells: [
            printFixed(row.total, DECIMALS.money),
            eigenvalueOf(row),
            listWords(row.goods),
            sharesOf(row),
            ...(hasAlso ? [also(row)] : []),
          ],
        }))}
      />
      {rows.length < total && (
        <p className="mt-1.5 type-small text-ink2">
          The {printCount(rows.length)} worst of {printCount(total)} rows.
        </p>
      )}
    </>
  );
}
