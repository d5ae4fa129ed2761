import { type ReactNode, useState } from "react";
import { conditionally } from "../../../shared/tables/conditional.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { usePhone } from "../../components/use-media.ts";
import { EntryPanel, type PanelFinding } from "./entry-panel.tsx";
import { MatrixLegend, MatrixLegendLine } from "./legend.tsx";
import { MatrixField } from "./matrix.tsx";
import type { Place } from "./moves.ts";
import { matrixSetting, shownMatrix } from "./shown-matrix.ts";
import { printedSums } from "./sums.ts";

interface MatrixReadingProps {
  readonly finding: PanelFinding;
  readonly form: "share" | "quantity";
  /** Row and column sums, share form only: the rows of a quantity form have different units. */
  readonly sums?: boolean;
  /** What stands below the matrix; on a narrow page after the entry's reading. */
  readonly below?: ReactNode;
}

/** The matrix with the entry pointed at read out beside it, or below it where there is no room. */
export function MatrixReading({ finding, form, sums = false, below }: MatrixReadingProps) {
  const phone = usePhone();
  const [pointed, setPointed] = useState<Place>([0, 1]);
  const setting = matrixSetting(finding.fitted.goods.length, phone, true);
  const shown = shownMatrix(finding, form, setting);
  const label = `Slutsky matrix, ${shown.name}, at ${withArticle(finding.pointName)}${conditionally(finding)}`;
  const printed = sums && form === "share" && !phone ? printedSums(shown.entries, finding.at.checks) : undefined;
  return (
    <div className="@container">
      <div className="gap-x-9 @min-[52rem]:grid @min-[52rem]:grid-cols-[auto_minmax(15rem,1fr)] @min-[52rem]:grid-rows-[auto_1fr]">
        <div className="min-w-0">
          <MatrixField
            shown={shown}
            setting={setting}
            label={label}
            pointed={pointed}
            onPoint={setPointed}
            sums={printed}
          />
          <div className="mt-3">
            {setting === "errors" ? (
              <div className="ml-[104px]" style={{ maxWidth: 80 * shown.goods.length - 1 }}>
                <MatrixLegend steps={shown.steps} />
              </div>
            ) : (
              <MatrixLegendLine steps={shown.steps} />
            )}
          </div>
        </div>
        <div className="mt-5 @min-[52rem]:row-span-2 @min-[52rem]:mt-0">
          <EntryPanel finding={finding} shown={shown} place={pointed} brief={phone} />
        </div>
        {below && <div className="mt-6">{below}</div>}
      </div>
    </div>
  );
}
