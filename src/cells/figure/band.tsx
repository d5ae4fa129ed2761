import { figureTable } from "../../../shared/tables/figure.ts";
import { figureSentence } from "../../../shared/tables/figure-words.ts";
import { Headline } from "../headline.tsx";
import type { BandProps } from "../types.ts";
import { FigureChart } from "./figure-chart.tsx";
import { FigureCaution, FigureNotes, FigureVerdicts } from "./notes.tsx";

/** A figure in its band: sentence, verdicts, the figure at modest height, conventions. */
export function FigureBand({ finding }: BandProps<"figure">) {
  return (
    <div className="space-y-3">
      <Headline sentence={figureSentence(finding)} />
      <FigureVerdicts finding={finding} />
      <FigureCaution finding={finding} />
      <FigureChart finding={finding} table={figureTable(finding)} opened={false} />
      <FigureNotes finding={finding} />
    </div>
  );
}
