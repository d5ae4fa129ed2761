import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { usePhone } from "../../components/use-media.ts";
import { EigenvalueList } from "./eigenvalue-list.tsx";
import { MatrixReading } from "./matrix-reading.tsx";

type SealedSlutsky = SealedContent["slutsky"];

function Heading({ finding }: { finding: SealedSlutsky }) {
  const phone = usePhone();
  const total = printFixed(finding.point.total * finding.totalScale, DECIMALS.money);
  const form = finding.form === "share" ? "Share form" : "Quantity form, in units uploaded";
  return (
    <div className="break-inside-avoid break-after-avoid">
      <h2 className="type-section text-[1.3125rem]">Slutsky matrix</h2>
      <p className="type-small mt-0.5 mb-3 text-ink2">
        {form}, at {withArticle(finding.pointName)}: expenditure {total} in the units uploaded. Estimate over (standard
        error).{" "}
        <span className="print:hidden">
          {phone ? "Touch an entry for all its digits." : "Point at an entry for its mirror and its formula."}
        </span>
      </p>
    </div>
  );
}

/** The matrix of a sealed copy, with every entry's reading and the eigenvalues. */
export function SealedMatrix({ finding }: { finding: SealedSlutsky }) {
  const { eigenvalues } = finding.at;
  return (
    <section aria-label="Slutsky matrix">
      <Heading finding={finding} />
      <MatrixReading
        finding={finding}
        form={finding.form}
        below={
          eigenvalues.length > 0 && (
            <div className="max-w-lg">
              <EigenvalueList eigenvalues={eigenvalues} directions />
            </div>
          )
        }
      />
    </section>
  );
}
