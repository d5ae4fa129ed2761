import { columnHead, type LabelledTable, rowHead, type TableCell } from "../../../shared/tables/table.ts";
import { Estimate, Printed } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";

/** A finding's table as it is copied, shown. */
export function FindingTable({ table }: { table: LabelledTable }) {
  return (
    <Table
      caption={table.title}
      heads={[
        { key: "corner", content: table.corner },
        ...table.columns.map((column) => ({ key: column.label, content: columnHead(column) })),
      ]}
      lines={table.rows.map((row) => ({
        key: row.label,
        head: rowHead(row),
        cells: row.cells.map((cell, at) => <Shown key={table.columns[at].label} cell={cell} />),
      }))}
    />
  );
}

function Shown({ cell }: { cell: TableCell }) {
  if (cell.kind === "empty") return null;
  if (cell.kind === "text") return cell.text;
  if (cell.kind === "number") return <Printed text={cell.printed} />;
  return <Estimate value={cell.printed} error={cell.printedError} interval={cell.printedInterval} />;
}
