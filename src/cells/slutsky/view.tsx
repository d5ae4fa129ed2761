import { slutskySentence } from "../../../shared/tables/sentence.ts";
import { slutskyTable, withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { slutskyVerdicts, verdictsOf } from "../../../shared/tables/verdicts.ts";
import { usePhone } from "../../components/use-media.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { CopyTable } from "../copy-table.tsx";
import { Headline, OpenHead } from "../headline.tsx";
import type { BandProps, OpenProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { BrokenRows } from "./broken-rows.tsx";
import { EigenvalueList } from "./eigenvalue-list.tsx";
import { Eigenvalues, NegativityOverSample } from "./figures.tsx";
import { MatrixLegendLine } from "./legend.tsx";
import { MatrixField } from "./matrix.tsx";
import { MatrixReading } from "./matrix-reading.tsx";
import { matrixSetting, shownMatrix } from "./shown-matrix.ts";

/** The matrix in its band: sentence, verdicts, the coloured field, eigenvalues beside it. */
export function SlutskyBand({ finding }: BandProps<"slutsky">) {
  const phone = usePhone();
  const setting = matrixSetting(finding.fitted.goods.length, phone, false);
  const shown = shownMatrix(finding, finding.form, setting);
  const label = `Slutsky matrix, ${shown.name}, at ${withArticle(finding.pointName)}`;
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

/** The matrix in full: every entry's reading, eigenvalues, negativity over the sample, and where it breaks. */
export function SlutskyOpen({ finding }: OpenProps<"slutsky">) {
  const sample = finding.at.checks.sample;
  const monotone = (sample?.monotonicity.breaks ?? 0) + (sample?.undefined?.rows ?? 0);
  const broken = sample?.regular?.breaks ?? monotone;
  return (
    <div className="space-y-6">
      <OpenHead sentence={slutskySentence(finding)}>
        <CopyTable table={slutskyTable(finding, finding.form)} />
      </OpenHead>
      <VerdictStrip label="What theory says of the matrix" verdicts={stripOf(slutskyVerdicts(finding))} />
      <MatrixReading finding={finding} form={finding.form} sums />
      <Eigenvalues finding={finding} />
      <NegativityOverSample finding={finding} />
      {finding.brokenRows.length > 0 && (
        <section className="border-line border-t pt-4" aria-label="Where it breaks">
          <BrokenRows rows={finding.brokenRows} total={broken} />
        </section>
      )}
    </div>
  );
}
