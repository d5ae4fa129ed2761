import { useState } from "react";
import type { Incidence, NamedRow } from "../../../shared/schemas/price-change.ts";
import { DECIMALS, printCount, printFixed } from "../../../shared/tables/numbers.ts";
import { Table } from "../../components/table.tsx";

const FIRST = 5;

const outsideWords = ({ outside }: NamedRow) =>
  outside
    .map(({ good, share, of, when }) => {
      const whose = of === "system" ? `predicted ${when}` : `bought ${when}`;
      return `${good} ${printFixed(share, DECIMALS.share)}, ${whose}`;
    })
    .join("; ");

/** Rows without an answer, or with a share outside 0 to 1: worst first, by their number in the upload. */
export function NamedRows({ incidence: { brokenRows: named, namedRows } }: { incidence: Incidence }) {
  const [all, setAll] = useState(false);
  if (named.length === 0) return null;
  const shown = all ? named : named.slice(0, FIRST);
  return (
    <section aria-label="Rows named">
      <div className="flex items-baseline justify-between gap-4">
        <h3 className="text-[0.9375rem]/[1.375rem] font-semibold">Rows to look at</h3>
        {named.length > FIRST && (
          <button type="button" aria-expanded={all} onClick={() => setAll(!all)} className="word type-small">
            {all ? `First ${FIRST} rows` : `All ${printCount(named.length)} rows`}
          </button>
        )}
      </div>
      <Table
        className="mt-1"
        caption="Rows without an answer, or with a share outside 0 to 1"
        heads={[
          { key: "row", content: "Row of the upload" },
          { key: "total", content: "Expenditure" },
          { key: "why", content: "Why", align: "left" },
        ]}
        lines={shown.map((row) => ({
          key: String(row.row),
          head: printCount(row.row),
          cells: [
            printFixed(row.total, DECIMALS.money),
            row.notDefined === undefined ? outsideWords(row) : `in none of the means: ${row.notDefined}`,
          ],
        }))}
      />
      {named.length < namedRows && (
        <p className="mt-1.5 type-small text-ink2">
          The {printCount(named.length)} worst of {printCount(namedRows)} rows.
        </p>
      )}
    </section>
  );
}
