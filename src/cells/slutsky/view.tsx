import { slutskySentence } from "../../../shared/tables/sentence.ts";
import { slutskyTable } from "../../../shared/tables/slutsky-matrix.ts";
import { slutskyVerdicts } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { BrokenRows } from "./broken-rows.tsx";
import { Eigenvalues, NegativityOverSample } from "./figures.tsx";
import { MatrixReading } from "./matrix-reading.tsx";

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
