import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { DECIMALS, printCount, printFixed } from "../../../shared/tables/numbers.ts";
import { AccountTable } from "../../components/table-account.tsx";

/** Row accounting of a sealed copy: counts by reason, no rows. */
export function SealedAccounting({ content }: { content: SealedContent }) {
  const { accounting, data } = content;
  const reasons = accounting.leftOut.filter((reason) => reason.count > 0);
  return (
    <section aria-labelledby="accounting">
      <h2 id="accounting" className="type-section mb-1.5 text-[1.3125rem]">
        Row accounting
      </h2>
      <AccountTable
        caption="Rows uploaded, left out by reason, and used"
        first={{ key: "uploaded", label: "Rows uploaded", number: printCount(accounting.uploaded) }}
        lines={reasons.map((reason) => ({
          key: reason.label,
          label: reason.label,
          number: printCount(-reason.count),
        }))}
        total={{ key: "used", label: "Rows used", number: printCount(accounting.used) }}
      />
      <p className="type-small mt-2 text-ink2">
        {data.weighted ? "Weighted" : "Not weighted"}; mean expenditure in the units uploaded{" "}
        {printFixed(data.meanTotal, DECIMALS.money)}.
      </p>
    </section>
  );
}
