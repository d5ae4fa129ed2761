import type { ReactNode } from "react";
import { useId } from "react";
import type { ZerosFinding } from "../../../shared/schemas/first-steps.ts";
import { boughtByAll, probitTable } from "../../../shared/tables/first-steps.ts";
import { zerosSentences } from "../../../shared/tables/first-steps-words.ts";
import type { TableCell } from "../../../shared/tables/table.ts";
import { rowHead } from "../../../shared/tables/table.ts";
import { Estimate, Printed } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";
import { CopyTable } from "../copy-table.tsx";

function shown(cell: TableCell, key: string): ReactNode {
  if (cell.kind === "empty") return null;
  if (cell.kind === "text") return cell.text;
  if (cell.kind === "number") return <Printed key={key} text={cell.printed} />;
  return <Estimate key={key} value={cell.printed} error={cell.printedError} />;
}

/** The probits of the goods that some rows do not buy, and what the two steps do to adding-up. */
export function ZerosView({ zeros }: { zeros: ZerosFinding }) {
  const id = useId();
  const table = probitTable(zeros);
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-6">
        <h2 id={id} className="type-section">
          Goods not bought, in two steps
        </h2>
        <CopyTable table={table} />
      </div>
      <Table
        caption={table.title}
        heads={[
          { key: "regressor", content: table.corner },
          ...table.columns.map(({ label }) => ({ key: label, content: label })),
        ]}
        lines={table.rows.map((row) => ({
          key: rowHead(row),
          head: rowHead(row),
          cells: row.cells.map((cell, at) => shown(cell, table.columns[at].label)),
        }))}
      />
      <p className="type-small mt-2 text-ink2">{[...boughtByAll(zeros), ...zerosSentences(zeros)].join(" ")}</p>
    </section>
  );
}
