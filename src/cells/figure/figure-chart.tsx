import { useCallback } from "react";
import type { FigureFinding } from "../../../shared/schemas/figure.ts";
import { figureSentence } from "../../../shared/tables/figure-words.ts";
import { columnHead, type LabelledTable, rowHead, type TableCell } from "../../../shared/tables/table.ts";
import { ChartNumbers } from "../../components/chart-numbers.tsx";
import { Estimate, Printed } from "../../components/number.tsx";
import { type FigureRoom, PlotlyChart, type TokenColour } from "../../components/plotly-chart.tsx";
import { drawFigure } from "./drawings/index.ts";
import { figureHeight } from "./figure-height.ts";

interface FigureProps {
  readonly finding: FigureFinding;
  readonly table: LabelledTable;
  readonly opened: boolean;
}

/** The figure, drawn when it comes near the window; its sentence stands for it where it is not seen, its numbers below. */
export function FigureChart({ finding, table, opened }: FigureProps) {
  const draw = useCallback((colour: TokenColour, room: FigureRoom) => drawFigure(finding, colour, room), [finding]);
  const height = useCallback((narrow: boolean) => figureHeight(finding, { opened, narrow }), [finding, opened]);
  return (
    <figure>
      <PlotlyChart
        label={`${table.title}. ${figureSentence(finding)}`}
        fileName={table.name}
        height={height}
        figure={draw}
      />
      <ChartNumbers
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
    </figure>
  );
}

function Shown({ cell }: { cell: TableCell }) {
  if (cell.kind === "empty") return null;
  if (cell.kind === "text") return cell.text;
  if (cell.kind === "number") return <Printed text={cell.printed} />;
  return <Estimate value={cell.printed} error={cell.printedError} />;
}
