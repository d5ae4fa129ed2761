import { figureTable } from "../../../shared/tables/figure.ts";
import { figureSentence } from "../../../shared/tables/figure-words.ts";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { FigureChart } from "./figure-chart.tsx";
import { FigureCaution, FigureNotes, FigureVerdicts } from "./notes.tsx";

/** A figure in full: as large as the page lets it be, its numbers to copy. */
export function FigureOpen({ finding }: OpenProps<"figure">) {
  const table = figureTable(finding);
  return (
    <div className="space-y-6">
      <OpenHead sentence={figureSentence(finding)}>
        <CopyTable table={table} />
      </OpenHead>
      <FigureVerdicts finding={finding} detail />
      <FigureCaution finding={finding} />
      <section aria-label={table.title} className="space-y-2">
        <h2 className="type-section">{table.title}</h2>
        <FigureChart finding={finding} table={table} opened />
      </section>
      <FigureNotes finding={finding} />
    </div>
  );
}
