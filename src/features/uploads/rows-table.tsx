import type { RowsPage } from "../../../shared/schemas/rows.ts";
import { printCount } from "../../../shared/tables/numbers.ts";
import { TableScroller } from "../../components/table-scroller.tsx";

interface RowsTableProps {
  readonly page: RowsPage;
  readonly label: string;
  /** What stands below a column's name: how it lies in the whole upload. */
  readonly about?: (column: string) => string | undefined;
}

/** Rows as they stand in the file: numbers as they were read, a dash where there is nothing. */
export function RowsTable({ page, label, about }: RowsTableProps) {
  return (
    <TableScroller label={label} className="max-h-[55dvh] overflow-y-auto border-line border-y">
      <table className="rows-table">
        <thead>
          <tr>
            <th scope="col">Row</th>
            {page.columns.map((column, place) => (
              <th key={place} scope="col" className={column.type === "number" ? "text-right" : "text-left"}>
                <span className="type-source block whitespace-nowrap">{column.name}</span>
                <span className={`block max-w-[14rem] text-ink2 ${column.type === "number" ? "ml-auto" : ""}`}>
                  {column.says ?? about?.(column.name)}
                </span>
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {page.rows.map(({ row, cells }) => (
            <tr key={row}>
              <th scope="row">{printCount(row)}</th>
              {cells.map((cell, place) => (
                <td key={place} className={page.columns[place].type === "number" ? "text-right" : ""}>
                  {cell === null ? <Missing /> : typeof cell === "number" ? digits(cell) : cell}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </TableScroller>
  );
}

function Missing() {
  return (
    <>
      <span aria-hidden="true" className="text-ink3">
        –
      </span>
      <span className="sr-only">missing</span>
    </>
  );
}

/** All that is known of a number, short of the noise of its last places. */
function digits(value: number): string {
  return String(Number(value.toPrecision(12))).replace("-", "\u2212");
}
