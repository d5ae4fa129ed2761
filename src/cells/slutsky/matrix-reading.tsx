import { useState } from "react";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { usePhone } from "../../components/use-media.ts";
import { EntryPanel, type PanelFinding } from "./entry-panel.tsx";
import { MatrixLegend } from "./legend.tsx";
import { MatrixField } from "./matrix.tsx";
import type { Place } from "./moves.ts";
import { matrixSetting, shownMatrix } from "./shown-matrix.ts";
import { printedSums } from "./sums.ts";

interface MatrixReadingProps {
  readonly finding: PanelFinding;
  readonly form: "share" | "quantity";
  /** Row and column sums, share form only: a quantity form's rows have different units. */
  readonly sums?: boolean;
  /** What stands beside the matrix above the entry's panel: its heading and its eigenvalues. */
  readonly beside?: React.ReactNode;
}

/** The matrix with the entry pointed at read out beside it, or below it where there is no room. */
export function MatrixReading({ finding, form, sums = false, beside }: MatrixReadingProps) {
  const phone = usePhone();
  const [pointed, setPointed] = useState<Place>([0, 1]);
  const setting = matrixSetting(finding.fitted.goods.length, phone, true);
  const shown = shownMatrix(finding, form, setting);
  const label = `Slutsky matrix, ${shown.name}, at ${withArticle(finding.pointName)}`;
  const printed = sums && form === "share" && !phone ? printedSums(shown.entries, finding.at.checks) : undefined;
  return (
    <div className="gap-x-12 gap-y-6 min-[1180px]:grid min-[1180px]:grid-cols-[minmax(0,auto)_minmax(16rem,1fr)]">
      <div className="max-w-max">
        <MatrixField
          shown={shown}
          setting={setting}
          label={label}
          pointed={pointed}
          onPoint={setPointed}
          sums={printed}
        />
        <div className="mt-2 min-[600px]:pl-26 max-[599px]:w-full">
          <MatrixLegend steps={shown.steps} />
        </div>
      </div>
      <div className="mt-5 min-[1180px]:mt-0">
        {beside}
        <EntryPanel finding={finding} shown={shown} place={pointed} brief={phone} />
      </div>
    </div>
  );
}
