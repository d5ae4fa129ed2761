import { conditionally } from "../../../shared/tables/conditional.ts";
import { slutskySentence } from "../../../shared/tables/sentence.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { usePhone } from "../../components/use-media.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { Headline } from "../headline.tsx";
import type { BandProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { EigenvalueList } from "./eigenvalue-list.tsx";
import { MatrixLegendLine } from "./legend.tsx";
import { MatrixField } from "./matrix.tsx";
import { matrixSetting, shownMatrix } from "./shown-matrix.ts";

/** The matrix in its band: sentence, verdicts, the coloured field, eigenvalues beside it. */
export function SlutskyBand({ finding }: BandProps<"slutsky">) {
  const phone = usePhone();
  const setting = matrixSetting(finding.fitted.goods.length, phone, false);
  const shown = shownMatrix(finding, finding.form, setting);
  const label = `Slutsky matrix, ${shown.name}, at ${withArticle(finding.pointName)}${conditionally(finding)}`;
  return (
    <div className="space-y-3">
      <Headline sentence={slutskySentence(finding)} />
      <VerdictStrip
        label="What theory says of the matrix"
        verdicts={stripOf(verdictsOf(finding.at.checks, finding.tests))}
      />
      <div className="flex flex-wrap items-start justify-between gap-x-6 gap-y-4">
        <div className="min-w-0 max-w-full">
          <MatrixField shown={shown} setting={setting} label={label} />
        </div>
        {finding.at.eigenvalues.length > 0 && (
          <div className="pt-6">
            <EigenvalueList eigenvalues={finding.at.eigenvalues} />
          </div>
        )}
      </div>
      <MatrixLegendLine steps={shown.steps} />
    </div>
  );
}
