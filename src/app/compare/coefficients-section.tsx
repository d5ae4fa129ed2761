import type { EstimatedSystem } from "../../../shared/study/nesting.ts";
import { comparedCoefficients, comparedTable } from "../../../shared/tables/compared.ts";
import { DECIMALS } from "../../../shared/tables/numbers.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";
import { CopyTable } from "../../cells/copy-table.tsx";
import { BesideSection, BesideWide } from "./beside.tsx";
import { ComparedView } from "./compared-view.tsx";

const CAPTION = "Coefficients of the share equations side by side";

/** Coefficients by name and good, with the differences; those that one system alone has are said to be its own. */
export function CoefficientsSection({ left, right }: { left: EstimatedSystem; right: EstimatedSystem }) {
  const names = [left.name, right.name] as const;
  const compared = comparedCoefficients(left.finding, right.finding);
  const errors = [left, right].map(({ name, finding }) => `${name}: ${standardErrorsPhrase(finding)}`).join("; ");
  const note = `Estimate over (standard error); ${errors}. A difference is ${right.name} less ${left.name}; it has no error of its own here, since the two rest on the same rows or overlapping ones.`;
  const table = comparedTable(compared, {
    name: "coefficients-compared",
    title: `Coefficients of ${left.name} and ${right.name}`,
    corner: "Share equation",
    names,
    decimals: DECIMALS.coefficient,
    notes: [note],
  });
  return (
    <BesideSection wide title="Coefficients" said={<CopyTable table={table} />}>
      <BesideWide>
        <ComparedView
          compared={compared}
          caption={CAPTION}
          corner="Share equation"
          names={names}
          decimals={DECIMALS.coefficient}
          folded="price terms"
        />
        <p className="type-small mt-2 max-w-[70ch] text-pretty text-ink2">{note}</p>
      </BesideWide>
    </BesideSection>
  );
}
