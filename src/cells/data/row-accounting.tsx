import type { RowAccounting } from "../../../shared/schemas/data.ts";
import { printCount } from "../../../shared/tables/numbers.ts";
import { rowAccountingTable } from "../../../shared/tables/row-accounting.ts";
import { AccountTable } from "../../components/table-account.tsx";
import { TableScroller } from "../../components/table-scroller.tsx";
import { CopyTable } from "../copy-table.tsx";
import type { FormProps } from "../types.ts";
import { RowStrip } from "./row-strip.tsx";

const NAMED = 3;

/** "rows 18, 96, 141 and 60 more". */
function rowsInWords(rows: readonly number[], count: number): string {
  const named = rows.slice(0, NAMED).map(printCount).join(", ");
  const more = count - Math.min(rows.length, NAMED);
  const word = count === 1 ? "row" : "rows";
  return more > 0 ? `${word} ${named} and ${printCount(more)} more` : `${word} ${named}`;
}

interface WhereProps {
  readonly reason: RowAccounting["leftOut"][number];
  readonly uploaded: number;
  readonly onLook: FormProps["onLook"];
}

function Where({ reason, uploaded, onLook }: WhereProps) {
  const look = { about: JSON.stringify(["left out", reason.reason]), title: reason.label };
  return (
    <div className="grid grid-cols-1 items-center gap-x-4 min-[800px]:grid-cols-[minmax(8rem,1fr)_minmax(11rem,1fr)]">
      <RowStrip strip={reason.strip} rowsPerSlice={uploaded / reason.strip.length} />
      {onLook ? (
        <button type="button" className="word type-small text-left" onClick={() => onLook(look)}>
          <span className="sr-only">Look at </span>
          {rowsInWords(reason.rows, reason.count)}
        </button>
      ) : reason.rows.length > NAMED ? (
        <details className="type-small">
          <summary className="word list-none">{rowsInWords(reason.rows, reason.count)}</summary>
          <TableScroller label="Rows left out" className="max-h-40 overflow-y-auto">
            {reason.rows.map(printCount).join(", ")}
            {reason.rows.length < reason.count && `, and ${printCount(reason.count - reason.rows.length)} more`}
          </TableScroller>
        </details>
      ) : (
        <span className="type-small text-ink2">{rowsInWords(reason.rows, reason.count)}</span>
      )}
    </div>
  );
}

/** What became of every row of the upload: each left-out row under its reason, and where it stands in the file. */
export function RowAccountingView({ accounting, onLook }: { accounting: RowAccounting; onLook?: FormProps["onLook"] }) {
  const reasons = accounting.leftOut.filter((reason) => reason.count > 0);
  return (
    <section aria-labelledby="row-accounting">
      <div className="mb-1 flex items-baseline justify-between">
        <h2 id="row-accounting" className="type-section">
          Row accounting
        </h2>
        <CopyTable table={rowAccountingTable(accounting)} />
      </div>
      <AccountTable
        caption="Row accounting: rows uploaded, rows left out by reason, rows used"
        first={{
          key: "uploaded",
          label: "Rows uploaded",
          number: printCount(accounting.uploaded),
          between: reasons.length > 0 && (
            <div className="grid grid-cols-1 gap-x-4 type-small text-ink2 min-[800px]:grid-cols-[minmax(8rem,1fr)_minmax(11rem,1fr)]">
              <span className="flex justify-between gap-2">
                <span>row 1</span>
                <span>where in the file</span>
                <span>row {printCount(accounting.uploaded)}</span>
              </span>
            </div>
          ),
        }}
        lines={reasons.map((reason) => ({
          key: reason.label,
          label: reason.label,
          number: printCount(-reason.count),
          between: <Where reason={reason} uploaded={accounting.uploaded} onLook={onLook} />,
        }))}
        total={{ key: "used", label: "Rows used", number: printCount(accounting.used) }}
      />
    </section>
  );
}
